import { randomUUID } from "node:crypto";
import { Person, PersonRole } from "../../server/models/Person.ts";
import { hashPassword } from "../../server/services/passwords.ts";
import type { Role } from "../../shared/roles.ts";
import { TEST_PASSWORD } from "../support/client.ts";

let known: Promise<string> | null = null;

/** An active person with the test password. */
export async function createPerson(
  roles: Role[],
  values: { name?: string; email?: string; isActive?: boolean } = {},
): Promise<Person> {
  known ??= hashPassword(TEST_PASSWORD);
  const id = randomUUID();
  const person = await Person.create({
    id,
    name: values.name ?? `Person ${id.slice(0, 4)}`,
    email: values.email ?? `${id}@perhundred.example`,
    passwordHash: await known,
    isActive: values.isActive ?? true,
    createdAt: new Date(),
  });
  await PersonRole.bulkCreate(roles.map((role) => ({ personId: id, role })));
  return person;
}
