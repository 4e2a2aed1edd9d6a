import type { Design } from "../../shared/contracts/design.ts";
import { asLabels, asNumbers, type LoadedColumn } from "./columns.ts";
import type { CodebookVariable } from "./codebook.ts";
import { computeLayout, type Labels, type Layout, type LayoutInput } from "./layout.ts";
import { expandPattern } from "./replicates.ts";

const listOf = (names: string | string[] | null) => (names === null ? [] : Array.isArray(names) ? names : [names]);

/** Names of the variables that a design reads, each once; replicate weights by their pattern. */
export function designVariables(design: Design, names: readonly string[]): string[] {
  const replicates = design.replicates ? (expandPattern(design.replicates.pattern, names) ?? []) : [];
  const single = [design.weight, design.strata].filter((name) => name !== null);
  return [...new Set([...single, ...listOf(design.psu), ...listOf(design.populationSize), ...replicates])];
}

/** What a design says of each respondent, rows in file order. */
export interface DesignData {
  weight: Float64Array | null;
  strata: Labels | null;
  stages: Labels[];
  populations: Float64Array[];
}

/** A variable with its column in file order. */
export type DesignColumns = ReadonlyMap<string, { variable: CodebookVariable; column: LoadedColumn }>;

function take(columns: DesignColumns, name: string) {
  const found = columns.get(name);
  if (!found) throw new Error(`The column ${name} was not loaded.`);
  return found;
}

/** Reads a design's variables out of their columns. */
export function readDesignData(design: Design, columns: DesignColumns): DesignData {
  const labels = (name: string) => {
    const { column, variable } = take(columns, name);
    return asLabels(column, variable);
  };
  const numbers = (name: string) => {
    const { column, variable } = take(columns, name);
    return asNumbers(column, variable);
  };
  return {
    weight: design.weight === null ? null : numbers(design.weight),
    strata: design.strata === null ? null : labels(design.strata),
    stages: listOf(design.psu).map(labels),
    populations: listOf(design.populationSize).map(numbers),
  };
}

/** The layout that a design asks for. */
export function layoutFor(data: DesignData, rows: number): Layout {
  const input: LayoutInput = { rows, strata: data.strata, stages: data.stages, populations: data.populations };
  return computeLayout(input);
}
