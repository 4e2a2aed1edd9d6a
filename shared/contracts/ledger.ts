import { z } from "zod";

/** What was done: dotted `thing.act`. */
export const LEDGER_ACTIONS = [
  "session.started",
  "session.refused",
  "session.ended",
  "person.added",
  "person.changed",
  "person.deactivated",
  "person.reactivated",
  "person.linkMade",
  "person.passwordSet",
  "survey.created",
  "survey.changed",
  "survey.stewardsChanged",
  "import.started",
  "import.finished",
  "import.failed",
  "import.cancelled",
  "codebook.changed",
  "design.declared",
  "release.published",
  "release.removed",
  "grant.given",
  "grant.revoked",
  "question.asked",
  "table.downloaded",
  "access.refused",
] as const;
export const LedgerAction = z.enum(LEDGER_ACTIONS);
export type LedgerAction = z.infer<typeof LedgerAction>;

export const LedgerEntryView = z.strictObject({
  id: z.number().int(),
  at: z.iso.datetime(),
  actor: z.string().nullable(),
  action: LedgerAction,
  surveyId: z.uuid().nullable(),
  surveyTitle: z.string().nullable(),
  /** The act as a sentence, without any figure of the data. */
  summary: z.string(),
});
export type LedgerEntryView = z.infer<typeof LedgerEntryView>;

/** `GET /api/ledger?survey=&action=&text=&before=`: newest first, 100 a page; `before` takes `next`. Stewards see their surveys, administrators everything, others what they did themselves. */
export const LedgerQuery = z.object({
  survey: z.uuid().optional(),
  action: LedgerAction.optional(),
  text: z.string().trim().max(100).optional(),
  before: z.coerce.number().int().positive().optional(),
});
export type LedgerQuery = z.infer<typeof LedgerQuery>;
export const LedgerView = z.strictObject({ entries: z.array(LedgerEntryView), next: z.number().int().nullable() });
export type LedgerView = z.infer<typeof LedgerView>;
