import { z } from "zod";

/** `POST /api/surveys/:id/grants`. */
export const GrantInput = z.strictObject({
  personId: z.uuid("Choose a person."),
  purpose: z.string().trim().min(1, "Say what for.").max(1000),
  /** Last day on which the grant holds, UTC. */
  endsOn: z.iso.date("Give the last day."),
});
export type GrantInput = z.infer<typeof GrantInput>;

export const GrantView = z.strictObject({
  id: z.uuid(),
  person: z.strictObject({ id: z.uuid(), name: z.string(), email: z.string() }),
  purpose: z.string(),
  endsOn: z.iso.date(),
  status: z.enum(["active", "ended", "revoked"]),
  givenBy: z.string(),
  givenAt: z.iso.datetime(),
  revokedBy: z.string().nullable(),
  revokedAt: z.iso.datetime().nullable(),
  can: z.strictObject({ revoke: z.boolean() }),
});
export type GrantView = z.infer<typeof GrantView>;

/** `GET /api/surveys/:id/grants`. `DELETE /api/grants/:id` takes one back from the very next request on. */
export const GrantsView = z.strictObject({ surveyId: z.uuid(), surveyTitle: z.string(), grants: z.array(GrantView) });
export type GrantsView = z.infer<typeof GrantsView>;

/** `PUT /api/surveys/:id/stewards`: the survey's stewards from now on; never none. */
export const StewardsInput = z.strictObject({ personIds: z.array(z.uuid()).min(1, "A survey needs a steward.").max(50) });
export type StewardsInput = z.infer<typeof StewardsInput>;
