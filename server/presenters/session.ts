import type { SessionView } from "../../shared/contracts/session.ts";
import type { Role } from "../../shared/roles.ts";
import type { Reader } from "../policies/policy.ts";

/** Who is signed in and what they may do anywhere. */
export function presentSession(reader: Reader | null, csrfToken: string): SessionView {
  const has = (role: Role) => reader?.roles.includes(role) ?? false;
  return {
    person: reader && { id: reader.id, name: reader.name, email: reader.email, roles: [...reader.roles] },
    permissions: {
      createSurvey: has("steward"),
      ask: has("epidemiologist") || has("planner") || has("steward"),
      managePeople: has("administrator"),
      readLedger: reader !== null,
    },
    csrfToken,
  };
}
