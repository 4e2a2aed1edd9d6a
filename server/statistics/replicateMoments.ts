import type { CellTotals } from "./clusterTotals.ts";
import type { Target } from "./domainTotals.ts";
import { DesignError } from "./errors.ts";
import type { Moments } from "./moments.ts";
import type { Assignment, Replicates } from "./types.ts";

/** Σ w and Σ w (y − centre) of each cell in each replicate: cell c of replicate r is at r · cells + c. */
export interface ReplicateTotals {
  weight: Float64Array;
  score: Float64Array;
}

/**
 * Sums every cell anew with each replicate's weights.
 *
 * @throws {DesignError} A replicate weight is negative or not finite.
 */
export function replicateTotals(replicates: Replicates, assignment: Assignment, centre: number): ReplicateTotals {
  const { cell: cellOf, outcome, cells } = assignment;
  const weight = new Float64Array(replicates.weights.length * cells);
  const score = new Float64Array(replicates.weights.length * cells);
  replicates.weights.forEach((weights, replicate) => {
    for (let row = 0; row < cellOf.length; row++) {
      const cell = cellOf[row]!;
      const w = weights[row]!;
      if (cell < 0 || w === 0) continue;
      if (!(w > 0 && w < Infinity)) throw new DesignError("bad-replicates", `A weight of replicate ${replicate + 1} is ${w}`);
      weight[replicate * cells + cell]! += w;
      score[replicate * cells + cell]! += w * (outcome[row]! - centre);
    }
  });
  return { weight, score };
}

/**
 * V = scale · Σ a_r (θ_r − c)(φ_r − d), about the full-sample values (`mse`) or the replicates' means. Null where a
 * replicate that counts has no value, as when it leaves out all of a group.
 *
 * @see Wolter (2007), Introduction to Variance Estimation, 2nd edition, chapters 3 and 4.
 */
export function replicateCovariance(
  replicates: Replicates,
  left: { full: number; values: Float64Array },
  right: { full: number; values: Float64Array } = left,
): number | null {
  const { scale, replicateScales, mse } = replicates;
  const count = left.values.length;
  let centreLeft = left.full;
  let centreRight = right.full;
  if (!mse) {
    centreLeft = left.values.reduce((sum, value) => sum + value, 0) / count;
    centreRight = right.values.reduce((sum, value) => sum + value, 0) / count;
  }
  let sum = 0;
  for (let r = 0; r < count; r++) sum += replicateScales[r]! * (left.values[r]! - centreLeft) * (right.values[r]! - centreRight);
  return Number.isFinite(sum) ? scale * sum : null;
}

/** Variances from replicate weights: every quantity, log ratios too, is computed again in each replicate. */
export function replicateMoments(
  replicates: Replicates,
  assignment: Assignment,
  totals: CellTotals,
  targets: readonly Target[],
): Moments {
  const { weight, score } = replicateTotals(replicates, assignment, totals.centre);
  const count = replicates.weights.length;
  // The last value is the full sample's.
  const series = targets.map((target) => {
    const people = new Float64Array(count + 1);
    const estimate = new Float64Array(count + 1);
    for (let r = 0; r <= count; r++) {
      const [weights, scores, at] = r < count ? [weight, score, r * assignment.cells] : [totals.weight, totals.score, 0];
      let w = 0;
      let s = 0;
      for (const cell of target.cells) {
        w += weights[at + cell]!;
        s += scores[at + cell]!;
      }
      people[r] = w;
      estimate[r] = w > 0 ? totals.centre + s / w : NaN;
    }
    return { people, estimate };
  });
  const quantity = (values: Float64Array) => ({ full: values[count]!, values: values.subarray(0, count) });
  const variance = (values: Float64Array) => replicateCovariance(replicates, quantity(values));
  return {
    ofTarget: (target) => {
      const { people, estimate } = series[target]!;
      const affected = people.map((w, r) => (w > 0 ? w * estimate[r]! : 0));
      if (!(people[count]! > 0)) return { estimate: null, people: null, affectedPeople: null };
      return { estimate: variance(estimate), people: variance(people), affectedPeople: variance(affected) };
    },
    ofContrast: (of, from) => {
      const p = series[of]!.estimate;
      const q = series[from]!.estimate;
      const combine = (f: (p: number, q: number) => number) => variance(p.map((value, r) => f(value, q[r]!)));
      return {
        difference: combine((a, b) => a - b),
        covariance: replicateCovariance(replicates, quantity(p), quantity(q)),
        logRatio: combine((a, b) => (a > 0 && b > 0 ? Math.log(a / b) : NaN)),
        logOddsRatio: combine((a, b) => Math.log(a / (1 - a) / (b / (1 - b)))),
      };
    },
  };
}
