import loadHighs, { type Highs } from "highs";
import type { TableLine } from "../nodes.ts";

/**
 * How far a reader who knows every shown count can pin down each withheld one.
 * Counts are non-negative and add up along the lines; respondents without a value are taken as known to the reader.
 */
export interface AuditInput {
  /** True count of each node. */
  counts: readonly number[];
  isWithheld: readonly boolean[];
  lines: readonly TableLine[];
}

let solver: Promise<Highs> | null = null;
/** The linear-programme solver (HiGHS, compiled to WebAssembly), loaded once. */
export const loadSolver = (): Promise<Highs> => (solver ??= loadHighs());

interface Equation {
  total: number;
  unknowns: Map<number, number>;
}

/** Lines with the shown counts moved to one side; lines that say nothing of withheld counts are left out. */
function equationsOf({ counts, isWithheld, lines }: AuditInput): Equation[] {
  const equations: Equation[] = [];
  for (const { parent, children } of lines) {
    const unknowns = new Map<number, number>();
    for (const child of children) if (isWithheld[child]) unknowns.set(child, 1);
    if (isWithheld[parent]) unknowns.set(parent, -1);
    if (unknowns.size === 0) continue;
    // The truth solves the system, whatever is known: the total is what the withheld ones truly add up to.
    const total = [...unknowns].reduce((sum, [node, sign]) => sum + sign * counts[node]!, 0);
    equations.push({ total, unknowns });
  }
  return equations;
}

function programme(objective: ReadonlyMap<number, number>, sense: "min" | "max", equations: readonly Equation[]): string {
  const terms = (entries: Iterable<[number, number]>) =>
    [...entries].map(([node, factor]) => `${factor < 0 ? "-" : "+"} ${Math.abs(factor)} n${node}`).join(" ");
  const rows = equations.map(({ total, unknowns }, i) => ` e${i}: ${terms(unknowns)} = ${total}`);
  return `${sense === "min" ? "Minimize" : "Maximize"}\n obj: ${terms(objective)}\nSubject To\n${rows.join("\n")}\nEnd\n`;
}

/** A fixed, irregular sequence, so that an audit can be had again. */
const irregular = (i: number) => (((i + 1) * 2654435761) % 1000) / 1000 - 0.5;
const ROUNDS = 6;

type Range = [low: number, high: number];

/** Equations that share no unknown with any other part: each part can be looked at by itself. */
function partsOf(equations: readonly Equation[]): Equation[][] {
  const partOf = new Map<number, Equation[]>();
  for (const equation of equations) {
    const merged = new Set([...equation.unknowns.keys()].flatMap((node) => partOf.get(node) ?? []));
    const part = [...merged, equation];
    const nodes = new Set(part.flatMap(({ unknowns }) => [...unknowns.keys()]));
    for (const node of nodes) partOf.set(node, part);
  }
  return [...new Set(partOf.values())];
}

/** Bounds in a part of one equation, where they can be read off. */
function boundsOfLine({ total, unknowns }: Equation): Map<number, Range> {
  const isAlone = unknowns.size === 1;
  const hasParent = [...unknowns.values()].includes(-1);
  return new Map(
    [...unknowns].map(([node, sign]): [number, Range] => {
      if (isAlone) return [node, [sign * total, sign * total]];
      if (!hasParent) return [node, [0, total]];
      // The parent is at least what is shown of it; nothing bounds it or its withheld children above.
      return [node, [sign < 0 ? Math.max(0, -total) : Math.max(0, total), Number.POSITIVE_INFINITY]];
    }),
  );
}

function boundsOfPart(part: readonly Equation[], counts: readonly number[], enough: number, highs: Highs): Map<number, Range> {
  const [only, second] = part;
  if (only && !second) return boundsOfLine(only);
  const bounds = new Map(
    part.flatMap(({ unknowns }) => [...unknowns.keys()].map((node): [number, Range] => [node, [counts[node]!, counts[node]!]])),
  );
  const solve = (objective: ReadonlyMap<number, number>, sense: "min" | "max") => {
    const result = highs.solve(programme(objective, sense, part));
    if (result.Status === "Unbounded") return false;
    if (result.Status !== "Optimal") throw new Error(`The disclosure audit ended as ${result.Status}.`);
    for (const [node, range] of bounds) {
      const value = result.Columns[`n${node}`]?.Primal;
      if (typeof value !== "number") continue;
      range[0] = Math.min(range[0], value);
      range[1] = Math.max(range[1], value);
    }
    return true;
  };
  const isOpen = ([low, high]: Range) => high - low < enough;
  const nodes = [...bounds.keys()];
  for (let round = 0; round < ROUNDS && [...bounds.values()].some(isOpen); round++) {
    solve(new Map(nodes.map((node) => [node, isOpen(bounds.get(node)!) ? irregular(node * ROUNDS + round) : 0])), "max");
  }
  for (const [node, range] of bounds) {
    if (!isOpen(range)) continue;
    solve(new Map([[node, 1]]), "min");
    if (isOpen(range) && !solve(new Map([[node, 1]]), "max")) range[1] = Number.POSITIVE_INFINITY;
  }
  return bounds;
}

/** Bounds of parts that were looked at before, by what they say; shared between the audits of one table. */
export type KnownParts = Map<string, Map<number, Range>>;

/**
 * Smallest and largest count that each withheld node may have, by linear programming.
 * Nodes shown to vary by `enough` through a few joint programmes keep those (inner) bounds; the others get exact ones.
 * @param enough How wide a range is wide enough.
 * @param known Kept from audit to audit, so that what hasn't changed isn't solved again.
 * @returns For each node `[low, high]`, null where it is shown. `high` is infinite when nothing bounds it.
 */
export async function boundsOfWithheld(
  input: AuditInput,
  enough: number,
  known: KnownParts = new Map(),
): Promise<(Range | null)[]> {
  const bounds = input.isWithheld.map((isWithheld): Range | null => (isWithheld ? [0, Number.POSITIVE_INFINITY] : null));
  const highs = await loadSolver();
  for (const part of partsOf(equationsOf(input))) {
    const key = part.map(({ total, unknowns }) => `${total}:${[...unknowns].join()}`).join(";");
    const found = known.get(key) ?? boundsOfPart(part, input.counts, enough, highs);
    known.set(key, found);
    for (const [node, range] of found) bounds[node] = range;
  }
  return bounds;
}
