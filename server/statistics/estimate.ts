import { tabulate } from "./clusterTotals.ts";
import { planComponents } from "./components.ts";
import { compareSides, type ContrastEstimate, type ContrastSide } from "./contrast.ts";
import { type DomainTotals, domainTotals, type Target } from "./domainTotals.ts";
import { adjustedEffectiveSize, effectiveSize, intervalFor, type IntervalMethod, type Level } from "./intervals.ts";
import { linearizedMoments } from "./linearizedMoments.ts";
import type { ContrastVariances, Moments, TargetPair } from "./moments.ts";
import { countUnits, eitherOf, presenceFinder } from "./presence.ts";
import { replicateMoments } from "./replicateMoments.ts";
import type { Assignment, Sample } from "./types.ts";
import { varianceLevels } from "./varianceLevels.ts";

export type { ContrastEstimate } from "./contrast.ts";
export type { Target } from "./domainTotals.ts";
export { intervalFor } from "./intervals.ts";

/** Contrast between target `of` and either another target or a fixed value in the estimate's own unit (a share: 0 to 1). */
export interface ContrastRequest {
  of: number;
  from: number | { fixed: number };
}

/** How estimates and differences get their intervals. */
export interface EstimateOptions {
  level: Level;
  interval: IntervalMethod;
  difference: "linear" | "mover";
  /** Share of a 0/1 outcome, else the mean of a number. */
  isBinary: boolean;
}

/** One domain's figures. A null is a quantity that does not exist here, as any estimate of an empty domain. */
export interface TargetEstimate {
  /** Unweighted, of weight above 0. */
  respondents: number;
  /** Those with outcome 1; null for a mean. */
  affectedRespondents: number | null;
  /** PSUs and strata with at least one of the respondents. */
  psus: number;
  strata: number;
  people: number;
  peopleSe: number | null;
  /** Σ w y: people with the outcome, or the total of a number. */
  affectedPeople: number;
  affectedPeopleSe: number | null;
  estimate: number | null;
  se: number | null;
  low: number | null;
  high: number | null;
  /** A linear limit was drawn in to 0 or 1. */
  clipped: boolean;
  df: number;
  /** Variance over that of a simple random sample of as many respondents. */
  deff: number | null;
  /** Korn and Graubard's n*, adjusted for degrees of freedom and at most n; for a mean n/deff. */
  effectiveRespondents: number | null;
  /** n/deff, not adjusted and not capped. */
  effectiveBeforeAdjustment: number | null;
  /** n Σw²/(Σw)²: the weights' own effect (Kish 1965). */
  kish: number | null;
  /** Standard error over estimate. */
  cv: number | null;
}

/**
 * Estimates any number of domains of one sample and compares them, with design-based standard errors.
 *
 * @param assignment Disjoint base cells; a respondent outside them keeps its PSU in the design.
 * @param targets Domains as unions of base cells; they may overlap. A cell named twice counts twice: name each once.
 * @returns `targets` and `contrasts` in the order asked; `designDf` is PSUs minus strata of the whole design, or the
 *   replicates' declared degrees of freedom.
 * @throws {DesignError} A stratum has one PSU and the design says to refuse; or a weight is negative or not finite.
 * @see Binder (1983), International Statistical Review 51: 279-292. Korn & Graubard (1999), Analysis of Health Surveys.
 */
