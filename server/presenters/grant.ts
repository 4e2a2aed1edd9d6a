import type { GrantView } from "../../shared/contracts/access.ts";
import type { Grant } from "../models/Grant.ts";
import { today } from "../services/surveyAccess.ts";

/** A grant as its survey's stewards see it; the people it names are loaded. */
export function presentGrant(grant: Grant): GrantView {
  const { person, giver, revoker } = grant;
  if (!person || !giver) throw new Error("A grant's people were not loaded.");
  const status = grant.revokedAt ? "revoked" : grant.endsOn < today() ? "ended" : "active";
  return {
    id: grant.id,
    person: { id: person.id, name: person.name, email: person.email },
    purpose: grant.purpose,
    endsOn: grant.endsOn,
    status,
    givenBy: giver.name,
    givenAt: grant.givenAt.toISOString(),
    revokedBy: revoker?.name ?? null,
    revokedAt: grant.revokedAt?.toISOString() ?? null,
    can: { revoke: status === "active" },
  };
}
