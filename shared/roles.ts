import { z } from "zod";

/** What a person may be; one person may hold several. Partners have no account. */
export const ROLES = ["steward", "epidemiologist", "planner", "administrator"] as const;
export const Role = z.enum(ROLES);
export type Role = z.infer<typeof Role>;

/** The product's word for each role, as it stands on pages and in e-mails. */
export const ROLE_LABELS: Record<Role, string> = {
  steward: "Data steward",
  epidemiologist: "Epidemiologist",
  planner: "Campaign planner",
  administrator: "Administrator",
};

/** What the server says this person may do anywhere; what may be done to one thing stands in that thing's `can`. */
export const Permissions = z.strictObject({
  createSurvey: z.boolean(),
  ask: z.boolean(),
  managePeople: z.boolean(),
  readLedger: z.boolean(),
});
export type Permissions = z.infer<typeof Permissions>;
