import { type CellFunction, type CellSums, estimateFunction } from "./cellFunction.ts";
import { studentCritical, studentTwoSidedP } from "./distributions.ts";
import { SeparationError, SingularFitError } from "./errors.ts";
import type { Target } from "./domainTotals.ts";
import type { Level } from "./intervals.ts";
import { type CellDesign, coefficientInfluences, fitCells, type Link } from "./regression.ts";
import type { Assignment, Sample } from "./types.ts";

/** A straight line through groups' shares or means, or through their log odds. */
export interface Trend {
  intercept: number;
  /** Change per unit of score; of log odds in a logistic model. */
  slope: number;
  slopeSe: number | null;
  low: number | null;
  high: number | null;
  /** Two-sided t test of no slope. */
  p: number | null;
  df: number;
}

/**
 * Slope of a design-based regression of the outcome on each respondent's group score. Groups must not overlap. Waves
 * drawn independently are pooled first (`poolSamples`), so that they have disjoint strata.
 *
 * @param scores One for each group: its number, or the wave's year.
 * @throws {SingularFitError} Fewer than two scores with respondents.
 * @throws {SeparationError} Logistic: the scores predict the outcome perfectly.
 * @throws {DesignError} As estimates do.
 * @see Binder (1983), International Statistical Review 51: 279-292.
 */
export function trend(
  sample: Sample,
  assignment: Assignment,
  groups: readonly Target[],
  scores: readonly number[],
  options: { link: Link; level: Level },
): Trend {
  const { cells } = assignment;
  const scoreOf = new Float64Array(cells).fill(NaN);
  groups.forEach((group, index) => {
    for (const cell of group.cells) scoreOf[cell] = scores[index]!;
  });
  // About a middle score the two terms are nearly independent, which keeps the digits of years such as 2021.
  const middle = scores.reduce((sum, score) => sum + score, 0) / Math.max(1, scores.length);
  const design: CellDesign = { terms: 2, values: new Float64Array(2 * cells) };
  for (let cell = 0; cell < cells; cell++) {
    design.values[2 * cell] = 1;
    design.values[2 * cell + 1] = Number.isNaN(scoreOf[cell]) ? 0 : scoreOf[cell]! - middle;
  }
  const isScored = (cell: number) => !Number.isNaN(scoreOf[cell]);
  const estimate = estimateFunction(sample, assignment, slopeFunction(design, options.link, isScored));
  const [level, slope] = [estimate.values[0]!, estimate.values[1]!];
  const scored = Int32Array.from({ length: cells }, (_, cell) => cell).filter(isScored);
  const df = estimate.degreesOfFreedom({ cells: scored });
  const variance = estimate.covariance(1, 1);
  const slopeSe = variance === null ? null : Math.sqrt(Math.max(0, variance));
  const t = df >= 1 ? studentCritical(options.level, df) : null;
  const hasInterval = slopeSe !== null && t !== null;
  return {
    intercept: level - slope * middle,
    slope,
    slopeSe,
    low: hasInterval ? slope - t * slopeSe : null,
    high: hasInterval ? slope + t * slopeSe : null,
    p: hasInterval && slopeSe > 0 ? studentTwoSidedP(slope / slopeSe, df) : null,
    df,
  };
}

function slopeFunction(design: CellDesign, link: Link, isScored: (cell: number) => boolean): CellFunction {
  const scoredOnly = (sums: CellSums): CellSums => ({
    people: sums.people.map((people, cell) => (isScored(cell) ? people : 0)),
    mean: sums.mean,
  });
  return {
    values: undefinedWhereUnfit((sums) => fitCells(scoredOnly(sums), design, link).coefficients, 2),
    influences: (sums) => {
      const used = scoredOnly(sums);
      return coefficientInfluences(used, design, fitCells(used, design, link));
    },
  };
}

/** Values of a fit; in a replicate that cannot be fitted they are undefined. The full sample, met first, throws. */
export function undefinedWhereUnfit(values: CellFunction["values"], count: number): CellFunction["values"] {
  let isFull = true;
  return (sums) => {
    try {
      const result = values(sums);
      isFull = false;
      return result;
    } catch (error) {
      if (isFull || !(error instanceof SeparationError || error instanceof SingularFitError)) throw error;
      return new Float64Array(count).fill(NaN);
    }
  };
}
