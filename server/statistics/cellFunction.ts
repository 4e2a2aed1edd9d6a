import { type CellTotals, type ClusterTable, tabulate } from "./clusterTotals.ts";
import type { Target } from "./domainTotals.ts";
import { linearCovariances } from "./linearCovariances.ts";
import { countUnits, eitherOf, presenceFinder } from "./presence.ts";
import { replicateCovariance, replicateTotals } from "./replicateMoments.ts";
import type { Assignment, Sample } from "./types.ts";
import { varianceLevels } from "./varianceLevels.ts";

/** What a function of cells is computed from: Σ w and the weighted mean outcome of each base cell, NaN where empty. */
export interface CellSums {
  people: Float64Array;
  mean: Float64Array;
}

/**
 * How one value responds to a base cell c: dθ = Σ_c onResidual[c] dR_c + onPeople[c] dW_c, with W_c = Σ w and
 * R_c = Σ w (y − the cell's mean). Split so, a function of means alone has no people part to cancel.
 */
export interface Influence {
  onResidual: Float64Array;
  onPeople: Float64Array;
}

/** Smooth values computed from cells. Both functions answer in the same order. */
export interface CellFunction {
  /** Values at any totals, a replicate's too; NaN where undefined. */
  values: (sums: CellSums) => Float64Array;
  /** Influences of the values at the full sample's totals. */
  influences: (sums: CellSums) => Influence[];
}

/** Values of a cell function and how they vary. */
export interface FunctionEstimate {
  sums: CellSums;
  /** Unweighted respondents of each base cell. */
  respondents: Float64Array;
  values: Float64Array;
  /** Null where a replicate that counts has no value. */
  covariance: (left: number, right: number) => number | null;
  /** Variance of a function of the values: by its gradient at them, or computed again in each replicate. */
  varianceOf: (combine: (values: Float64Array) => number, gradient: ArrayLike<number>) => number | null;
  /** Degrees of freedom of everyone in some cells: PSUs minus strata that hold them, or the replicates' declared. */
  degreesOfFreedom: (...targets: readonly Target[]) => number;
}

/** An influence of zeros, to be filled. */
export function noInfluence(cells: number): Influence {
  return { onResidual: new Float64Array(cells), onPeople: new Float64Array(cells) };
}

/** Every base cell as one domain. */
export function everyCell(cells: number): Target {
  return { cells: Int32Array.from({ length: cells }, (_, cell) => cell) };
}

/**
 * Estimates any smooth function of cell totals with design-based covariances: linearized by its influences, or computed
 * again with each replicate's weights. Standardised shares, slopes, indexes and fitted models all go this way.
 *
 * @throws {DesignError} The design cannot give variances, or a weight is negative or not finite.
 * @see Binder (1983), International Statistical Review 51: 279-292. Demnati & Rao (2004), Survey Methodology 30: 17-26.
 */
export function estimateFunction(sample: Sample, assignment: Assignment, cellFunction: CellFunction): FunctionEstimate {
  const { totals, table } = tabulate(sample, assignment, sample.psuStart);
  const sums = sumsOf(totals.weight, totals.score, totals.centre);
  const values = cellFunction.values(sums);
  const presenceOf = presenceFinder(table, totals.cells);
  const declaredDf = sample.replicates?.degreesOfFreedom ?? null;
  const common = {
    sums,
    respondents: totals.respondents,
    values,
    degreesOfFreedom: (...targets: readonly Target[]) => {
      if (declaredDf !== null) return declaredDf;
      const { psus, strata } = countUnits(targets.map(presenceOf).reduce(eitherOf), sample.stratumStart);
      return psus - strata;
    },
  };
  return sample.replicates === null
    ? { ...common, ...linearized(sample, assignment, totals, table, cellFunction.influences(sums)) }
    : { ...common, ...replicated(sample.replicates, assignment, totals.centre, values, cellFunction) };
}

type Variances = Pick<FunctionEstimate, "covariance" | "varianceOf">;

function linearized(
  sample: Sample,
  assignment: Assignment,
  totals: CellTotals,
  table: ClusterTable,
  influences: readonly Influence[],
): Variances {
  const count = influences.length;
  const matrix = new Float64Array(count * count);
  varianceLevels(sample).forEach((level, index) => {
    const clusters = index === 0 ? table : tabulate(sample, assignment, level.clusterStart).table;
    linearCovariances(level, clusters, totals, influences, matrix);
  });
  const covariance = (left: number, right: number) => finite(matrix[left * count + right]!);
  const varianceOf = (_: unknown, gradient: ArrayLike<number>) => {
    let sum = 0;
    for (let left = 0; left < count; left++) {
      if (gradient[left] === 0) continue;
      for (let right = 0; right < count; right++) {
        if (gradient[right] !== 0) sum += gradient[left]! * gradient[right]! * matrix[left * count + right]!;
      }
    }
    return finite(Math.max(0, sum));
  };
  return { covariance, varianceOf };
}

function replicated(
  replicates: NonNullable<Sample["replicates"]>,
  assignment: Assignment,
  centre: number,
  full: Float64Array,
  cellFunction: CellFunction,
): Variances {
  const { weight, score } = replicateTotals(replicates, assignment, centre);
  const { cells } = assignment;
  const rows = replicates.weights.map((_, replicate) => {
    const from = replicate * cells;
    const sums = sumsOf(weight.subarray(from, from + cells), score.subarray(from, from + cells), centre);
    return cellFunction.values(sums);
  });
  const series = (value: number) => ({ full: full[value]!, values: Float64Array.from(rows, (row) => row[value]!) });
  return {
    covariance: (left, right) => replicateCovariance(replicates, series(left), series(right)),
    varianceOf: (combine) => replicateCovariance(replicates, { full: combine(full), values: Float64Array.from(rows, combine) }),
  };
}

function sumsOf(people: Float64Array, score: Float64Array, centre: number): CellSums {
  return { people, mean: score.map((total, cell) => (people[cell]! > 0 ? centre + total / people[cell]! : NaN)) };
}

function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
