import { z } from "zod";

/** Life of a release: draft → published → superseded or withdrawn. */
export const ReleaseStatus = z.enum(["draft", "published", "superseded", "withdrawn"]);
export type ReleaseStatus = z.infer<typeof ReleaseStatus>;

/** `POST /api/surveys`; whoever creates a survey becomes its steward. */
export const SurveyInput = z.strictObject({
  title: z.string().trim().min(1, "Give the survey a title.").max(160),
  description: z.string().trim().max(4000).default(""),
});
export type SurveyInput = z.input<typeof SurveyInput>;

export const ReleaseSummary = z.strictObject({
  id: z.uuid(),
  surveyId: z.uuid(),
  /** What tells this release from its siblings, such as "2025". */
  wave: z.string(),
  status: ReleaseStatus,
  /** Rows of the microdata; null until an import has finished. */
  respondents: z.number().int().nullable(),
  variables: z.number().int(),
  hasDesign: z.boolean(),
  createdAt: z.iso.datetime(),
  publishedAt: z.iso.datetime().nullable(),
  /** The import that is running or ended last; null for a release that the demo loaded. */
  importId: z.uuid().nullable(),
  can: z.strictObject({ import: z.boolean(), design: z.boolean(), publish: z.boolean(), ask: z.boolean(), remove: z.boolean() }),
});
export type ReleaseSummary = z.infer<typeof ReleaseSummary>;

export const SurveyView = z.strictObject({
  id: z.uuid(),
  title: z.string(),
  description: z.string(),
  stewards: z.array(z.strictObject({ id: z.uuid(), name: z.string() })),
  releases: z.array(ReleaseSummary),
  /** The reader's own grant, if that is why they see the survey. */
  grantEndsOn: z.iso.date().nullable(),
  can: z.strictObject({ update: z.boolean(), import: z.boolean(), manageAccess: z.boolean() }),
});
export type SurveyView = z.infer<typeof SurveyView>;

/** `GET /api/surveys`. */
export const SurveysView = z.strictObject({ surveys: z.array(SurveyView) });
export type SurveysView = z.infer<typeof SurveysView>;

/** `GET /api/releases/:id`. */
export const ReleaseView = ReleaseSummary.extend({
  surveyTitle: z.string(),
  checksum: z.string().nullable(),
  publishedBy: z.string().nullable(),
});
export type ReleaseView = z.infer<typeof ReleaseView>;
