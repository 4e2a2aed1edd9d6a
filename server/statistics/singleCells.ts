import type { ClusterTable } from "./clusterTotals.ts";
import type { Covariances, Pairs, Sums } from "./componentCovariances.ts";
import type { Components, ComponentsOfCells } from "./components.ts";

/** Components of one cell, of which a cluster's entry is all there is, kept apart from those that must be summed first. */
interface SplitComponents {
  /** For each cell the component of it and no other, or −1. */
  single: Int32Array;
  /** The other components of each cell; null where there are none. */
  shared: ComponentsOfCells | null;
}

/** Splits components; one that others are paired with must have its sums ready, and so is never single. */
export function splitComponents({ count, cellStart, component }: Components, pairs: Pairs): SplitComponents {
  const cells = cellStart.length - 1;
  const cellsOf = new Uint32Array(count);
  for (const k of component) cellsOf[k]! += 1;
  const isSecond = new Uint8Array(count);
  for (const k of pairs.other) isSecond[k] = 1;
  const single = new Int32Array(cells).fill(-1);
  const start = new Uint32Array(cells + 1);
  const others: number[] = [];
  for (let cell = 0; cell < cells; cell++) {
    for (const k of component.subarray(cellStart[cell], cellStart[cell + 1])) {
      if (cellsOf[k] === 1 && isSecond[k] === 0 && single[cell] === -1) single[cell] = k;
      else others.push(k);
    }
    start[cell + 1] = others.length;
  }
  return { single, shared: others.length > 0 ? { cellStart: start, component: Uint32Array.from(others) } : null };
}

/**
 * Adds one cluster's squares and products of single components.
 *
 * @param input.sums The cluster's sums of all other components, R about their means.
 */
export function singleCellAdder(input: {
  table: ClusterTable;
  single: Int32Array;
  centredMean: Float64Array;
  mean: Sums;
  sums: Sums;
  clustersWith: Uint32Array;
  pairs: Pairs;
  into: Covariances;
}): (factor: number, cluster: number) => void {
  const { single, centredMean, mean, sums, clustersWith, pairs } = input;
  const { start, cell, weight, score } = input.table;
  const { own, cross } = input.into;
  return (factor, cluster) => {
    const end = start[cluster + 1]!;
    for (let entry = start[cluster]!; entry < end; entry++) {
      const k = single[cell[entry]!]!;
      if (k < 0) continue;
      const w = weight[entry]!;
      const r = score[entry]! - centredMean[k]! * w;
      const deviationR = r - mean[2 * k]!;
      const deviationW = w - mean[2 * k + 1]!;
      clustersWith[k]! += 1;
      own[3 * k]! += factor * deviationR * deviationR;
      own[3 * k + 1]! += factor * deviationR * deviationW;
      own[3 * k + 2]! += factor * deviationW * deviationW;
      for (let pair = pairs.start[k]!; pair < pairs.start[k + 1]!; pair++) {
        const other = pairs.other[pair]!;
        const otherR = sums[2 * other]! - mean[2 * other]!;
        const otherW = sums[2 * other + 1]! - mean[2 * other + 1]!;
        cross[4 * pair]! += factor * r * otherR;
        cross[4 * pair + 1]! += factor * r * otherW;
        cross[4 * pair + 2]! += factor * w * otherR;
        cross[4 * pair + 3]! += factor * w * otherW;
      }
    }
  };
}
