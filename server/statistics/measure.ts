import type { FunctionEstimate } from "./cellFunction.ts";
import { studentCritical } from "./distributions.ts";
import type { Level } from "./intervals.ts";

/** A value with its standard error and linear interval; null where undefined. */
export interface Measure {
  estimate: number | null;
  se: number | null;
  low: number | null;
  high: number | null;
}

/** One value of a function of cells as a measure; `df` below 1 leaves it without an interval. */
export function measure({ values, covariance }: FunctionEstimate, value: number, df: number, level: Level): Measure {
  const estimate = values[value]!;
  if (!Number.isFinite(estimate)) return { estimate: null, se: null, low: null, high: null };
  const variance = covariance(value, value);
  if (variance === null) return { estimate, se: null, low: null, high: null };
  const se = Math.sqrt(Math.max(0, variance));
  if (df < 1) return { estimate, se, low: null, high: null };
  const reach = studentCritical(level, df) * se;
  return { estimate, se, low: estimate - reach, high: estimate + reach };
}
