import { readFileSync } from "node:fs";
import { join } from "node:path";
import Papa from "papaparse";
import type { Assignment, Sample } from "../../../server/statistics/types.ts";
import { buildSample, type Row } from "./buildSample.ts";

const folder = join(import.meta.dirname, "../../reference");

/** Numbers under a name, as cases.json holds them; nested by kind. */
export type Expected = Record<string, unknown>;

/** One case of cases.json; see the README beside it. */
export interface ReferenceCase {
  id: string;
  kind: string;
  data: string;
  design: {
    weight: string;
    strata?: string;
    psu?: string | string[];
    fpc?: string | string[];
    lonely?: Sample["lonely"];
    replicates?: { pattern: string; method: string; scale: number; rscales: number | number[]; mse: boolean };
  };
  query: {
    outcome: { variable: string; affected?: number };
    by?: string | string[];
    among?: { variable: string; between: [number | null, number | null] };
    levels?: number | number[];
    level?: number;
    comparison?: { kind: "rest" | "all" | "group"; variable?: string; value?: string | number };
    standardise?: { variable: string; codes: number[]; weights: number[] };
    scores?: string;
    model?: "linear" | "logistic";
    adjustFor?: string[];
    reference?: number;
    ordered?: string;
    quantiles?: number[];
  };
  expected: Expected;
}

type Table = Record<string, string>[];

const tables = new Map<string, Table>();

/** Rows of a CSV beside cases.json; every value a string, missing "". */
export function readTable(name: string): Table {
  const known = tables.get(name);
  if (known) return known;
  const parsed = Papa.parse<Record<string, string>>(readFileSync(join(folder, name), "utf8").trim(), { header: true }).data;
  tables.set(name, parsed);
  return parsed;
}

export function readCases(): ReferenceCase[] {
  return JSON.parse(readFileSync(join(folder, "cases.json"), "utf8")) as ReferenceCase[];
}

/** A value as cases.json writes keys: a number where it is one. */
export function readKey(value: string): string | number {
  return value !== "" && Number.isFinite(Number(value)) ? Number(value) : value;
}

/** A case's sample with base cells of the distinct values of `by`, in the order found when sorted. */
export interface LoadedCase {
  sample: Sample;
  assignment: Assignment;
  /** Key of each base cell. */
  keys: (string | number)[][];
  /** Value of a column for every row in layout order. */
  column: (name: string) => (number | null)[];
}

const asList = (names: string | string[] | undefined): string[] =>
  names === undefined ? [] : typeof names === "string" ? [names] : names;

export function loadCase(reference: ReferenceCase, by: string[] = asList(reference.query.by)): LoadedCase {
  const { design, query } = reference;
  const table = readTable(reference.data);
  const isAmong = (record: Record<string, string>) => {
    if (query.among === undefined) return true;
    const { variable, between } = query.among;
    const value = record[variable]!;
    return value !== "" && Number(value) >= (between[0] ?? -Infinity) && Number(value) <= (between[1] ?? Infinity);
  };
  const keyOf = (record: Record<string, string>) => by.map((name) => record[name]!);
  const isPlaced = (record: Record<string, string>) => isAmong(record) && keyOf(record).every((value) => value !== "");
  const names = new Set(
    table
      .filter((record) => isPlaced(record) && record[query.outcome.variable] !== "")
      .map((record) => JSON.stringify(keyOf(record))),
  );
  const sorted = [...names].sort((a, b) => a.localeCompare(b, "en", { numeric: true }));
  const cellOf = new Map(sorted.map((name, index) => [name, index]));
  const outcome = (value: string) =>
    value === "" ? null : query.outcome.affected === undefined ? Number(value) : Number(Number(value) === query.outcome.affected);
  const psu = asList(design.psu);
  const fpc = asList(design.fpc);
  const pattern = design.replicates ? new RegExp(design.replicates.pattern) : null;
  const replicateNames = pattern ? Object.keys(table[0]!).filter((name) => pattern.test(name)) : [];
  const rows = table.map((record): Row => ({
    ...(design.strata ? { stratum: record[design.strata]! } : {}),
    ...(psu[0] ? { psu: record[psu[0]]! } : {}),
    ...(psu[1] ? { unit: record[psu[1]]! } : {}),
    ...(fpc[0] ? { stratumPopulation: Number(record[fpc[0]]) } : {}),
    ...(fpc[1] ? { psuPopulation: Number(record[fpc[1]]) } : {}),
    ...(pattern ? { replicates: replicateNames.map((name) => Number(record[name])) } : {}),
    weight: Number(record[design.weight]),
    cell: isPlaced(record) ? (cellOf.get(JSON.stringify(keyOf(record))) ?? null) : null,
    y: outcome(record[query.outcome.variable]!),
  }));
  const built = buildSample(rows, {
    lonely: design.lonely ?? "centred",
    cells: names.size,
    isBinary: query.outcome.affected !== undefined,
    ...(design.replicates ? { replicates: replicateDesign(design.replicates, replicateNames.length) } : {}),
  });
  return {
    sample: built.sample,
    assignment: built.assignment,
    keys: sorted.map((name) => (JSON.parse(name) as string[]).map(readKey)),
    column: (name) => built.order.map((index) => (table[index]![name] === "" ? null : Number(table[index]![name]))),
  };
}

function replicateDesign(given: NonNullable<ReferenceCase["design"]["replicates"]>, count: number) {
  const scales =
    typeof given.rscales === "number" ? new Float64Array(count).fill(given.rscales) : Float64Array.from(given.rscales);
  return { scale: given.scale, replicateScales: scales, mse: given.mse, degreesOfFreedom: count - 1 };
}
