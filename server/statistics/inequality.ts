import {
  type CellFunction,
  type CellSums,
  estimateFunction,
  everyCell,
  type FunctionEstimate,
  noInfluence,
} from "./cellFunction.ts";
import { studentCritical } from "./distributions.ts";
import type { Level } from "./intervals.ts";
import type { Assignment, Sample } from "./types.ts";

/** A value with its standard error and linear interval; null where undefined. */
export interface Measure {
  estimate: number | null;
  se: number | null;
  low: number | null;
  high: number | null;
}

/** Inequality over groups from the lowest to the highest rank. */
export interface Inequality {
  /** Fitted difference between rank 1 and rank 0. */
  slopeIndex: Measure;
  /** Fitted value at rank 1 over that at rank 0; undefined unless both are above 0. */
  relativeIndex: Measure;
  df: number;
}

/**
 * Slope and relative index of inequality: a weighted least squares line of the outcome on each group's ridit, the share
 * of people below it plus half its own. Ridits are estimates too, and their sampling counts in the errors.
 *
 * @param ordered Base cells from lowest to highest; others are left out.
 * @throws {DesignError} As estimates do.
 * @see Mackenbach & Kunst (1997), Social Science & Medicine 44: 757-771.
 */
export function inequality(sample: Sample, assignment: Assignment, ordered: readonly number[], level: Level): Inequality {
  const estimate = estimateFunction(sample, assignment, {
    values: (sums) => indexesOf(lineOf(sums, ordered)),
    influences: (sums) => indexInfluences(sums, ordered),
  } satisfies CellFunction);
  const df = estimate.degreesOfFreedom({ cells: ordered });
  return {
    slopeIndex: measure(estimate, 0, df, level),
    relativeIndex: measure(estimate, 1, df, level),
    df,
  };
}

/** How much of an outcome would go, had everyone the reference group's level. */
export interface Attributable {
  overall: number | null;
  reference: number | null;
  /** Population attributable risk: overall less reference. */
  risk: Measure;
  /** Population attributable fraction: the risk over the overall level. */
  fraction: Measure;
  df: number;
}

/**
 * Population attributable risk and fraction of base cells against one of them. Arithmetic on an association: it says what
 * equal levels would mean, not what would follow from a cause removed.
 *
 * @param reference The base cell everyone is compared with.
 * @throws {DesignError} As estimates do.
 * @see Miettinen (1974), American Journal of Epidemiology 99: 325-332. Rockhill, Newman & Weinberg (1998), AJPH 88: 15-19.
 */
export function attributable(sample: Sample, assignment: Assignment, reference: number, level: Level): Attributable {
  const { cells } = assignment;
  const estimate = estimateFunction(sample, assignment, {
    values: (sums) => {
      const { mean } = overallOf(sums);
      const own = sums.mean[reference]!;
      return Float64Array.of(mean, own, mean - own, (mean - own) / mean);
    },
    influences: (sums) => {
      const { mean, people } = overallOf(sums);
      const own = sums.mean[reference]!;
      const slopes = [
        [1, 0],
        [0, 1],
        [1, -1],
        [own / mean ** 2, -1 / mean],
      ] as const;
      return slopes.map(([onOverall, onReference]) => {
        const influence = noInfluence(cells);
        for (let cell = 0; cell < cells; cell++) {
          if (!(sums.people[cell]! > 0)) continue;
          influence.onResidual[cell] = onOverall / people;
          influence.onPeople[cell] = (onOverall * (sums.mean[cell]! - mean)) / people;
        }
        influence.onResidual[reference]! += onReference / sums.people[reference]!;
        return influence;
      });
    },
  } satisfies CellFunction);
  const df = estimate.degreesOfFreedom(everyCell(cells));
  const of = (value: number) => measure(estimate, value, df, level);
  return { overall: of(0).estimate, reference: of(1).estimate, risk: of(2), fraction: of(3), df };
}

