import type { DomainTotals } from "./domainTotals.ts";

/** Variances of one target; null where undefined. */
export interface TargetVariances {
  estimate: number | null;
  people: number | null;
  affectedPeople: number | null;
}

/** Variances of what two targets are compared by; null where undefined. */
export interface ContrastVariances {
  difference: number | null;
  covariance: number | null;
  logRatio: number | null;
  logOddsRatio: number | null;
}

/** Where variances come from: linearization or replicates. */
export interface Moments {
  ofTarget: (target: number) => TargetVariances;
  ofContrast: (of: number, from: number) => ContrastVariances;
}

/** Contrast of target `of` with target `from`, by index. */
export interface TargetPair {
  of: number;
  from: number;
}

/**
 * Whether everyone in a domain has the same outcome, so that its variance is 0 and not the rounding of a difference of
 * sums.
 */
export function isConstant(domain: DomainTotals, isBinary: boolean): boolean {
  if (isBinary) return domain.affected === 0 || domain.affected === domain.respondents;
  return domain.squaredDeviation <= 1e-14 * domain.people * domain.centredMean * domain.centredMean;
}
