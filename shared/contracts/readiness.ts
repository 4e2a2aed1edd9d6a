import { z } from "zod";

/** A finding of a release's checks. A `fault` blocks publication; a `remark` is to be known. */
export const ReadinessFinding = z.strictObject({
  kind: z.string(),
  severity: z.enum(["fault", "remark"]),
  message: z.string(),
  /** How to mend a fault. */
  remedy: z.string().nullable(),
  count: z.number().int().nullable(),
});
export type ReadinessFinding = z.infer<typeof ReadinessFinding>;

/** `GET /api/releases/:id/readiness`, for stewards. */
export const ReadinessView = z.strictObject({
  releaseId: z.uuid(),
  respondents: z.number().int(),
  sumOfWeights: z.number().nullable(),
  strata: z.number().int(),
  psus: z.number().int(),
  degreesOfFreedom: z.number().int(),
  lonelyPsus: z.number().int(),
  weight: z
    .strictObject({
      minimum: z.number(),
      median: z.number(),
      maximum: z.number(),
      /** n Σw² / (Σw)², Kish 1965. */
      kishEffect: z.number(),
      zero: z.number().int(),
      histogram: z.array(z.strictObject({ from: z.number(), to: z.number(), respondents: z.number().int() })),
    })
    .nullable(),
  missing: z.array(z.strictObject({ variable: z.string(), label: z.string(), share: z.number() })),
  findings: z.array(ReadinessFinding),
  can: z.strictObject({ publish: z.boolean() }),
});
export type ReadinessView = z.infer<typeof ReadinessView>;
