import { type CellFunction, estimateFunction, type Influence, noInfluence } from "./cellFunction.ts";
import { compareSides, type ContrastEstimate, type ContrastSide } from "./contrast.ts";
import type { Target } from "./domainTotals.ts";
import type { EstimateOptions } from "./estimate.ts";
import { adjustSize, intervalFor, kornGraubard } from "./intervals.ts";
import { normalise } from "./standards.ts";
import { withContrastVariances } from "./valueContrasts.ts";
import type { Assignment, Sample } from "./types.ts";

/** One group's standardised share or mean. Null figures where a band in use has nobody of the group. */
export interface StandardisedEstimate {
  /** Unweighted, in the bands in use. */
  respondents: number;
  /** Positions of bands in use without a respondent: they make the group's figure undefined. */
  emptyBands: number[];
  estimate: number | null;
  se: number | null;
  low: number | null;
  high: number | null;
  clipped: boolean;
  df: number;
  /** Variance over Σ ω² p(1 − p)/n of the bands; null for a mean. */
  deff: number | null;
  /** n/deff, what the presentation standards ask of an age-adjusted share; n at 0 or 1; null for a mean. */
  effectiveBeforeAdjustment: number | null;
  /** Standard error over estimate. */
  cv: number | null;
}

/**
 * Directly standardised shares or means, Σ ω_a p_a over bands with the standard's weights, and their contrasts.
 *
 * @param groups For each group its bands, in the weights' order, each a union of base cells. Groups may overlap.
 * @param weights A standard's weights in any unit, ≥ 0; normalised to 1. A band of weight 0 is not in use.
 * @param contrasts Between groups, by index, or with a fixed value.
 * @returns `weights` as used. Intervals by the method asked for; Korn–Graubard's and Wilson's at the age-adjusted
 *   effective size.
 * @throws {DesignError} As estimates do.
 * @see Klein & Schoenborn (2001), Healthy People 2010 Statistical Notes 20. Parker et al. (2017), NCHS Series 2, No. 175.
 */
export function standardise(
  sample: Sample,
  assignment: Assignment,
  groups: readonly (readonly Target[])[],
  weights: readonly number[],
  contrasts: readonly { of: number; from: number | { fixed: number } }[],
  options: EstimateOptions,
): { weights: number[]; groups: StandardisedEstimate[]; contrasts: ContrastEstimate[] } {
  const shares = normalise(weights);
  const estimate = estimateFunction(sample, assignment, weightedBands(groups, shares, assignment.cells));
  const domains = groups.map((bands): Target => ({ cells: bands.flatMap((band, a) => (shares[a]! > 0 ? [...band.cells] : [])) }));
  const described = groups.map((bands, group): StandardisedEstimate => {
    const size = (band: Target) => sumOver(band, estimate.respondents);
    const used = bands.flatMap((band, a) => (shares[a]! > 0 ? [{ band, a, n: size(band) }] : []));
    const emptyBands = used.filter(({ n }) => n === 0).map(({ a }) => a);
    const respondents = used.reduce((sum, { n }) => sum + n, 0);
    const value = emptyBands.length > 0 ? null : estimate.values[group]!;
    const variance = value === null ? null : estimate.covariance(group, group);
    const simple = used.reduce((sum, { band, a, n }) => {
      const p = bandMean(band, estimate.sums);
      return sum + (shares[a]! ** 2 * p * (1 - p)) / n;
    }, 0);
    return describe({
      respondents,
      emptyBands,
      value,
      variance,
      simple,
      df: estimate.degreesOfFreedom(domains[group]!),
      options,
    });
  });
  const sides = described.map(({ estimate: value, se, respondents, df, effectiveBeforeAdjustment: effective }): ContrastSide => ({
    estimate: value,
    variance: se === null ? null : se * se,
    respondents,
    df,
    isFixed: false,
    ...(effective === null ? {} : { effective }),
  }));
  const compared = contrasts.map(({ of, from }) => {
    const df =
      typeof from === "number"
        ? estimate.degreesOfFreedom(domains[of]!, domains[from]!)
        : estimate.degreesOfFreedom(domains[of]!);
    const { side, variances } = withContrastVariances(estimate, sides, of, from);
    return compareSides(sides[of]!, side, variances, df, options);
  });
  return { weights: shares, groups: described, contrasts: compared };
}

/** Σ ω p over bands that are unions of cells: p of a band responds to its cells' residuals and to who is in which. */
function weightedBands(groups: readonly (readonly Target[])[], shares: readonly number[], cells: number): CellFunction {
  return {
    values: (sums) =>
      Float64Array.from(groups, (bands) =>
        bands.reduce((total, band, a) => (shares[a]! > 0 ? total + shares[a]! * bandMean(band, sums) : total), 0),
      ),
    influences: (sums) =>
      groups.map((bands): Influence => {
        const influence = noInfluence(cells);
        bands.forEach((band, a) => {
          const people = sumOver(band, sums.people);
          if (!(shares[a]! > 0 && people > 0)) return;
          const mean = bandMean(band, sums);
          for (const cell of band.cells) {
            if (!(sums.people[cell]! > 0)) continue;
            influence.onResidual[cell]! += shares[a]! / people;
            if (band.cells.length > 1) influence.onPeople[cell]! += (shares[a]! * (sums.mean[cell]! - mean)) / people;
          }
        });
        return influence;
      }),
  };
}

function bandMean({ cells }: Target, { people, mean }: { people: Float64Array; mean: Float64Array }): number {
  if (cells.length === 1) return mean[cells[0]!]!;
  let weight = 0;
  let total = 0;
  for (const cell of cells) {
    if (!(people[cell]! > 0)) continue;
    weight += people[cell]!;
    total += people[cell]! * mean[cell]!;
  }
  return total / weight;
}

function sumOver({ cells }: Target, values: Float64Array): number {
  let sum = 0;
  for (const cell of cells) sum += values[cell]!;
  return sum;
}

function describe(input: {
  respondents: number;
  emptyBands: number[];
  value: number | null;
  variance: number | null;
  /** Variance of the same weighting of simple random samples of the bands. */
  simple: number;
  df: number;
  options: EstimateOptions;
}): StandardisedEstimate {
  const { respondents: n, emptyBands, value: estimate, variance, simple, df, options } = input;
  const { level, interval, isBinary } = options;
  const se = variance === null ? null : Math.sqrt(Math.max(0, variance));
  const isDefined = estimate !== null && se !== null && isBinary;
  const deff = isDefined && simple > 0 ? (se * se) / simple : null;
  const effective = !isDefined ? null : deff !== null && deff > 0 ? n / deff : n;
  const adjusted =
    effective === null || estimate === null
      ? null
      : estimate <= 0 || estimate >= 1 || n < 2
        ? n
        : df < 1
          ? null
          : adjustSize(effective, n, df, level);
  const limits =
    interval === "korn-graubard" && isBinary && estimate !== null
      ? kornGraubard(estimate, adjusted, level)
      : // Wilson's effective size is p(1 − p)/SE²: an SE to that effect carries the age-adjusted one.
        intervalFor(interval, {
          estimate,
          se: interval === "wilson" && isDefined && effective !== null ? Math.sqrt((estimate * (1 - estimate)) / effective) : se,
          n,
          df,
          level,
          isBinary,
        });
  const cv = estimate !== null && se !== null && estimate !== 0 ? se / Math.abs(estimate) : null;
  return { respondents: n, emptyBands, estimate, se, ...limits, df, deff, effectiveBeforeAdjustment: effective, cv };
}
