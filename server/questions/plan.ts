/** A question made ready for a worker: names resolved to columns, codes to positions. Plain data, so that it can be posted. */
export interface Plan {
  /** Variables to have at hand, by name. */
  columns: string[];
  among: Test | null;
  outcome: OutcomePlan;
  /** Down first, then across. */
  axes: AxisPlan[];
  /** What figures are standardised for, one weight for each of its values. */
  standard: { axis: AxisPlan; weights: number[] } | null;
  /** What figures are adjusted for. */
  covariates: AxisPlan[];
  /** Of a numeric outcome; null for its mean. */
  quantile: number | null;
}

/** Truth of a row as Kleene's logic has it. */
export const FALSE = 0;
export const TRUE = 1;
export const UNKNOWN = 2;

/** A rule over columns. */
export type Test =
  | { kind: "all" | "any"; tests: Test[] }
  | { kind: "not"; test: Test }
  /** Truth of each category's position; a position past the end is a missing value. */
  | { kind: "codes"; column: string; truth: Uint8Array }
  /** Both ends in; `missing` are the variable's missing codes as numbers. */
  | { kind: "range"; column: string; low: number; high: number; missing: number[] }
  | { kind: "numbers"; column: string; values: number[]; missing: number[] };

export type OutcomePlan = { measure: "share"; test: Test } | { measure: "mean"; source: NumberSource };

/** Where a number comes from: a numeric column, or the numbers that a categorical variable's codes spell (NaN is missing). */
export type NumberSource =
  { kind: "number"; column: string; missing: number[] } | { kind: "codes"; column: string; values: Float64Array };

/** One grouping. Value indexes run from 0; −1 is none of them. */
export type AxisPlan = { values: number } & (
  | { kind: "codes"; column: string; group: Int32Array }
  | { kind: "bands"; source: NumberSource; bands: [low: number, high: number][] }
);
