import { z } from "zod";
import { OverallKind, Question } from "./questions.ts";

/** Can the figure be read? NCHS presentation standards for proportions (Series 2 no. 175) and their kin for means. */
export const Verdict = z.enum(["reliable", "caution", "unreliable"]);
export type Verdict = z.infer<typeof Verdict>;
export const Reliability = z.strictObject({ verdict: Verdict, reasons: z.array(z.string()) });
export type Reliability = z.infer<typeof Reliability>;

/** What a cell is set against. Fractions, or the outcome's own units for a mean. Null where undefined. */
export const ComparisonResult = z.strictObject({
  /** Estimate of what it is compared with. */
  reference: z.number().nullable(),
  difference: z.number().nullable(),
  se: z.number().nullable(),
  low: z.number().nullable(),
  high: z.number().nullable(),
  df: z.number().nullable(),
  p: z.number().nullable(),
  /** Adjusted over the table's family; equals `p` when no adjustment was asked for. */
  pAdjusted: z.number().nullable(),
  ratio: z.number().nullable(),
  ratioLow: z.number().nullable(),
  ratioHigh: z.number().nullable(),
  /** Null for a mean. */
  oddsRatio: z.number().nullable(),
  oddsRatioLow: z.number().nullable(),
  oddsRatioHigh: z.number().nullable(),
  /** Smallest true difference found with 80 % power at the question's level. */
  detectable: z.number().nullable(),
  /** `higher` or `lower` when the adjusted p is below 1 − level; otherwise `none`: no difference shown. */
  direction: z.enum(["higher", "lower", "none"]),
});
export type ComparisonResult = z.infer<typeof ComparisonResult>;

/** Code of each breakdown in order, down then across; null stands for everyone (a margin). */
const Key = z.array(z.string().nullable());

export const ShownCell = z.strictObject({
  key: Key,
  shown: z.literal(true),
  respondents: z.number().int(),
  /** Null for a mean. */
  affectedRespondents: z.number().int().nullable(),
  people: z.number(),
  peopleSe: z.number().nullable(),
  /** Linear interval, never below 0; the same for those affected. */
  peopleLow: z.number().nullable(),
  peopleHigh: z.number().nullable(),
  affectedPeople: z.number().nullable(),
  affectedPeopleSe: z.number().nullable(),
  affectedPeopleLow: z.number().nullable(),
  affectedPeopleHigh: z.number().nullable(),
  estimate: z.number().nullable(),
  se: z.number().nullable(),
  low: z.number().nullable(),
  high: z.number().nullable(),
  df: z.number(),
  deff: z.number().nullable(),
  effectiveRespondents: z.number().nullable(),
  cv: z.number().nullable(),
  /** Whether the linear interval was cut off at 0 or 1. */
  clipped: z.boolean(),
  reliability: Reliability,
  comparison: ComparisonResult.optional(),
});
export type ShownCell = z.infer<typeof ShownCell>;

/** `too-few`: under the release's minimums; `protects-another`: would give a withheld cell away; `unreliable`: not shown to planners; `empty`: nobody there. */
export const WithheldReason = z.enum(["too-few", "protects-another", "unreliable", "empty"]);
export type WithheldReason = z.infer<typeof WithheldReason>;
export const WithheldCell = z.strictObject({ key: Key, shown: z.literal(false), reason: WithheldReason });
export type WithheldCell = z.infer<typeof WithheldCell>;

export const Cell = z.discriminatedUnion("shown", [ShownCell, WithheldCell]);
export type Cell = z.infer<typeof Cell>;

/** Something said of the table as a whole; null where undefined. */
export const OverallResult = z.strictObject({
  kind: OverallKind,
  title: z.string(),
  /** What it means, as a sentence. */
  meaning: z.string(),
  figures: z.array(
    z.strictObject({
      name: z.string(),
      /** `points`: a difference of shares; `value`: in the outcome's own units; `ratio` and `number` have none. */
      unit: z.enum(["share", "points", "value", "ratio", "number"]),
      estimate: z.number().nullable(),
      se: z.number().nullable(),
      low: z.number().nullable(),
      high: z.number().nullable(),
    }),
  ),
  p: z.number().nullable(),
  /** Denominator's degrees of freedom. */
  df: z.number().nullable(),
});
export type OverallResult = z.infer<typeof OverallResult>;

export const Table = z.strictObject({
  question: Question,
  release: z.strictObject({
    id: z.uuid(),
    surveyId: z.uuid(),
    surveyTitle: z.string(),
    wave: z.string(),
    checksum: z.string(),
    designDf: z.number(),
  }),
  /** The release that groups are compared with, where they are compared with one. */
  compared: z.strictObject({ id: z.uuid(), wave: z.string() }).nullable(),
  engine: z.string(),
  /** Whether estimates are fractions of people or a mean in the variable's units. */
  measure: z.enum(["share", "mean"]),
  breakdowns: z.array(
    z.strictObject({
      name: z.string(),
      label: z.string(),
      axis: z.enum(["down", "across"]),
      values: z.array(z.strictObject({ code: z.string(), label: z.string() })),
    }),
  ),
  whole: Cell,
  /** Every combination of values, first breakdown slowest. */
  cells: z.array(Cell),
  /** Subtotals: a run of leading down values by a run of leading across values, null for the rest. */
  margins: z.array(Cell),
  overall: z.array(OverallResult),
  /** Comparisons the p-values are adjusted over. */
  familySize: z.number().int(),
  /** Question, source, method and cautions as sentences; every export carries them. */
  caption: z.string(),
  notes: z.array(z.string()),
});
export type Table = z.infer<typeof Table>;

/** `POST /api/tables/script`: a script in R that works the table out again; null for kinds of questions without one yet. */
export const ScriptView = z.strictObject({ script: z.string().nullable() });
export type ScriptView = z.infer<typeof ScriptView>;
