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
 * @param q Between 0 and 1, both excluded.
 * @returns For each target, one estimate for each q.
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
  const outcome = new Uint8Array(assignment.cell.length);
  return targets.map((target) => {
    const inverse = distributionOf(sample, assignment, target);
    return quantiles.map((q) => {
      const estimate = inverse(q);
      if (estimate === null) return { q, estimate, low: null, high: null, df: 0 };
      for (let row = 0; row < outcome.length; row++) outcome[row] = Number(assignment.outcome[row]! <= estimate);
      const { targets: shares } = estimateTargets(sample, { ...assignment, outcome, isBinary: true }, [target], [], {
        level,
        interval: "linear",
        difference: "linear",
        isBinary: true,
      });
      const { estimate: share, se, df } = shares[0]!;
      if (share === null || se === null || df < 1) return { q, estimate, low: null, high: null, df };
      const reach = studentCritical(level, df) * se;
      return {
        q,
        estimate,
        low: share - reach > 0 ? inverse(share - reach) : null,
        high: share + reach < 1 ? inverse(share + reach) : null,
        df,
      };
    });
  });
}

/** Smallest value whose weighted share reaches a probability. */
function distributionOf(sample: Sample, assignment: Assignment, target: Target): (probability: number) => number | null {
  const inside = new Uint8Array(assignment.cells);
  for (const cell of target.cells) inside[cell] = 1;
  const rows: number[] = [];
  assignment.cell.forEach((cell, row) => {
    if (cell >= 0 && inside[cell] === 1 && sample.weight[row]! > 0) rows.push(row);
  });
  const order = Uint32Array.from(rows).sort((left, right) => assignment.outcome[left]! - assignment.outcome[right]!);
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
