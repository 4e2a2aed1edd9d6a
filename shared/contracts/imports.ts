import { z } from "zod";

/**
 * `POST /api/surveys/:id/releases` is multipart: field `wave` (text), file `microdata` (CSV), optional file
 * `codebook` (CSV). It answers 202 with an ImportView once both files are on disk; follow it with
 * `GET /api/imports/:id`, cancel it with `DELETE /api/imports/:id`.
 */
export const WaveName = z.string().trim().min(1, "Name the wave, such as 2025.").max(60);

export const ImportStatus = z.enum(["queued", "running", "done", "failed", "cancelled"]);

/** One kind of trouble in the files: how often it occurs and where first. */
export const ImportProblem = z.strictObject({
  /** Stable name of the kind, such as `ragged-row`. */
  kind: z.string(),
  /** `error` stops the import; `warning` is reported and the import goes on. */
  severity: z.enum(["error", "warning"]),
  file: z.enum(["microdata", "codebook"]),
  /** What is wrong and what to do next, as a sentence. */
  message: z.string(),
  count: z.number().int(),
  /** The first few places. `line` counts from 1 with the header as line 1; `column` is a variable's name, or a position counted from 1 where no name is known. */
  first: z.array(
    z.strictObject({ line: z.number().int().nullable(), column: z.string().nullable(), value: z.string().nullable() }),
  ),
});
export type ImportProblem = z.infer<typeof ImportProblem>;

export const ImportView = z.strictObject({
  id: z.uuid(),
  surveyId: z.uuid(),
  releaseId: z.uuid().nullable(),
  wave: z.string(),
  status: ImportStatus,
  /** What is being done now, in words. */
  stage: z.string(),
  bytesDone: z.number(),
  bytesTotal: z.number(),
  rows: z.number().int(),
  problems: z.array(ImportProblem),
  startedAt: z.iso.datetime(),
  endedAt: z.iso.datetime().nullable(),
  can: z.strictObject({ cancel: z.boolean() }),
});
export type ImportView = z.infer<typeof ImportView>;
