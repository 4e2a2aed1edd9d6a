import { randomUUID } from "node:crypto";
import type { Sequelize } from "sequelize";
import { Person, PersonRole } from "../server/models/Person.ts";
import { hashPassword } from "../server/services/passwords.ts";
import { ROLE_LABELS, type Role } from "../shared/roles.ts";

/** Password of every demo account; the demo is for loopback only. */
export const DEMO_PASSWORD = "tamarisk by the sea";

interface DemoAccount {
  email: string;
  name: string;
  roles: Role[];
  /** What the account is for, as it is printed at the start. */
  label: string;
}

const account = (email: string, name: string, roles: Role[], remark = ""): DemoAccount => ({
  email: `${email}@perhundred.example`,
  name,
  roles,
  label: roles.map((role) => ROLE_LABELS[role]).join(", ") + remark,
});

/** Invented people, one for each role, and two without access to show how it is given. */
export const DEMO_ACCOUNTS: readonly DemoAccount[] = [
  account("steward", "Mara Tellin", ["steward"]),
  account("epidemiologist", "Odo Varga", ["epidemiologist"]),
  account("planner", "Sunniva Roe", ["planner"]),
  account("administrator", "Kit Alder", ["administrator"]),
  account("second.steward", "Ilan Brook", ["steward"], ", with no survey yet"),
  account("second.epidemiologist", "Petra Quist", ["epidemiologist"], ", with no access yet"),
];

/** Creates the demo's people where they aren't there yet. @returns them all, by e-mail. */
export async function seedAccounts(sequelize: Sequelize): Promise<Map<string, Person>> {
  const passwordHash = await hashPassword(DEMO_PASSWORD);
  await sequelize.transaction(async (transaction) => {
    for (const { email, name, roles } of DEMO_ACCOUNTS) {
      const id = randomUUID();
      const [person, isNew] = await Person.findOrCreate({
        where: { email },
        defaults: { id, name, email, passwordHash, createdAt: new Date() },
        transaction,
      });
      if (!isNew) continue;
      await PersonRole.bulkCreate(
        roles.map((role) => ({ personId: person.id, role })),
        { transaction },
      );
    }
  });
  const people = await Person.findAll({ where: { email: DEMO_ACCOUNTS.map(({ email }) => email) }, include: "roleRows" });
  return new Map(people.map((person) => [person.email, person]));
}
