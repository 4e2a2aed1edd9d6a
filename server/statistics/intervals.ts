import { betaQuantile, studentCritical } from "./distributions.ts";

/** Confidence level in percent. */
export type Level = 90 | 95 | 99;

/** Ways to an interval for a share. A mean is always linear. */
export type IntervalMethod = "korn-graubard" | "logit" | "wilson" | "linear";

/** What an interval is made of. */
export interface IntervalInput {
  /** Share in [0, 1] or mean; null where the cell is empty. */
  estimate: number | null;
  /** Design-based standard error. */
  se: number | null;
  /** Unweighted respondents. */
  n: number;
  /** Design degrees of freedom; below 1 there is no interval, save Korn–Graubard's at a share of 0 or 1. */
  df: number;
  level: Level;
  isBinary: boolean;
}

/** Limits; null where the method is undefined. `clipped`: a linear limit lay outside [0, 1] and was drawn in. */
export interface Interval {
  low: number | null;
  high: number | null;
  clipped: boolean;
}

const UNDEFINED: Interval = { low: null, high: null, clipped: false };

/**
 * An interval of any method for one cell.
 *
 * Korn–Graubard takes Clopper–Pearson limits at the adjusted effective sample size; Wilson the score interval at the
 * unadjusted one; logit is undefined at 0 and 1. All use t, never the normal unless `df` is Infinity.
 *
 * @see Korn & Graubard (1998), Survey Methodology 24: 193-201. Wilson (1927), JASA 22: 209-212.
 */
export function intervalFor(method: IntervalMethod, input: IntervalInput): Interval {
  const { estimate, se, n, df, level, isBinary } = input;
  if (estimate === null || se === null || n === 0) return UNDEFINED;
  if (isBinary && method === "korn-graubard")
    return kornGraubard(estimate, adjustedEffectiveSize(estimate, se, n, df, level), level);
  if (df < 1) return UNDEFINED;
  const t = studentCritical(level, df);
  if (!isBinary) return { low: estimate - t * se, high: estimate + t * se, clipped: false };
  switch (method) {
    case "logit":
      return logit(estimate, se, t);
    case "wilson":
      return wilson(estimate, effectiveSize(estimate, se, n), t);
    default:
      return linear(estimate, se, t);
  }
}

/**
 * Number of respondents of a simple random sample that would give the share the same standard error, n/deff;
 * n itself where that is undefined (a share of 0 or 1, or no variance).
 */
export function effectiveSize(estimate: number, se: number, n: number): number {
  return se > 0 && estimate > 0 && estimate < 1 ? (estimate * (1 - estimate)) / (se * se) : n;
}

/**
 * Korn and Graubard's n*: the effective size times (t(n − 1) / t(df))², at most n. Null when `df` is below 1, unless
 * the share is 0 or 1, where n* is n.
 */
export function adjustedEffectiveSize(estimate: number, se: number, n: number, df: number, level: Level): number | null {
  if (estimate <= 0 || estimate >= 1) return n;
  if (df < 1) return null;
  if (n < 2) return n;
  return adjustSize(effectiveSize(estimate, se, n), n, df, level);
}

/** An effective size of whatever origin (an age-adjusted share's, say) times (t(n − 1) / t(df))², at most n. */
export function adjustSize(effective: number, n: number, df: number, level: Level): number {
  const ratio = studentCritical(level, n - 1) / studentCritical(level, df);
  return Math.min(n, effective * ratio * ratio);
}

/** Clopper–Pearson limits of a share at a sample size that need not be whole; undefined where the size is null. */
export function kornGraubard(estimate: number, size: number | null, level: Level): Interval {
  if (size === null) return UNDEFINED;
  const tail = (100 - level) / 200;
  const events = size * estimate;
  return {
    low: estimate <= 0 ? 0 : betaQuantile(tail, events, size - events + 1),
    high: estimate >= 1 ? 1 : betaQuantile(1 - tail, events + 1, size - events),
    clipped: false,
  };
}

function logit(estimate: number, se: number, t: number): Interval {
  if (estimate <= 0 || estimate >= 1) return UNDEFINED;
  const centre = Math.log(estimate / (1 - estimate));
  const half = (t * se) / (estimate * (1 - estimate));
  const back = (x: number) => 1 / (1 + Math.exp(-x));
  return { low: back(centre - half), high: back(centre + half), clipped: false };
}

function wilson(estimate: number, size: number, t: number): Interval {
  const square = (t * t) / size;
  const centre = (estimate + square / 2) / (1 + square);
  const half = (t / (1 + square)) * Math.sqrt((estimate * (1 - estimate)) / size + square / (4 * size));
  return {
    low: estimate <= 0 ? 0 : Math.max(0, centre - half),
    high: estimate >= 1 ? 1 : Math.min(1, centre + half),
    clipped: false,
  };
}

function linear(estimate: number, se: number, t: number): Interval {
  const low = estimate - t * se;
  const high = estimate + t * se;
  return { low: Math.max(0, low), high: Math.min(1, high), clipped: low < 0 || high > 1 };
}

/** One side of a difference for {@link moverInterval}. */
export interface Side {
  estimate: number;
  low: number;
  high: number;
}

/**
 * Interval of a difference from both sides' own limits (MOVER, the method of variance estimates recovery). With Wilson
 * limits and no correlation it is Newcombe's method 10.
 *
 * @param correlation Of the two estimates.
 * @see Zou & Donner (2008), Statistics in Medicine 27: 1693-1702. Newcombe (1998), Statistics in Medicine 17: 873-890.
 */
export function moverInterval(of: Side, from: Side, correlation: number): { low: number; high: number } {
  const difference = of.estimate - from.estimate;
  const reach = (left: number, right: number) =>
    Math.sqrt(Math.max(0, left * left + right * right - 2 * correlation * left * right));
  return {
    low: difference - reach(of.estimate - of.low, from.high - from.estimate),
    high: difference + reach(of.high - of.estimate, from.estimate - from.low),
  };
}
