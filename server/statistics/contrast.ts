import { studentCritical, studentQuantile, studentTwoSidedP } from "./distributions.ts";
import { adjustSize, intervalFor, kornGraubard, type Level, moverInterval, type Side } from "./intervals.ts";
import type { ContrastVariances } from "./moments.ts";

/** Two targets compared. A null is a quantity that does not exist here: a ratio to 0, a test without a standard error. */
export interface ContrastEstimate {
  /** The compared-with estimate or fixed value. */
  reference: number | null;
  difference: number | null;
  se: number | null;
  /** Limits by the method asked for. */
  low: number | null;
  high: number | null;
  df: number | null;
  /** Two-sided t test of no difference. */
  p: number | null;
  covariance: number | null;
  correlation: number | null;
  ratio: number | null;
  logRatioSe: number | null;
  ratioLow: number | null;
  ratioHigh: number | null;
  oddsRatio: number | null;
  logOddsRatioSe: number | null;
  oddsRatioLow: number | null;
  oddsRatioHigh: number | null;
  moverLow: number | null;
  moverHigh: number | null;
  /** The true difference that this design would have found significant four times in five. */
  detectable: number | null;
}

/** One side of a contrast; a fixed value has no variance. */
export interface ContrastSide {
  estimate: number | null;
  variance: number | null;
  respondents: number;
  df: number;
  isFixed: boolean;
  /** Effective size before any adjustment, where it is not p(1 − p)/V: an age-adjusted share's. */
  effective?: number;
}

const POWER = 0.8;

/** Puts a contrast together from both sides and what varies between them. */
export function compareSides(
  of: ContrastSide,
  from: ContrastSide,
  variances: ContrastVariances,
  df: number,
  options: { level: Level; difference: "linear" | "mover"; isBinary: boolean },
): ContrastEstimate {
  const p = of.estimate;
  const q = from.estimate;
  if (p === null || q === null) return { ...UNDEFINED, reference: q };
  const t = df >= 1 ? studentCritical(options.level, df) : null;
  const difference = p - q;
  const se = root(variances.difference);
  const linear = around(difference, se, t);
  const scale = Math.sqrt((of.variance ?? 0) * (from.variance ?? 0));
  const correlation = scale > 0 && variances.covariance !== null ? clamp(variances.covariance / scale) : null;
  const mover = moverLimits(of, from, correlation ?? 0, options);
  const ratio = q > 0 && p >= 0 ? finite(p / q) : null;
  const logRatioSe = ratio !== null && ratio > 0 ? root(variances.logRatio) : null;
  const ratioLimits = multiplied(ratio, logRatioSe, t);
  // Of a mean that lies between 0 and 1 the odds are defined too, though few would ask for them.
  const hasOdds = q > 0 && q < 1 && p >= 0 && p < 1;
  const oddsRatio = hasOdds ? finite(p / (1 - p) / (q / (1 - q))) : null;
  const logOddsRatioSe = oddsRatio !== null && oddsRatio > 0 ? root(variances.logOddsRatio) : null;
  const oddsLimits = multiplied(oddsRatio, logOddsRatioSe, t);
  const shown = options.difference === "mover" ? mover : linear;
  return {
    reference: q,
    difference,
    se,
    low: shown.low,
    high: shown.high,
    df,
    p: se !== null && se > 0 && t !== null ? studentTwoSidedP(difference / se, df) : null,
    covariance: variances.covariance,
    correlation,
    ratio,
    logRatioSe,
    ratioLow: ratioLimits.low,
    ratioHigh: ratioLimits.high,
    oddsRatio,
    logOddsRatioSe,
    oddsRatioLow: oddsLimits.low,
    oddsRatioHigh: oddsLimits.high,
    moverLow: mover.low,
    moverHigh: mover.high,
    detectable: se === null || t === null ? null : (t + studentQuantile(POWER, df)) * se,
  };
}

interface Limits {
  low: number | null;
  high: number | null;
}

const NO_LIMITS: Limits = { low: null, high: null };

const UNDEFINED: ContrastEstimate = {
  reference: null,
  difference: null,
  se: null,
  low: null,
  high: null,
  df: null,
  p: null,
  covariance: null,
  correlation: null,
  ratio: null,
  logRatioSe: null,
  ratioLow: null,
  ratioHigh: null,
  oddsRatio: null,
  logOddsRatioSe: null,
  oddsRatioLow: null,
  oddsRatioHigh: null,
  moverLow: null,
  moverHigh: null,
  detectable: null,
};

function around(centre: number, se: number | null, t: number | null): Limits {
  return se === null || t === null ? NO_LIMITS : { low: centre - t * se, high: centre + t * se };
}

function multiplied(ratio: number | null, logSe: number | null, t: number | null): Limits {
  if (ratio === null || logSe === null || t === null) return NO_LIMITS;
  const reach = Math.exp(t * logSe);
  return Number.isFinite(reach) ? { low: ratio / reach, high: ratio * reach } : NO_LIMITS;
}

/** Each side's own Korn–Graubard limits (linear ones for a mean), recombined. */
function moverLimits(
  of: ContrastSide,
  from: ContrastSide,
  correlation: number,
  options: { level: Level; isBinary: boolean },
): Limits {
  const left = ownLimits(of, options);
  const right = ownLimits(from, options);
  return left === null || right === null ? NO_LIMITS : moverInterval(left, right, correlation);
}

function ownLimits(side: ContrastSide, options: { level: Level; isBinary: boolean }): Side | null {
  const { estimate } = side;
  if (estimate === null) return null;
  if (side.isFixed) return { estimate, low: estimate, high: estimate };
  const { level } = options;
  if (options.isBinary && side.effective !== undefined && side.df >= 1 && side.respondents > 1) {
    const isEdge = estimate <= 0 || estimate >= 1;
    const size = isEdge ? side.respondents : adjustSize(side.effective, side.respondents, side.df, level);
    const own = kornGraubard(estimate, size, level);
    return own.low === null || own.high === null ? null : { estimate, low: own.low, high: own.high };
  }
  const { low, high } = intervalFor("korn-graubard", {
    ...options,
    estimate,
    se: root(side.variance),
    n: side.respondents,
    df: side.df,
  });
  return low === null || high === null ? null : { estimate, low, high };
}

function root(variance: number | null): number | null {
  return variance === null ? null : finite(Math.sqrt(Math.max(0, variance)));
}

/** Beside a reference next to 0 a ratio can exceed every number: then it does not exist here. */
function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

function clamp(correlation: number): number {
  return Math.max(-1, Math.min(1, correlation));
}
