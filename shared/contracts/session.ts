import { z } from "zod";
import { Permissions, Role } from "../roles.ts";

/** The shortest password taken: NIST SP 800-63B rev. 4, where a password is the only factor. */
export const PASSWORD_MINIMUM_LENGTH = 15;

/** `POST /api/session`. */
export const SignInInput = z.strictObject({
  email: z.email("Give your e-mail address.").max(254),
  password: z.string().min(1, "Give your password.").max(1024),
});
export type SignInInput = z.infer<typeof SignInInput>;

/** A password as a person may choose it: any characters, no rules of composition. */
export const NewPassword = z
  .string()
  .min(PASSWORD_MINIMUM_LENGTH, `Use at least ${PASSWORD_MINIMUM_LENGTH} characters; a few words together do well.`)
  .max(256, "Use at most 256 characters.");

/** `POST /api/sign-in-links/:token`: the person behind a one-time link chooses a password and is signed in. */
export const AcceptLinkInput = z.strictObject({ password: NewPassword });
export type AcceptLinkInput = z.infer<typeof AcceptLinkInput>;

/** `GET /api/sign-in-links/:token`: whom a one-time link is for; 404 once used, expired or replaced. */
export const SignInLinkView = z.strictObject({ name: z.string(), email: z.string(), expiresAt: z.iso.datetime() });
export type SignInLinkView = z.infer<typeof SignInLinkView>;

/** `PUT /api/account/password`. Other sessions of the person end. */
export const ChangePasswordInput = z.strictObject({
  current: z.string().min(1, "Give your present password.").max(1024),
  password: NewPassword,
});
export type ChangePasswordInput = z.infer<typeof ChangePasswordInput>;

/** `GET /api/session`; `person` is null when nobody is signed in. Send `csrfToken` as `x-csrf-token` with every change. */
export const SessionView = z.strictObject({
  person: z.strictObject({ id: z.uuid(), name: z.string(), email: z.string(), roles: z.array(Role) }).nullable(),
  permissions: Permissions,
  csrfToken: z.string(),
});
export type SessionView = z.infer<typeof SessionView>;
