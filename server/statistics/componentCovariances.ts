import type { ClusterTable } from "./clusterTotals.ts";
import type { Components, ComponentsOfCells } from "./components.ts";
import { singleCellAdder, splitComponents } from "./singleCells.ts";
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

/** Sums of the components' scores (even places) and weights (odd places) over some clusters. */
export type Sums = Float64Array;

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
  const { count, domains } = components;
  const { own } = into;
  const mean = new Float64Array(2 * count);
  const sums = new Float64Array(2 * count);
  const present = new Uint32Array(count);
  const clustersWith = new Uint32Array(count);
  const centredMean = Float64Array.from(domains, (domain) => domain.centredMean);
  const clusterCount = level.clusterStart.length - 1;
  const groupCount = level.groupStart.length - 1;
  const sumGroup = groupSummer(table, components);
  const { single, shared } = splitComponents(components, pairs);
  const addSingles = singleCellAdder({ table, single, centredMean, mean, sums, clustersWith, pairs, into });

  for (let group = 0; group < groupCount; group++) {
    const factor = level.factor[group]!;
    if (factor === 0) continue;
    const first = level.groupStart[group]!;
    const end = level.groupStart[group + 1]!;
    sumGroup(first, end, mean);
    for (let k = 0; k < count; k++) mean[2 * k]! -= centredMean[k]! * mean[2 * k + 1]!;
    if (level.isLone[group] === 1) {
      addLoneGroup(factor, mean, clusterCount, components, pairs, into);
      continue;
    }
    for (let place = 0; place < 2 * count; place++) mean[place]! /= end - first;
    clustersWith.fill(0);
    for (let cluster = first; cluster < end; cluster++) {
      if (shared === null) {
        addSingles(factor, cluster);
        continue;
      }
      const presentCount = sumEntries(table, shared, cluster, sums, present);
      for (let index = 0; index < presentCount; index++) {
        const k = present[index]!;
        const w = sums[2 * k + 1]!;
        sums[2 * k]! -= centredMean[k]! * w;
        const deviationR = sums[2 * k]! - mean[2 * k]!;
        const deviationW = w - mean[2 * k + 1]!;
        clustersWith[k]! += 1;
        own[3 * k]! += factor * deviationR * deviationR;
        own[3 * k + 1]! += factor * deviationR * deviationW;
        own[3 * k + 2]! += factor * deviationW * deviationW;
      }
      addSingles(factor, cluster);
      addProducts(factor, sums, mean, present, presentCount, pairs, into.cross);
      for (let index = 0; index < presentCount; index++) {
        const k = present[index]!;
        sums[2 * k] = 0;
        sums[2 * k + 1] = 0;
      }
    }
    // Clusters without a component deviate by its mean.
    for (let k = 0; k < count; k++) {
      const absent = factor * (end - first - clustersWith[k]!);
      const meanR = mean[2 * k]!;
      const meanW = mean[2 * k + 1]!;
      own[3 * k]! += absent * meanR * meanR;
      own[3 * k + 1]! += absent * meanR * meanW;
      own[3 * k + 2]! += absent * meanW * meanW;
    }
  }
}

/** Adds one cluster's entries to its components' sums and lists the components found. Weights are above 0: a sum of 0 is new. */
function sumEntries(
  table: ClusterTable,
  { cellStart, component }: ComponentsOfCells,
  cluster: number,
  sums: Sums,
  present: Uint32Array,
): number {
  const end = table.start[cluster + 1]!;
  let presentCount = 0;
  for (let entry = table.start[cluster]!; entry < end; entry++) {
    const cell = table.cell[entry]!;
    const w = table.weight[entry]!;
    const score = table.score[entry]!;
    const slots = cellStart[cell + 1]!;
    for (let slot = cellStart[cell]!; slot < slots; slot++) {
      const k = component[slot]!;
      const known = sums[2 * k + 1]!;
      if (known === 0) present[presentCount++] = k;
      sums[2 * k + 1] = known + w;
      sums[2 * k]! += score;
    }
  }
  return presentCount;
}

/** Sums over a group's clusters: cells first, components from them, since a group has many more entries than cells. */
function groupSummer(table: ClusterTable, components: Components): (first: number, end: number, into: Sums) => void {
  const { cellStart, component } = components;
  const cells = cellStart.length - 1;
  const byCell = new Float64Array(2 * cells);
  return (first, end, into) => {
    byCell.fill(0);
    into.fill(0);
    for (let entry = table.start[first]!; entry < table.start[end]!; entry++) {
      const cell = table.cell[entry]!;
      byCell[2 * cell]! += table.score[entry]!;
      byCell[2 * cell + 1]! += table.weight[entry]!;
    }
    for (let cell = 0; cell < cells; cell++) {
      if (byCell[2 * cell + 1] === 0) continue;
      for (let slot = cellStart[cell]!; slot < cellStart[cell + 1]!; slot++) {
        const k = component[slot]!;
        into[2 * k]! += byCell[2 * cell]!;
        into[2 * k + 1]! += byCell[2 * cell + 1]!;
      }
    }
  };
}

/** Adds one cluster's products: Σ (x − x̄)(x' − x̄') = Σ x (x' − x̄'), which is 0 in a cluster without x. */
function addProducts(
  factor: number,
  sums: Sums,
  mean: Sums,
  present: Uint32Array,
  presentCount: number,
  pairs: Pairs,
  cross: Float64Array,
): void {
  for (let index = 0; index < presentCount; index++) {
    const k = present[index]!;
    const r = factor * sums[2 * k]!;
    const w = factor * sums[2 * k + 1]!;
    const end = pairs.start[k + 1]!;
    for (let pair = pairs.start[k]!; pair < end; pair++) {
      const other = pairs.other[pair]!;
      const otherR = sums[2 * other]! - mean[2 * other]!;
      const otherW = sums[2 * other + 1]! - mean[2 * other + 1]!;
      cross[4 * pair]! += r * otherR;
      cross[4 * pair + 1]! += r * otherW;
      cross[4 * pair + 2]! += w * otherR;
      cross[4 * pair + 3]! += w * otherW;
    }
  }
}

/** A group's one cluster against the mean of all clusters: 0 for R, which sums to 0, and Σ w over their number for W. */
function addLoneGroup(
  factor: number,
  sums: Sums,
  clusterCount: number,
  components: Components,
  pairs: Pairs,
  into: Covariances,
): void {
  for (let k = 0; k < components.count; k++) {
    const r = sums[2 * k]!;
    const w = sums[2 * k + 1]! - components.domains[k]!.people / clusterCount;
    into.own[3 * k]! += factor * r * r;
    into.own[3 * k + 1]! += factor * r * w;
    into.own[3 * k + 2]! += factor * w * w;
    for (let pair = pairs.start[k]!; pair < pairs.start[k + 1]!; pair++) {
      const other = pairs.other[pair]!;
      const otherR = sums[2 * other]!;
      const otherW = sums[2 * other + 1]! - components.domains[other]!.people / clusterCount;
      into.cross[4 * pair]! += factor * r * otherR;
      into.cross[4 * pair + 1]! += factor * r * otherW;
      into.cross[4 * pair + 2]! += factor * w * otherR;
      into.cross[4 * pair + 3]! += factor * w * otherW;
    }
  }
}
