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

/** `{rule}`: the share for whom the rule holds; `{variable}`: the mean of a numeric variable. */
export const Outcome = z.union([z.strictObject({ rule: Rule }), z.strictObject({ variable: VariableName })]);
export type Outcome = z.infer<typeof Outcome>;

export const Comparison = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("none") }),
  z.strictObject({ kind: z.literal("rest") }),
  z.strictObject({ kind: z.literal("all") }),
  z.strictObject({ kind: z.literal("group"), breakdown: VariableName, value: Code }),
  z.strictObject({ kind: z.literal("target"), value: z.number() }),
]);
export type Comparison = z.infer<typeof Comparison>;

export const Level = z.union([z.literal(90), z.literal(95), z.literal(99)]);
export const IntervalMethod = z.enum(["korn-graubard", "logit", "wilson", "linear"]);
export const DifferenceMethod = z.enum(["linear", "mover"]);
export const Adjustment = z.enum(["none", "holm", "benjamini-hochberg"]);

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
  })
  .superRefine((question, context) => {
    const names = [...question.down, ...question.across].map((breakdown) => breakdown.variable);
    if (new Set(names).size < names.length) {
      context.addIssue({ code: "custom", path: ["down"], message: "Each variable can split the table only once." });
    }
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
