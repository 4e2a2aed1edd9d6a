import { studentCritical } from "./distributions.ts";
import type { Target } from "./domainTotals.ts";
import { estimateTargets } from "./estimate.ts";
import type { Level } from "./intervals.ts";
import type { Assignment, Sample } from "./types.ts";

/** One quantile of one domain; null where the domain is empty or a limit lies beyond its values. */
export interface QuantileEstimate {
  q: number;
  estimate: number | null;
  low: number | null;
  high: number | null;
  df: number;
}

/**
 * Weighted quantiles of a numeric outcome: the smallest value whose weighted share of the domain reaches q. Woodruff's
 * interval inverts the same distribution at p ± t · SE(p), p the share at or below the estimate (above q where values
 * are tied).
 *
 * @param targets Domains as unions of base cells; they may overlap.
 * @param quantiles Each between 0 and 1, both excluded.
 * @returns For each target, one estimate for each quantile.
 * @throws {DesignError} As estimates do.
 * @see Woodruff (1952), JASA 47: 635-646.
 */
export function estimateQuantiles(
  sample: Sample,
  assignment: Assignment,
  targets: readonly Target[],
  quantiles: readonly number[],
  level: Level,
): QuantileEstimate[][] {
  const rowsOf = rowsByCell(sample, assignment);
  const inverses = targets.map((target) => inverseOf(sample, assignment, target, rowsOf));
  const answers = targets.map((): QuantileEstimate[] => []);
  const batches = disjointBatches(targets, assignment.cells);
  for (const q of quantiles) {
    const estimates = inverses.map((inverse) => inverse(q));
    for (const batch of batches) {
      const shares = sharesAtOrBelow(
        sample,
        assignment,
        batch.map((target) => ({ ...targets[target]!, value: estimates[target]! })),
      );
      batch.forEach((target, place) => {
        const { estimate: share, se, df } = shares[place]!;
        const answer: QuantileEstimate = { q, estimate: estimates[target]!, low: null, high: null, df };
        if (answer.estimate !== null && share !== null && se !== null && df >= 1) {
          const reach = studentCritical(level, df) * se;
          if (share - reach > 0) answer.low = inverses[target]!(share - reach);
          if (share + reach < 1) answer.high = inverses[target]!(share + reach);
        }
        answers[target]!.push(answer);
      });
    }
  }
  return answers;
}

/** Share of each domain at or below its own value, with its error: one pass for domains that don't overlap. */
function sharesAtOrBelow(sample: Sample, assignment: Assignment, domains: readonly (Target & { value: number | null })[]) {
  const threshold = new Float64Array(assignment.cells).fill(-Infinity);
  for (const { cells, value } of domains) for (const cell of cells) threshold[cell] = value ?? -Infinity;
  const outcome = new Uint8Array(assignment.cell.length);
  assignment.cell.forEach((cell, row) => {
    if (cell >= 0 && assignment.outcome[row]! <= threshold[cell]!) outcome[row] = 1;
  });
  const options = { level: 95, interval: "linear", difference: "linear", isBinary: true } as const;
  return estimateTargets(sample, { ...assignment, outcome, isBinary: true }, domains, [], options).targets;
}

/** Targets, by index, in as few groups without overlap as taking them in turn gives. */
function disjointBatches(targets: readonly Target[], cells: number): number[][] {
  const batches: { members: number[]; taken: Uint8Array }[] = [];
  targets.forEach((target, index) => {
    const own = [...target.cells];
    let batch = batches.find(({ taken }) => own.every((cell) => taken[cell] === 0));
    if (!batch) {
      batch = { members: [], taken: new Uint8Array(cells) };
      batches.push(batch);
    }
    batch.members.push(index);
    for (const cell of own) batch.taken[cell] = 1;
  });
  return batches.map(({ members }) => members);
}

/** Rows of weight above 0 in each base cell. */
function rowsByCell(sample: Sample, { cell: cellOf, cells }: Assignment): (cell: number) => Uint32Array {
  const isCounted = (row: number) => cellOf[row]! >= 0 && sample.weight[row]! > 0;
  const start = new Uint32Array(cells + 1);
  for (let row = 0; row < cellOf.length; row++) if (isCounted(row)) start[cellOf[row]! + 1]! += 1;
  for (let cell = 0; cell < cells; cell++) start[cell + 1]! += start[cell]!;
  const next = start.slice();
  const rows = new Uint32Array(start[cells]!);
  for (let row = 0; row < cellOf.length; row++) if (isCounted(row)) rows[next[cellOf[row]!]!++] = row;
  return (cell) => rows.subarray(start[cell], start[cell + 1]);
}

/** Smallest value whose weighted share of a domain reaches a probability; null for an empty domain. */
function inverseOf(
  sample: Sample,
  assignment: Assignment,
  target: Target,
  rowsOf: (cell: number) => Uint32Array,
): (probability: number) => number | null {
  const parts = Array.from(target.cells, rowsOf);
  const order = new Uint32Array(parts.reduce((sum, part) => sum + part.length, 0));
  let filled = 0;
  for (const part of parts) {
    order.set(part, filled);
    filled += part.length;
  }
  order.sort((left, right) => assignment.outcome[left]! - assignment.outcome[right]!);
  const share = new Float64Array(order.length);
  let people = 0;
  order.forEach((row, place) => (share[place] = people += sample.weight[row]!));
  return (probability) => {
    // Sums of weights that should reach the share exactly may fall short by their rounding.
    const wanted = probability * people * (1 - 1e-12);
    let low = 0;
    let high = share.length;
    while (low < high) {
      const middle = (low + high) >>> 1;
      if (share[middle]! >= wanted) high = middle;
      else low = middle + 1;
    }
    return low < share.length ? assignment.outcome[order[low]!]! : null;
  };
}
