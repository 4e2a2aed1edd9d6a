import type { Influence } from "./cellFunction.ts";
import type { CellTotals, ClusterTable } from "./clusterTotals.ts";
import type { VarianceLevel } from "./varianceLevels.ts";

/**
 * Adds one stage's share to the covariance matrix (row by row, symmetric) of values with the given influences. A
 * cluster's score in a value is Σ over its cells of onResidual · R + onPeople · W.
 *
 * @see Binder (1983), International Statistical Review 51: 279-292.
 */
export function linearCovariances(
  level: VarianceLevel,
  table: ClusterTable,
  totals: CellTotals,
  influences: readonly Influence[],
  into: Float64Array,
): void {
  const count = influences.length;
  const { addCluster, present } = clusterScorer(table, totals, influences);
  const clusters = level.clusterStart.length - 1;
  const overall = new Float64Array(count);
  if (level.isLone.includes(1)) for (let cluster = 0; cluster < clusters; cluster++) addCluster(cluster, overall);
  const mean = new Float64Array(count);
  const scores = new Float64Array(count);
  const clustersWith = new Float64Array(count);
  for (let group = 0; group < level.factor.length; group++) {
    const factor = level.factor[group]!;
    if (factor === 0) continue;
    const first = level.groupStart[group]!;
    const end = level.groupStart[group + 1]!;
    mean.fill(0);
    for (let cluster = first; cluster < end; cluster++) addCluster(cluster, mean);
    if (level.isLone[group] === 1) {
      // The group's one cluster against the mean of all clusters.
      for (let value = 0; value < count; value++) mean[value]! -= overall[value]! / clusters;
      addOuter(factor, mean, into);
      continue;
    }
    for (let value = 0; value < count; value++) mean[value]! /= end - first;
    clustersWith.fill(0);
    for (let cluster = first; cluster < end; cluster++) {
      const found = addCluster(cluster, scores);
      for (let index = 0; index < found; index++) {
        const value = present[index]!;
        const score = scores[value]!;
        const deviation = score - mean[value]!;
        clustersWith[value]! += 1;
        into[value * count + value]! += factor * deviation * deviation;
        // Σ (x − x̄)(x' − x̄') = Σ x (x' − x̄'), which is 0 in a cluster without x.
        for (let other = value + 1; other < count; other++) {
          into[value * count + other]! += factor * score * (scores[other]! - mean[other]!);
        }
      }
      for (let index = 0; index < found; index++) scores[present[index]!] = 0;
    }
    // Clusters without a value's cells deviate by its mean.
    for (let value = 0; value < count; value++) {
      into[value * count + value]! += factor * (end - first - clustersWith[value]!) * mean[value]! * mean[value]!;
    }
  }
  mirror(into, count);
}

function addOuter(factor: number, vector: Float64Array, into: Float64Array): void {
  const count = vector.length;
  for (let row = 0; row < count; row++) {
    for (let column = row; column < count; column++) into[row * count + column]! += factor * vector[row]! * vector[column]!;
  }
}

function mirror(matrix: Float64Array, count: number): void {
  for (let row = 0; row < count; row++) {
    for (let column = 0; column < row; column++) matrix[row * count + column] = matrix[column * count + row]!;
  }
}

/** A function that adds a cluster's scores to sums and lists the values it touched. */
function clusterScorer(table: ClusterTable, totals: CellTotals, influences: readonly Influence[]) {
  const { cells } = totals;
  // Which values a cell has a part in, so that a cell of one group costs nothing in the others.
  const start = new Uint32Array(cells + 1);
  const value: number[] = [];
  const onResidual: number[] = [];
  const onPeople: number[] = [];
  for (let cell = 0; cell < cells; cell++) {
    influences.forEach((influence, index) => {
      const residual = influence.onResidual[cell]!;
      const people = influence.onPeople[cell]!;
      if (residual === 0 && people === 0) return;
      value.push(index);
      onResidual.push(residual);
      onPeople.push(people);
    });
    start[cell + 1] = value.length;
  }
  const centredMean = totals.weight.map((people, cell) => (people > 0 ? totals.score[cell]! / people : 0));
  const present = new Uint32Array(influences.length);
  const seenAt = new Uint32Array(influences.length);
  let call = 0;
  const addCluster = (cluster: number, into: Float64Array): number => {
    let found = 0;
    call++;
    for (let entry = table.start[cluster]!; entry < table.start[cluster + 1]!; entry++) {
      const cell = table.cell[entry]!;
      const people = table.weight[entry]!;
      const residual = table.score[entry]! - centredMean[cell]! * people;
      for (let slot = start[cell]!; slot < start[cell + 1]!; slot++) {
        const at = value[slot]!;
        into[at]! += onResidual[slot]! * residual + onPeople[slot]! * people;
        if (seenAt[at] === call) continue;
        seenAt[at] = call;
        present[found++] = at;
      }
    }
    return found;
  };
  return { addCluster, present };
}
