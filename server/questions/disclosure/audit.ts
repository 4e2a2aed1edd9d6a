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
const ROUNDS = 12;

/**
 * Smallest and largest count that each withheld node may have, by linear programming.
 * Nodes shown to vary by `enough` through a few joint programmes keep those (inner) bounds; the others get exact ones.
 * @param enough How wide a range is wide enough.
 * @returns For each node `[low, high]`, null where it is shown. `high` is infinite when nothing bounds it.
 */
export async function boundsOfWithheld(input: AuditInput, enough: number): Promise<([number, number] | null)[]> {
  const equations = equationsOf(input);
  const bounds = input.isWithheld.map((isWithheld, node): [number, number] | null =>
    isWithheld ? [input.counts[node]!, input.counts[node]!] : null,
  );
  const bounded = new Set(equations.flatMap(({ unknowns }) => [...unknowns.keys()]));
  bounds.forEach((range, node) => {
    if (range && !bounded.has(node)) [range[0], range[1]] = [0, Number.POSITIVE_INFINITY];
  });
  if (equations.length === 0) return bounds;
  const highs = await loadSolver();
  const solve = (objective: ReadonlyMap<number, number>, sense: "min" | "max") => {
    const result = highs.solve(programme(objective, sense, equations));
    if (result.Status === "Unbounded") return null;
    if (result.Status !== "Optimal") throw new Error(`The disclosure audit ended as ${result.Status}.`);
    for (const node of bounded) {
      const value = result.Columns[`n${node}`]?.Primal;
      const range = bounds[node];
      if (typeof value !== "number" || !range) continue;
      range[0] = Math.min(range[0], value);
      range[1] = Math.max(range[1], value);
    }
    return true;
  };
  const isOpen = (node: number) => bounds[node]![1] - bounds[node]![0] < enough;
  for (let round = 0; round < ROUNDS && [...bounded].some(isOpen); round++) {
    const objective = new Map([...bounded].map((node) => [node, isOpen(node) ? irregular(node * ROUNDS + round) : 0]));
    solve(objective, "max");
  }
  for (const node of bounded) {
    if (!isOpen(node)) continue;
    solve(new Map([[node, 1]]), "min");
    if (solve(new Map([[node, 1]]), "max") === null) bounds[node]![1] = Number.POSITIVE_INFINITY;
  }
  return bounds;
}