export function estimateTargets(
  sample: Sample,
  assignment: Assignment,
  targets: readonly Target[],
  contrasts: readonly ContrastRequest[],
  options: EstimateOptions,
): { designDf: number; targets: TargetEstimate[]; contrasts: ContrastEstimate[] } {
  const { totals, table } = tabulate(sample, assignment, sample.psuStart);
  const domains = targets.map((target) => domainTotals(totals, target));
  const plan = planComponents(totals, targets, domains);
  const presence = targets.map(presenceFinder(table, totals.cells));
  const isBinary = options.isBinary && assignment.isBinary;
  const pairs = contrasts.flatMap(({ of, from }): TargetPair[] => (typeof from === "number" ? [{ of, from }] : []));
  let moments: Moments;
  if (sample.replicates !== null) {
    moments = replicateMoments(sample.replicates, assignment, totals, targets);
  } else {
    const levels = varianceLevels(sample);
    const tables = levels.map((level, index) => (index === 0 ? table : tabulate(sample, assignment, level.clusterStart).table));
    moments = linearizedMoments({ levels, tables, totals, plan, domains, contrasts: pairs, isBinary });
  }
  const declaredDf = sample.replicates?.degreesOfFreedom ?? null;
  const estimates = domains.map((domain, index) => {
    const units = countUnits(presence[index]!, sample.stratumStart);
    const df = declaredDf ?? units.psus - units.strata;
    return describe(domain, units, df, moments.ofTarget(index), options);
  });
  const compared = contrasts.map(({ of, from }): ContrastEstimate => {
    const side = sideOf(estimates[of]!);
    if (typeof from !== "number") return compareSides(side, fixedSide(from.fixed), fixedVariances(side), side.df, options);
    const units = countUnits(eitherOf(presence[of]!, presence[from]!), sample.stratumStart);
    const df = declaredDf ?? units.psus - units.strata;
    return compareSides(side, sideOf(estimates[from]!), moments.ofContrast(of, from), df, options);
  });
  const designDf = declaredDf ?? sample.psuStart.length - sample.stratumStart.length;
  return { designDf, targets: estimates, contrasts: compared };
}

function describe(
  domain: DomainTotals,
  units: { psus: number; strata: number },
  df: number,
  variances: ReturnType<Moments["ofTarget"]>,
  options: EstimateOptions,
): TargetEstimate {
  const { respondents: n, estimate, people } = domain;
  const se = root(variances.estimate);
  const deff = designEffect(domain, variances.estimate, options.isBinary);
  const defined = estimate !== null && se !== null;
  const before = !defined
    ? null
    : options.isBinary
      ? effectiveSize(estimate, se, n)
      : deff !== null && deff > 0
        ? n / deff
        : null;
  return {
    respondents: n,
    affectedRespondents: options.isBinary ? domain.affected : null,
    ...units,
    people,
    peopleSe: root(variances.people),
    affectedPeople: estimate === null ? 0 : people * estimate,
    affectedPeopleSe: root(variances.affectedPeople),
    estimate,
    se,
    ...intervalFor(options.interval, { estimate, se, n, df, level: options.level, isBinary: options.isBinary }),
    df,
    deff,
    effectiveRespondents: defined && options.isBinary ? adjustedEffectiveSize(estimate, se, n, df, options.level) : before,
    effectiveBeforeAdjustment: before,
    kish: people > 0 ? (n * domain.squaredWeight) / people ** 2 : null,
    cv: defined && Number.isFinite(se / Math.abs(estimate)) ? se / Math.abs(estimate) : null,
  };
}

function designEffect(domain: DomainTotals, variance: number | null, isBinary: boolean): number | null {
  const { respondents: n, estimate, people } = domain;
  if (estimate === null || variance === null) return null;
  const unitVariance = isBinary ? estimate * (1 - estimate) : n > 1 ? ((domain.squaredDeviation / people) * n) / (n - 1) : 0;
  return unitVariance > 0 ? variance / (unitVariance / n) : null;
}

function sideOf(target: TargetEstimate): ContrastSide {
  const { estimate, se, respondents, df } = target;
  return { estimate, variance: se === null ? null : se * se, respondents, df, isFixed: false };
}

function fixedSide(value: number): ContrastSide {
  return { estimate: value, variance: 0, respondents: 0, df: Infinity, isFixed: true };
}

function fixedVariances({ estimate: p, variance }: ContrastSide): ContrastVariances {
  if (p === null || variance === null) return { difference: null, covariance: null, logRatio: null, logOddsRatio: null };
  return {
    difference: variance,
    covariance: 0,
    logRatio: p > 0 ? variance / p ** 2 : null,
    logOddsRatio: p > 0 && p < 1 ? variance / (p * (1 - p)) ** 2 : null,
  };
}

function root(variance: number | null): number | null {
  return variance === null ? null : Math.sqrt(Math.max(0, variance));
}
