import { z } from "zod";

/** What the API answers when it can't do what was asked (RFC 9457, "Problem Details for HTTP APIs"). */
export const Problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  /** What happened, what is untouched, and what to do next. */
  detail: z.string(),
  /** For a form: field path (dots between levels) to what is wrong with it. */
  fields: z.record(z.string(), z.string()).optional(),
});
export type Problem = z.infer<typeof Problem>;
