import { z } from "zod";
import { VariableName } from "../rules.ts";

/** What a stratum with a single PSU adds to a variance (STATISTICS: lonely PSU). */
export const LonelyRule = z.enum(["centred", "certainty", "average", "refuse"]);
export type LonelyRule = z.infer<typeof LonelyRule>;

/** Replicate weights given with the data instead of strata and PSUs. */
export const ReplicateMethod = z.enum(["BRR", "Fay", "JK1", "JKn", "bootstrap", "other"]);
export const ReplicateInput = z.strictObject({
  /** First and last column, such as `repwt1–repwt80` (en dash, hyphen or "to"), or a stem with an asterisk, such as `repwt*`. */
  pattern: z.string().trim().min(1).max(200),
  method: ReplicateMethod,
  /** Fay's factor, 0 to below 1; only for Fay. */
  fay: z.number().min(0).lt(1).nullable().default(null),
  /** The a in a·Σ aᵣ(θᵣ − θ₀)²; null takes the method's own. */
  scale: z.number().positive().nullable().default(null),
  /** The aᵣ, one for all or one for each; null is 1. */
  replicateScales: z
    .union([z.number().nonnegative(), z.array(z.number().nonnegative()).min(1).max(5000)])
    .nullable()
    .default(null),
  /** Deviations from the full-sample estimate (true) or from the replicates' mean (false). */
  mse: z.boolean().default(true),
  /** Null takes replicates − 1. */
  degreesOfFreedom: z.number().int().positive().nullable().default(null),
});
export type ReplicateInput = z.infer<typeof ReplicateInput>;

/** Below any of these a cell is withheld. */
export const DisclosureMinimums = z.strictObject({
  respondents: z.number().int().min(0).max(1000),
  affected: z.number().int().min(0).max(1000),
  unaffected: z.number().int().min(0).max(1000),
});
export type DisclosureMinimums = z.infer<typeof DisclosureMinimums>;

/** `PUT /api/releases/:id/design`: the whole design; a second PUT replaces the first. */
export const DesignInput = z.strictObject({
  /** Null: every respondent weighs 1. */
  weight: VariableName.nullable().default(null),
  strata: VariableName.nullable().default(null),
  /** One name, or one for each stage from the first on. */
  psu: z
    .union([VariableName, z.array(VariableName).min(1).max(2)])
    .nullable()
    .default(null),
  /** False: the same PSU label in two strata means two PSUs. True: labels are unique, so the same label in two strata is a fault. */
  psuLabelsAreUnique: z.boolean().default(false),
  /** Population size of each stage's stratum or PSU, for the finite population correction. */
  populationSize: z
    .union([VariableName, z.array(VariableName).min(1).max(2)])
    .nullable()
    .default(null),
  lonely: LonelyRule.default("centred"),
  replicates: ReplicateInput.nullable().default(null),
  minimums: DisclosureMinimums.default({ respondents: 10, affected: 3, unaffected: 3 }),
});
export type DesignInput = z.input<typeof DesignInput>;
export type Design = z.output<typeof DesignInput>;

/** `GET /api/releases/:id/design`; `design` is null until one is declared. */
export const DesignView = z.strictObject({
  releaseId: z.uuid(),
  design: DesignInput.nullable(),
  /** The installation's floor; no release may go below it. */
  floor: DisclosureMinimums,
  can: z.strictObject({ update: z.boolean() }),
});
export type DesignView = z.infer<typeof DesignView>;
