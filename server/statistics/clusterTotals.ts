import { DesignError } from "./errors.ts";
import type { Assignment, Sample } from "./types.ts";

/** Sums of each base cell over the whole sample. Only respondents of weight above 0 count. */
export interface CellTotals {
  cells: number;
  /** Subtracted from every outcome before summing, so that a large common level costs no digits; 0 for shares. */
  centre: number;
  respondents: Float64Array;
  /** Respondents whose outcome is not 0: those affected, for a 0/1 outcome. */
  affected: Float64Array;
  /** Σ w. */
  weight: Float64Array;
  /** Σ w (y − centre). */
  score: Float64Array;
  /** Σ w². */
  squaredWeight: Float64Array;
  /** Σ w (y − centre)². */
  squaredScore: Float64Array;
}

/** Clusters × base cells, holding only the pairs that occur: the entries of cluster i are start[i] to start[i + 1] − 1. */
export interface ClusterTable {
  start: Uint32Array;
  cell: Uint32Array;
  /** Σ w of each entry. */
  weight: Float64Array;
  /** Σ w (y − centre) of each entry. */
  score: Float64Array;
}

/**
 * One pass over the respondents, cluster by cluster. Cells are summed from cluster sums, so that the order of rows
 * inside a cluster costs at most its own rounding.
 *
 * @param clusterStart First row of each cluster, and one past the last row.
 * @throws {DesignError} A weight is negative or not finite.
 */
export function tabulate(
  sample: Sample,
  assignment: Assignment,
  clusterStart: Uint32Array,
): { totals: CellTotals; table: ClusterTable } {
  const { cell: cellOf, outcome, cells } = assignment;
  const { weight: weights } = sample;
  const centre = assignment.isBinary ? 0 : outcomeCentre(sample, assignment);
  const clusters = clusterStart.length - 1;
  const capacity = Math.min(weights.length, clusters * cells);
  const table: ClusterTable = {
    start: new Uint32Array(clusters + 1),
    cell: new Uint32Array(capacity),
    weight: new Float64Array(capacity),
    score: new Float64Array(capacity),
  };
  const totals = emptyTotals(cells, centre);
  const { respondents, affected, squaredWeight, squaredScore } = totals;
  const { cell: entryCell, weight: entryWeight, score: entryScore } = table;
  const latestEntry = new Int32Array(cells).fill(-1);
  let entries = 0;
  for (let cluster = 0; cluster < clusters; cluster++) {
    const first = entries;
    table.start[cluster] = first;
    const end = clusterStart[cluster + 1]!;
    for (let row = clusterStart[cluster]!; row < end; row++) {
      const w = weights[row]!;
      if (!(w > 0 && w < Infinity)) {
        if (w === 0) continue;
        throw new DesignError("bad-weight", `A weight is ${w}; weights must be finite and not negative`);
      }
      const cell = cellOf[row]!;
      if (cell < 0) continue;
      let entry = latestEntry[cell]!;
      if (entry < first) {
        entry = entries++;
        latestEntry[cell] = entry;
        entryCell[entry] = cell;
      }
      const y = outcome[row]!;
      const score = w * (y - centre);
      entryWeight[entry]! += w;
      entryScore[entry]! += score;
      respondents[cell]! += 1;
      if (y !== 0) affected[cell]! += 1;
      squaredWeight[cell]! += w * w;
      squaredScore[cell]! += score * (y - centre);
    }
  }
  table.start[clusters] = entries;
  sumCells(table, totals);
  return { totals, table };
}

function sumCells(table: ClusterTable, totals: CellTotals): void {
  const entries = table.start.at(-1) ?? 0;
  for (let entry = 0; entry < entries; entry++) {
    const cell = table.cell[entry]!;
    totals.weight[cell]! += table.weight[entry]!;
    totals.score[cell]! += table.score[entry]!;
  }
}

function emptyTotals(cells: number, centre: number): CellTotals {
  const zeros = () => new Float64Array(cells);
  return {
    cells,
    centre,
    respondents: zeros(),
    affected: zeros(),
    weight: zeros(),
    score: zeros(),
    squaredWeight: zeros(),
    squaredScore: zeros(),
  };
}

/**
 * A number near the outcomes' weighted mean. In single precision: a constant outcome then leaves an exact remainder,
 * so that its standard error is 0 and not the rounding of a mean.
 */
export function outcomeCentre(sample: Sample, assignment: Assignment): number {
  let total = 0;
  let weight = 0;
  for (let row = 0; row < assignment.cell.length; row++) {
    const w = sample.weight[row]!;
    if (assignment.cell[row]! < 0 || !(w > 0)) continue;
    weight += w;
    total += w * assignment.outcome[row]!;
  }
  return weight > 0 ? Math.fround(total / weight) : 0;
}
