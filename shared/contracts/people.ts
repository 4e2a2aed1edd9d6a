import { z } from "zod";
import { Role } from "../roles.ts";

const Name = z.string().trim().min(1, "Give a name.").max(120);

/** `POST /api/people`. */
export const PersonInput = z.strictObject({
  name: Name,
  email: z.email("Give an e-mail address.").max(254),
  roles: z.array(Role).min(1, "Choose at least one role."),
});
export type PersonInput = z.infer<typeof PersonInput>;

/** `PATCH /api/people/:id`; what is left out stays. Deactivating ends the person's sessions at once. */
export const PersonChange = z.strictObject({
  name: Name.optional(),
  roles: z.array(Role).min(1, "Choose at least one role.").optional(),
  isActive: z.boolean().optional(),
});
export type PersonChange = z.infer<typeof PersonChange>;

export const PersonView = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  roles: z.array(Role),
  isActive: z.boolean(),
  hasPassword: z.boolean(),
  lastSignInAt: z.iso.datetime().nullable(),
  can: z.strictObject({ update: z.boolean(), deactivate: z.boolean() }),
});
export type PersonView = z.infer<typeof PersonView>;

/** `GET /api/people`. */
export const PeopleView = z.strictObject({ people: z.array(PersonView) });
export type PeopleView = z.infer<typeof PeopleView>;

/** `POST /api/people` and `POST /api/people/:id/sign-in-link`: the link to hand over, shown this once. */
export const NewSignInLink = z.strictObject({ person: PersonView, link: z.url(), expiresAt: z.iso.datetime() });
export type NewSignInLink = z.infer<typeof NewSignInLink>;

/** `GET /api/surveys/:id/candidates`: active people a steward may give a grant to, or make a steward. */
export const CandidatesView = z.strictObject({
  people: z.array(z.strictObject({ id: z.uuid(), name: z.string(), email: z.string(), roles: z.array(Role) })),
});
export type CandidatesView = z.infer<typeof CandidatesView>;
