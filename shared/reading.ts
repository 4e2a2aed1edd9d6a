import type { Comparison } from "./contracts/questions.ts";
import type { ShownCell, WithheldReason } from "./contracts/tables.ts";
import { figureDecimals, formatFigure, type FigureKind } from "./figures.ts";
import { formatNumber } from "./format.ts";

/** What the sentences about a cell need to know beside its figures. */
export interface ReadingContext {
  kind: FigureKind;
  /** Whom the cell is about, such as “people with Sex: Men”. */
  group: string;
  /** What is counted or averaged, such as “Smoking now: Daily”. */
  outcome: string;
  /** “mean”, “median”; of no use for a share. */
  average: string;
  /** What the figure is standardised or adjusted for, as a sentence; null where it is crude. */
  correction: string | null;
  comparison: Comparison;
  /** Whether p-values were adjusted for many comparisons. */
  isAdjusted: boolean;
  /** What the cell is compared with, such as “the rest”; null where nothing is. */
  reference: string | null;
}

/** Of how many people a share is told, so that it is told in whole people: 100 unless it is very small or very near all. */
export function naturalBase(share: number): number {
  const away = Math.min(share, 1 - share);
  if (away <= 0 || away >= 0.01) return 100;
  return away >= 0.001 ? 1000 : 10_000;
}

const whole = (share: number, base: number) => formatNumber(Math.round(share * base));

const span = (low: number | null, high: number | null, write: (value: number) => string) => {
  if (low === null || high === null) return "";
  return write(low) === write(high) ? "" : ` (${write(low)} to ${write(high)})`;
};

/** “Of every 100 people with Sex: Men, about 38 have Smoking now: Daily (34 to 43).” */
export function estimateSentence(cell: ShownCell, { kind, group, outcome, average }: ReadingContext): string {
  const { estimate, low, high } = cell;
  if (estimate === null) return `There is no estimate for ${group}.`;
  if (kind === "mean") {
    const decimals = figureDecimals(kind, low, high);
    const write = (value: number) => formatFigure(kind, value, decimals);
    return `Among ${group}, the ${average} of ${outcome} is about ${write(estimate)}${span(low, high, write)}.`;
  }
  const base = naturalBase(estimate);
  const write = (value: number) => whole(value, base);
  const count = estimate === 0 ? "none" : estimate === 1 ? "all" : `about ${write(estimate)}`;
  return `Of every ${formatNumber(base)} ${group}, ${count} ${count === "about 1" ? "has" : "have"} ${outcome}${span(low, high, write)}.`;
}

/** What standardising or adjusting makes of a figure; null where it is crude. */
export function correctionSentence({ correction }: ReadingContext): string | null {
  return correction === null
    ? null
    : `${correction} It says what the figure would be if groups were alike in that, not what it is.`;
}

/** A signed difference in words: “17 more”, “7 fewer”, “1.2 lower”, “as many”. */
function amount(difference: number, kind: FigureKind, base: number, decimals: number): string {
  const [more, fewer, same] = kind === "share" ? ["more", "fewer", "as many"] : ["higher", "lower", "the same"];
  const size = kind === "share" ? whole(Math.abs(difference), base) : formatFigure(kind, Math.abs(difference), decimals);
  return /[1-9]/.test(size) ? `${size} ${difference > 0 ? more : fewer}` : same;
}

/** Ends of a difference's interval: “13 to 22 more”, “7 to 16 fewer”, or “4 fewer to 6 more” where it spans nothing. */
function amountRange(low: number | null, high: number | null, write: (value: number) => string): string {
  if (low === null || high === null) return "";
  const [near, far] = low < 0 && high < 0 ? [write(high), write(low)] : [write(low), write(high)];
  const [size, word] = near.split(" ");
  return ` (${word === far.split(" ")[1] && low * high > 0 ? (size ?? "") : near} to ${far})`;
}

function referenceWords({ comparison, reference }: ReadingContext): string {
  if (comparison.kind === "target") return reference ?? "the target";
  return comparison.kind === "group" ? `people with ${reference ?? ""}` : (reference ?? "");
}

/** “That is 17 more than among everyone (13 to 22 more).”, or that no difference is shown and what could have been found. */
export function differenceSentences(cell: ShownCell, context: ReadingContext): string[] {
  const { comparison } = cell;
  if (!comparison || context.reference === null) return [];
  const { difference, low, high, reference, detectable, direction } = comparison;
  const words = referenceWords(context);
  const among = context.comparison.kind === "target" ? words : `among ${words}`;
  if (difference === null) return [`The difference from ${words} can't be worked out.`];
  const { kind } = context;
  const base = kind === "share" ? naturalBase(Math.min(cell.estimate ?? 0.5, reference ?? 0.5)) : 1;
  const per = kind === "share" && base !== 100 ? ` of every ${formatNumber(base)}` : "";
  const decimals = figureDecimals(kind, low, high);
  const write = (value: number) => amount(value, kind, base, decimals);
  const interval = amountRange(low, high, write);
  const size = write(difference);
  const than =
    size === "as many"
      ? `as many${per} as ${among}`
      : size === "the same"
        ? `the same as ${among}`
        : `${size}${per} than ${among}`;
  if (direction !== "none") return [`That is ${than}${interval}.`];
  const found =
    detectable === null
      ? []
      : [
          `A true difference of ${kind === "share" ? `${formatNumber(100 * detectable, 1)} points` : formatFigure(kind, detectable, figureDecimals(kind, 0, detectable))} or more would probably have been found; a smaller one may be there.`,
        ];
  return [
    `No difference from ${words} is shown${context.isAdjusted ? ", many comparisons allowed for" : ""}: ${than}${interval}.`,
    ...found,
  ];
}

/** Why a figure is withheld, in a few words for a cell. */
export const withheldWords: Record<WithheldReason, string> = {
  "too-few": "too few respondents",
  "protects-another": "would reveal another",
  unreliable: "too uncertain to show",
  empty: "nobody here",
};

/** Why a figure is withheld, and what it doesn't mean. */
export const withheldSentences: Record<WithheldReason, string> = {
  "too-few":
    "Too few people answered in this group, or too few were affected or unaffected, for the figure to be shown without a risk to them.",
  "protects-another": "This figure is withheld because another one could be worked out from it.",
  unreliable: "The figure is too uncertain to plan with, so it isn't shown in your role. An epidemiologist can see it.",
  empty: "Nobody in the survey belongs to this group and answered.",
};

/** “▲ +17.1” and what the mark means. */
export const directionMarks = {
  higher: { mark: "▲", word: "higher" },
  lower: { mark: "▼", word: "lower" },
  none: { mark: "○", word: "no difference shown" },
} as const;
