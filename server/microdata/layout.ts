import { isUnlabelled } from "./columns.ts";

/** Labels of groups by row in file order (`asLabels`), or null where the design names no such variable. */
export interface LayoutInput {
  rows: number;
  strata: Labels | null;
  /** First-stage units, then second-stage units; none: each respondent is a PSU. */
  stages: Labels[];
  /** Population sizes by row in file order, one array for each stage that declares one. */
  populations: Float64Array[];
}
export interface Labels {
  labels: Uint32Array;
  count: number;
}

/** Order of a release's respondents by stratum, PSU and second-stage unit; what each array means stands in `statistics/types.ts`. */
export interface Layout {
  /** Row of the file that stands at each place. */
  order: Uint32Array;
  psuStart: Uint32Array;
  stratumStart: Uint32Array;
  stratumPopulation: Float64Array | null;
  unitStart: Uint32Array | null;
  psuUnitStart: Uint32Array | null;
  psuPopulation: Float64Array | null;
}

/** Places of the rows sorted by a key, those of equal key staying in order (counting sort). */
function sortBy(order: Uint32Array, keys: Uint32Array, count: number): Uint32Array {
  const start = new Uint32Array(count + 2);
  // Rows without a label come last.
  const keyOf = (row: number) => (isUnlabelled(keys[row]!) ? count : keys[row]!);
  for (const row of order) start[keyOf(row) + 1]! += 1;
  for (let key = 1; key < start.length; key++) start[key]! += start[key - 1]!;
  const sorted = new Uint32Array(order.length);
  for (const row of order) sorted[start[keyOf(row)]!++] = row;
  return sorted;
}

/** Starts of runs of rows that agree in all labels, one past the end last. */
function runs(order: Uint32Array, labels: readonly Labels[], eachRow: boolean): Uint32Array {
  const starts: number[] = [];
  for (let place = 0; place < order.length; place++) {
    const [row, previous] = [order[place]!, order[place - 1]];
    const isNew = previous === undefined || eachRow || labels.some((level) => level.labels[row] !== level.labels[previous]);
    if (isNew) starts.push(place);
  }
  return Uint32Array.from([...starts, order.length]);
}

/** For runs within coarser runs: index of the first finer run of each coarser one, one past the last at the end. */
function nest(coarse: Uint32Array, fine: Uint32Array): Uint32Array {
  const indexOf = new Map(Array.from(fine, (start, i) => [start, i]));
  return coarse.map((start) => indexOf.get(start)!);
}

/** Lays respondents out so that each stratum, PSU and second-stage unit is one run of rows. PSU labels count within their stratum. */
export function computeLayout({ rows, strata, stages, populations }: LayoutInput): Layout {
  const levels = [...(strata ? [strata] : []), ...stages];
  let order: Uint32Array = Uint32Array.from({ length: rows }, (_, row) => row);
  for (const { labels, count } of [...levels].reverse()) order = sortBy(order, labels, count);
  const [first] = stages;
  const psuRows = runs(order, [...(strata ? [strata] : []), ...(first ? [first] : [])], first === undefined);
  const stratumRows = strata ? runs(order, [strata], false) : Uint32Array.from([0, rows]);
  const [stratumSizes, psuSizes] = populations;
  const layout: Layout = {
    order,
    psuStart: psuRows,
    stratumStart: nest(stratumRows, psuRows),
    stratumPopulation: stratumSizes
      ? Float64Array.from(stratumRows.subarray(0, -1), (place) => stratumSizes[order[place]!]!)
      : null,
    unitStart: null,
    psuUnitStart: null,
    psuPopulation: null,
  };
  if (!psuSizes || first === undefined) return layout;
  const unitRows = runs(order, levels, stages.length < 2);
  return {
    ...layout,
    unitStart: unitRows,
    psuUnitStart: nest(psuRows, unitRows),
    psuPopulation: Float64Array.from(psuRows.subarray(0, -1), (place) => psuSizes[order[place]!]!),
  };
}
