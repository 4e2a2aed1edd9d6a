import type { ClusterTable } from "./clusterTotals.ts";
import type { Components } from "./components.ts";
import type { VarianceLevel } from "./varianceLevels.ts";

/**
 * Design covariances of components' totals: of R = Σ w (y − its own mean), which is what an estimate varies by, and of
 * W = Σ w.
 */
export interface Covariances {
  /** Of each component: RR, RW, WW. */
  own: Float64Array;
  /** Of each pair asked for: RR', RW', WR', WW'. */
  cross: Float64Array;
}

/** Pairs of components by their first: those of k are slots start[k] to start[k + 1] − 1. */
export interface Pairs {
  start: Uint32Array;
  other: Uint32Array;
}

/** Room for the covariances of `components` components and their pairs. */
export function noCovariances(components: number, pairs: Pairs): Covariances {
  return { own: new Float64Array(3 * components), cross: new Float64Array(4 * pairs.other.length) };
}

/**
 * Adds one stage's share to the covariances. Two passes over each group, first for its means, so that nothing is lost
 * where clusters differ little; a cluster costs time only for the components that occur in it.
 *
 * @see Binder (1983), International Statistical Review 51: 279-292.
 */
export function addCovariances(
  level: VarianceLevel,
  table: ClusterTable,
  components: Components,
  pairs: Pairs,
  into: Covariances,
): void {
  const { count, cellStart, component, shift } = components;
  const { own, cross } = into;
  const meanR = new Float64Array(count);
  const meanW = new Float64Array(count);
  const sumR = new Float64Array(count);
  const sumW = new Float64Array(count);
  const latest = new Int32Array(count).fill(-1);
  const present = new Uint32Array(count);
  const clustersWith = new Uint32Array(count);
  const clusterCount = level.clusterStart.length - 1;
  const groupCount = level.groupStart.length - 1;

  for (let group = 0; group < groupCount; group++) {
    const factor = level.factor[group]!;
    if (factor === 0) continue;
    const first = level.groupStart[group]!;
    const end = level.groupStart[group + 1]!;
    meanR.fill(0);
    meanW.fill(0);
    clustersWith.fill(0);
    for (let entry = table.start[first]!; entry < table.start[end]!; entry++) {
      const cell = table.cell[entry]!;
      const w = table.weight[entry]!;
      const r = table.residual[entry]!;
      const slots = cellStart[cell + 1]!;
      for (let slot = cellStart[cell]!; slot < slots; slot++) {
        const k = component[slot]!;
        meanW[k]! += w;
        meanR[k]! += r + shift[slot]! * w;
      }
    }
    if (level.isLone[group] === 1) {
      addLoneGroup(factor, meanR, meanW, clusterCount, components, pairs, into);
      continue;
    }
    for (let k = 0; k < count; k++) {
      meanR[k]! /= end - first;
      meanW[k]! /= end - first;
    }
    for (let cluster = first; cluster < end; cluster++) {
      let presentCount = 0;
      for (let entry = table.start[cluster]!; entry < table.start[cluster + 1]!; entry++) {
        const cell = table.cell[entry]!;
        const w = table.weight[entry]!;
        const r = table.residual[entry]!;
        const slots = cellStart[cell + 1]!;
        for (let slot = cellStart[cell]!; slot < slots; slot++) {
          const k = component[slot]!;
          if (latest[k] !== cluster) {
            latest[k] = cluster;
            present[presentCount++] = k;
          }
          sumW[k]! += w;
          sumR[k]! += r + shift[slot]! * w;
        }
      }
      for (let index = 0; index < presentCount; index++) {
        const k = present[index]!;
        const r = sumR[k]!;
        const w = sumW[k]!;
        const deviationR = r - meanR[k]!;
        const deviationW = w - meanW[k]!;
        clustersWith[k]! += 1;
        own[3 * k]! += factor * deviationR * deviationR;
        own[3 * k + 1]! += factor * deviationR * deviationW;
        own[3 * k + 2]! += factor * deviationW * deviationW;
        // Σ (x − x̄)(x' − x̄') = Σ x (x' − x̄'), which is 0 in a cluster without x.
        for (let pair = pairs.start[k]!; pair < pairs.start[k + 1]!; pair++) {
          const other = pairs.other[pair]!;
          const otherR = factor * (sumR[other]! - meanR[other]!);
          const otherW = factor * (sumW[other]! - meanW[other]!);
          cross[4 * pair]! += r * otherR;
          cross[4 * pair + 1]! += r * otherW;
          cross[4 * pair + 2]! += w * otherR;
          cross[4 * pair + 3]! += w * otherW;
        }
      }
      for (let index = 0; index < presentCount; index++) {
        sumR[present[index]!] = 0;
        sumW[present[index]!] = 0;
      }
    }
    // Clusters without a component deviate by its mean.
    for (let k = 0; k < count; k++) {
      const absent = factor * (end - first - clustersWith[k]!);
      own[3 * k]! += absent * meanR[k]! * meanR[k]!;
      own[3 * k + 1]! += absent * meanR[k]! * meanW[k]!;
      own[3 * k + 2]! += absent * meanW[k]! * meanW[k]!;
    }
  }
}

/** A group's one cluster against the mean of all clusters: 0 for R, which sums to 0, and Σ w over their number for W. */
function addLoneGroup(
  factor: number,
  sumR: Float64Array,
  sumW: Float64Array,
  clusterCount: number,
  components: Components,
  pairs: Pairs,
  into: Covariances,
): void {
  for (let k = 0; k < components.count; k++) {
    const r = sumR[k]!;
    const w = sumW[k]! - components.domains[k]!.people / clusterCount;
    into.own[3 * k]! += factor * r * r;
    into.own[3 * k + 1]! += factor * r * w;
    into.own[3 * k + 2]! += factor * w * w;
    for (let pair = pairs.start[k]!; pair < pairs.start[k + 1]!; pair++) {
      const other = pairs.other[pair]!;
      const otherR = sumR[other]!;
      const otherW = sumW[other]! - components.domains[other]!.people / clusterCount;
      into.cross[4 * pair]! += factor * r * otherR;
      into.cross[4 * pair + 1]! += factor * r * otherW;
      into.cross[4 * pair + 2]! += factor * w * otherR;
      into.cross[4 * pair + 3]! += factor * w * otherW;
    }
  }
}
