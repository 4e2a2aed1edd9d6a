import { adjustSize, kornGraubard } from "./intervals.ts";

/** Whether a figure can be read. An unreliable one is not shown to planners. */
export type Verdict = "reliable" | "caution" | "unreliable";

/** A verdict with its reasons in plain words; a reliable share may carry a footnote about its complement. */
export interface Reliability {
  verdict: Verdict;
  reasons: string[];
}

/** What the verdict on a share rests on. */
export interface ShareEvidence {
  estimate: number | null;
  se: number | null;
  respondents: number;
  /** Respondents with the outcome; null where not known, as for a standardised share. */
  affectedRespondents: number | null;
  df: number;
  /** n/deff before any adjustment for degrees of freedom; n at a share of 0 or 1. */
  effectiveBeforeAdjustment: number | null;
}

const FEWEST_RESPONDENTS = 30;
const WIDEST_POINTS = 30;
const NARROW_POINTS = 5;
const WIDEST_RELATIVE_PERCENT = 130;
const FEWEST_DF = 8;
const NEARLY = 1e-12;

/**
 * Verdict on a share after the presentation standards for proportions of the US National Center for Health Statistics,
 * always on the 95 % Korn–Graubard interval, with widths compared after rounding to 0.1 as the Center's own macro does.
 * What it suppresses is unreliable here, what it sends to statistical review is to be read with caution.
 *
 * @see Parker, Talih, Malec et al. (2017), Vital and Health Statistics, Series 2, No. 175. The step on one event is from
 *   the report's text; its macro flags shares of 0 and 1 alone.
 */
export function reliabilityOfShare(evidence: ShareEvidence): Reliability {
  const { estimate: p, se, respondents: n, df, effectiveBeforeAdjustment: effective } = evidence;
  if (p === null || n === 0) return unreliable("no respondents");
  if (se === null || effective === null) return unreliable("no standard error can be computed");
  const isExtreme = p < NEARLY || p > 1 - NEARLY;
  const failures: string[] = [];
  if (n < FEWEST_RESPONDENTS) failures.push("fewer than 30 respondents");
  else if (effective < FEWEST_RESPONDENTS) failures.push("effective sample size under 30");
  const size = isExtreme ? n : df < 1 ? null : n < 2 ? n : adjustSize(effective, n, df, 95);
  const { low, high } = kornGraubard(p < NEARLY ? 0 : p > 1 - NEARLY ? 1 : p, size, 95);
  if (low === null || high === null) {
    return { verdict: "unreliable", reasons: [...failures, "too few sampling units for an interval"] };
  }
  const width = high - low;
  const points = toTenth(100 * width);
  if (points >= WIDEST_POINTS) failures.push("interval 30 points wide or wider");
  const isWide = (share: number) =>
    points > NARROW_POINTS && share >= NEARLY && toTenth((100 * width) / share) > WIDEST_RELATIVE_PERCENT;
  if (isWide(p)) failures.push("interval wider than 130 % of the estimate");
  if (failures.length > 0) return { verdict: "unreliable", reasons: failures };
  const doubts = reviewReasons(evidence, p);
  if (df < FEWEST_DF) doubts.push("fewer than 8 degrees of freedom");
  if (doubts.length > 0) return { verdict: "caution", reasons: doubts };
  const footnote = isWide(1 - p) ? ["the share without the outcome may be unreliable"] : [];
  return { verdict: "reliable", reasons: footnote };
}

function reviewReasons({ affectedRespondents: affected, respondents }: ShareEvidence, p: number): string[] {
  if (affected === 0 || p < NEARLY) return ["no respondent has the outcome"];
  if (affected === respondents || p > 1 - NEARLY) return ["every respondent has the outcome"];
  if (affected === 1) return ["only one respondent has the outcome"];
  if (affected !== null && affected === respondents - 1) return ["only one respondent is without the outcome"];
  return [];
}

/** What the verdict on a mean rests on. */
export interface MeanEvidence {
  estimate: number | null;
  se: number | null;
  respondents: number;
  df: number;
}

/**
 * Verdict on a mean: unreliable with fewer than 30 respondents or a relative standard error above 50 %, caution above
 * 30 % or with fewer than 8 degrees of freedom. These limits are common practice; no source sets them for means.
 */
export function reliabilityOfMean({ estimate, se, respondents, df }: MeanEvidence): Reliability {
  if (estimate === null || respondents === 0) return unreliable("no respondents");
  if (se === null) return unreliable("no standard error can be computed");
  if (df < 1) return unreliable("too few sampling units for an interval");
  const relative = estimate === 0 ? (se === 0 ? 0 : Infinity) : se / Math.abs(estimate);
  const failures: string[] = [];
  if (respondents < FEWEST_RESPONDENTS) failures.push("fewer than 30 respondents");
  if (relative > 0.5) failures.push("standard error above 50 % of the estimate");
  if (failures.length > 0) return { verdict: "unreliable", reasons: failures };
  const doubts: string[] = [];
  if (relative > 0.3) doubts.push("standard error above 30 % of the estimate");
  if (df < FEWEST_DF) doubts.push("fewer than 8 degrees of freedom");
  return { verdict: doubts.length > 0 ? "caution" : "reliable", reasons: doubts };
}

function unreliable(reason: string): Reliability {
  return { verdict: "unreliable", reasons: [reason] };
}

function toTenth(percent: number): number {
  return Math.round(percent * 10) / 10;
}
