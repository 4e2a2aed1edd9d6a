import type { PersonView } from "../../shared/contracts/people.ts";
import type { Person } from "../models/Person.ts";
import { personPolicy } from "../policies/person.ts";
import type { Reader } from "../policies/policy.ts";

/** A person as administrators see them. */
export function presentPerson(person: Person, reader: Reader): PersonView {
  return {
    id: person.id,
    name: person.name,
    email: person.email,
    roles: person.roles,
    isActive: person.isActive,
    hasPassword: person.passwordHash !== null,
    lastSignInAt: person.lastSignInAt?.toISOString() ?? null,
    can: { update: personPolicy.update(reader), deactivate: personPolicy.deactivate(reader, person) },
  };
}
