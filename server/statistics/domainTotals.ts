import type { CellTotals } from "./clusterTotals.ts";

/** A union of base cells estimated as one domain. */
export interface Target {
  cells: readonly number[] | Int32Array;
}

/** Sums of one domain, put together from its cells. */
export interface DomainTotals {
  respondents: number;
  affected: number;
  /** Σ w. */
  people: number;
  /** Σ w²: for the weights' own effect. */
  squaredWeight: number;
  /** Mean of y − centre; 0 for an empty domain. */
  centredMean: number;
  /** Σ w (y − the domain's mean)². */
  squaredDeviation: number;
  /** Share or mean; null for an empty domain. */
  estimate: number | null;
}

/** Sums of a union of disjoint cells. */
export function domainTotals(totals: CellTotals, target: Target): DomainTotals {
  const sums = { respondents: 0, affected: 0, people: 0, squaredWeight: 0, score: 0, squaredScore: 0 };
  for (const cell of target.cells) {
    sums.respondents += totals.respondents[cell]!;
    sums.affected += totals.affected[cell]!;
    sums.people += totals.weight[cell]!;
    sums.squaredWeight += totals.squaredWeight[cell]!;
    sums.score += totals.score[cell]!;
    sums.squaredScore += totals.squaredScore[cell]!;
  }
  const isEmpty = !(sums.people > 0);
  const centredMean = isEmpty ? 0 : sums.score / sums.people;
  return {
    respondents: sums.respondents,
    affected: sums.affected,
    people: sums.people,
    squaredWeight: sums.squaredWeight,
    centredMean,
    squaredDeviation: Math.max(0, sums.squaredScore - centredMean * sums.score),
    estimate: isEmpty ? null : totals.centre + centredMean,
  };
}