function measure({ values, covariance }: FunctionEstimate, value: number, df: number, level: Level): Measure {
  const estimate = values[value]!;
  if (!Number.isFinite(estimate)) return { estimate: null, se: null, low: null, high: null };
  const variance = covariance(value, value);
  if (variance === null) return { estimate, se: null, low: null, high: null };
  const se = Math.sqrt(Math.max(0, variance));
  if (df < 1) return { estimate, se, low: null, high: null };
  const reach = studentCritical(level, df) * se;
  return { estimate, se, low: estimate - reach, high: estimate + reach };
}

function overallOf({ people, mean }: CellSums): { people: number; mean: number } {
  let weight = 0;
  let total = 0;
  people.forEach((w, cell) => {
    if (!(w > 0)) return;
    weight += w;
    total += w * mean[cell]!;
  });
  return { people: weight, mean: total / weight };
}

/** The line's parts: ridits less ½ by place, Σ w (x − ½)(y − ȳ), Σ w (x − ½)², people, mean outcome. */
function lineOf({ people, mean }: CellSums, ordered: readonly number[]) {
  const size = ordered.map((cell) => people[cell]!);
  const all = size.reduce((sum, w) => sum + w, 0);
  let below = 0;
  const ranks = size.map((w) => {
    const rank = (below + w / 2) / all - 0.5;
    below += w;
    return rank;
  });
  const outcome = ordered.map((cell, place) => (size[place]! > 0 ? mean[cell]! : 0));
  const overall = outcome.reduce((sum, y, place) => sum + size[place]! * y, 0) / all;
  const product = ranks.reduce((sum, x, place) => sum + size[place]! * x * (outcome[place]! - overall), 0);
  const square = ranks.reduce((sum, x, place) => sum + size[place]! * x * x, 0);
  return { size, all, ranks, outcome, overall, product, square };
}

function indexesOf({ product, square, overall }: ReturnType<typeof lineOf>): Float64Array {
  const slope = square > 0 ? product / square : NaN;
  const [bottom, top] = [overall - slope / 2, overall + slope / 2];
  return Float64Array.of(slope, bottom > 0 && top > 0 ? top / bottom : NaN);
}

/** Influences of the slope, by way of the ridits too, and of the ratio of the line's ends. */
function indexInfluences(sums: CellSums, ordered: readonly number[]) {
  const line = lineOf(sums, ordered);
  const { size, all, ranks, outcome, overall, product, square } = line;
  const slope = product / square;
  const bottom = overall - slope / 2;
  const top = overall + slope / 2;
  const ofSlope = noInfluence(sums.people.length);
  const ofRatio = noInfluence(sums.people.length);
  // A person more in group h raises the ridit of every group above by 1/all, of h by half that, and lowers all by their ridit.
  const residual = outcome.map((y, place) => y - overall - slope * ranks[place]!);
  let above = 0; // Σ over groups above of w · (what a ridit's rise is worth)
  const worth = ranks.map((x, place) => size[place]! * (residual[place]! - slope * x));
  const total = worth.reduce((sum, value, place) => sum + value * (ranks[place]! + 0.5), 0);
  for (let place = ordered.length - 1; place >= 0; place--) {
    const cell = ordered[place]!;
    const x = ranks[place]!;
    const throughRanks = (above + worth[place]! / 2 - total) / all;
    above += worth[place]!;
    if (!(size[place]! > 0)) continue;
    ofSlope.onResidual[cell] = x / square;
    ofSlope.onPeople[cell] = (x * residual[place]! + throughRanks) / square;
    const onOverall = (slope * -1) / bottom ** 2;
    const onSlope = overall / bottom ** 2;
    ofRatio.onResidual[cell] = onOverall / all + onSlope * ofSlope.onResidual[cell];
    ofRatio.onPeople[cell] = (onOverall * (outcome[place]! - overall)) / all + onSlope * ofSlope.onPeople[cell];
  }
  return top > 0 && bottom > 0 ? [ofSlope, ofRatio] : [ofSlope, noInfluence(sums.people.length)];
}
