import { z } from "zod";
import { Code, VariableName } from "../rules.ts";

/** How a variable is measured. Text is kept but can't be tabulated; it may name strata or PSUs. */
export const VariableKind = z.enum(["categorical", "numeric", "text"]);
export type VariableKind = z.infer<typeof VariableKind>;

export const Category = z.strictObject({
  code: Code,
  label: z.string().max(400),
  isMissing: z.boolean(),
  /** Unweighted respondents with this code; shown to stewards only, null to others. */
  respondents: z.number().int().nullable(),
});
export type Category = z.infer<typeof Category>;

/** A variable as readers see it. `categories` of a numeric variable are its named codes, such as 999 "refused". */
export const VariableView = z.strictObject({
  id: z.uuid(),
  name: VariableName,
  label: z.string(),
  kind: VariableKind,
  categories: z.array(Category),
  /** Share of respondents without a value or with a missing code, 0 to 1. */
  missingShare: z.number(),
  /** Of a numeric variable, missing codes left out; null where there is none, or the reader isn't a steward. */
  minimum: z.number().nullable(),
  maximum: z.number().nullable(),
  /** Whether every number seen is whole; what band presets go by. */
  isWhole: z.boolean(),
  /** Distinct values seen, counted up to 100,000; stewards choose design variables by it. */
  distinct: z.number().int(),
});
export type VariableView = z.infer<typeof VariableView>;

/** `GET /api/releases/:id/codebook`. */
export const CodebookView = z.strictObject({
  releaseId: z.uuid(),
  respondents: z.number().int(),
  /** The design's variables, left out of an ask. */
  designVariables: z.array(z.string()),
  variables: z.array(VariableView),
  can: z.strictObject({ update: z.boolean() }),
});
export type CodebookView = z.infer<typeof CodebookView>;

/** `PATCH /api/releases/:id/codebook/:variableId`, for a draft. Categories not named keep what they have. */
export const VariableChange = z.strictObject({
  label: z.string().trim().max(400).optional(),
  kind: VariableKind.optional(),
  categories: z
    .array(z.strictObject({ code: Code, label: z.string().trim().max(400), isMissing: z.boolean() }))
    .max(5000)
    .optional(),
});
export type VariableChange = z.infer<typeof VariableChange>;
