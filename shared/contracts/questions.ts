import { z } from "zod";
import { Code, Rule, VariableName } from "../rules.ts";

const BandEnd = z.number().nullable();
/** `[from, to, label]`, both ends in, null open. A value belongs to the first band that holds it. */
export const Band = z
  .tuple([BandEnd, BandEnd, z.string().trim().min(1).max(60)])
  .refine(([from, to]) => from !== null || to !== null, "A band needs at least one end.")
  .refine(([from, to]) => from === null || to === null || from <= to, "A band's low end is above its high end.");
export type Band = z.infer<typeof Band>;

/** One grouping of a table: a categorical variable's categories, or a numeric variable's bands (codes "1", "2", … in order). */
export const Breakdown = z.strictObject({ variable: VariableName, bands: z.array(Band).min(1).max(40).optional() });
export type Breakdown = z.infer<typeof Breakdown>;

/** `{rule}`: the share for whom the rule holds; `{variable}`: the mean of a numeric variable, or one of its quantiles (0.5 is the median). */
export const Outcome = z.union([
  z.strictObject({ rule: Rule }),
  z.strictObject({ variable: VariableName, quantile: z.number().gt(0).lt(1).optional() }),
]);
export type Outcome = z.infer<typeof Outcome>;

export const Comparison = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("none") }),
  z.strictObject({ kind: z.literal("rest") }),
  z.strictObject({ kind: z.literal("all") }),
  z.strictObject({ kind: z.literal("group"), breakdown: VariableName, value: Code }),
  z.strictObject({ kind: z.literal("target"), value: z.number() }),
  /** The same group in another release of the same survey, drawn independently. */
  z.strictObject({ kind: z.literal("release"), releaseId: z.uuid() }),
]);
export type Comparison = z.infer<typeof Comparison>;

export const Level = z.union([z.literal(90), z.literal(95), z.literal(99)]);
export const IntervalMethod = z.enum(["korn-graubard", "logit", "wilson", "linear"]);
export const DifferenceMethod = z.enum(["linear", "mover"]);
export const Adjustment = z.enum(["none", "holm", "benjamini-hochberg"]);

/**
 * Direct standardisation: every group's figure as it would be with the same make-up by this variable. Weights are a published
 * standard's, for bands of whole years of age, or one's own, one for each band or category in order.
 */
export const Standardisation = z.strictObject({
  variable: VariableName,
  bands: z.array(Band).min(2).max(40).optional(),
  weights: z.union([
    z.strictObject({ standard: z.string().max(40) }),
    z.strictObject({ own: z.array(z.number().nonnegative()).min(2).max(40) }),
  ]),
});
export type Standardisation = z.infer<typeof Standardisation>;

/** What is said of a table as a whole. All but `association` need a single breakdown; `attributable` a reference group. */
export const OVERALL_KINDS = ["association", "trend", "inequality", "attributable"] as const;
export const OverallKind = z.enum(OVERALL_KINDS);
export type OverallKind = z.infer<typeof OverallKind>;

/** A question as it is put, kept in the address and exported. `POST /api/tables` takes it and answers a Table. */
export const Question = z
  .strictObject({
    releaseId: z.uuid(),
    outcome: Outcome,
    among: Rule.optional(),
    down: z.array(Breakdown).max(3).default([]),
    across: z.array(Breakdown).max(2).default([]),
    comparison: Comparison.default({ kind: "none" }),
    level: Level.default(95),
    interval: IntervalMethod.default("korn-graubard"),
    difference: DifferenceMethod.default("linear"),
    adjustment: Adjustment.default("none"),
    standardise: Standardisation.optional(),
    /** Predictive margins of a regression on the groups and these. */
    adjustFor: z.array(Breakdown).max(5).default([]),
    overall: z.array(OverallKind).max(4).default([]),
  })
  .superRefine((question, context) => {
    const names = [...question.down, ...question.across].map((breakdown) => breakdown.variable);
    if (new Set(names).size < names.length) {
      context.addIssue({ code: "custom", path: ["down"], message: "Each variable can split the table only once." });
    }
    const issue = (path: string[], message: string) => context.addIssue({ code: "custom", path, message });
    const { standardise, adjustFor, comparison, outcome } = question;
    if (comparison.kind === "release" && comparison.releaseId === question.releaseId)
      issue(["comparison", "releaseId"], "Compare with another release than the one asked of.");
    if (standardise && names.includes(standardise.variable))
      issue(["standardise", "variable"], "A table can't be split by what it is standardised for.");
    if (adjustFor.some(({ variable }) => names.includes(variable)))
      issue(["adjustFor"], "A table can't be split by what it is adjusted for.");
    if (new Set(adjustFor.map(({ variable }) => variable)).size < adjustFor.length)
      issue(["adjustFor"], "Adjust for each variable once.");
    if (standardise && adjustFor.length > 0) issue(["adjustFor"], "Standardise or adjust, not both at once.");
    if (adjustFor.length > 0 && ["rest", "all", "release"].includes(comparison.kind))
      issue(["comparison"], "Adjusted figures are compared with a reference group or a fixed value.");
    if (
      "variable" in outcome &&
      outcome.quantile !== undefined &&
      (standardise !== undefined || adjustFor.length > 0 || comparison.kind !== "none")
    )
      issue(
        ["outcome", "quantile"],
        "A median or another quantile stands by itself: without comparison, standardisation or adjustment.",
      );
    if (question.overall.some((kind) => kind !== "association") && names.length !== 1)
      issue(["overall"], "Trend, inequality and attributable risk need exactly one breakdown.");
    if (question.overall.includes("attributable") && comparison.kind !== "group")
      issue(["overall"], "Attributable risk needs a reference group to compare with.");
    if (question.comparison.kind === "group" && !names.includes(question.comparison.breakdown)) {
      context.addIssue({
        code: "custom",
        path: ["comparison", "breakdown"],
        message: "Compare with a group of one of the table's own breakdowns.",
      });
    }
  });
export type QuestionInput = z.input<typeof Question>;
export type Question = z.output<typeof Question>;
