import { randomUUID } from "node:crypto";
import type { Sequelize } from "sequelize";
import type { Config } from "../config.ts";
import { Person, PersonRole } from "../models/Person.ts";
import { record } from "../services/ledger.ts";
import { makeSignInLink } from "../services/signInLinks.ts";

/**
 * A one-time link for the first administrator, where no administrator can sign in yet; null otherwise.
 * A second start before the link was used makes a new one for the same person.
 */
export async function firstAdministrator({
  config,
  sequelize,
}: {
  config: Config;
  sequelize: Sequelize;
}): Promise<string | null> {
  return sequelize.transaction(async (transaction) => {
    const rows = await PersonRole.findAll({ where: { role: "administrator" }, transaction, lock: true });
    const administrators = await Person.findAll({
      where: { id: rows.map(({ personId }) => personId), isActive: true },
      transaction,
    });
    if (administrators.some(({ passwordHash }) => passwordHash !== null)) return null;
    let [person] = administrators;
    if (!person) {
      const email = `administrator@${new URL(config.publicUrl).hostname}`;
      person = await Person.create(
        { id: randomUUID(), name: "First administrator", email, createdAt: new Date() },
        { transaction },
      );
      await PersonRole.create({ personId: person.id, role: "administrator" }, { transaction });
      await record(transaction, null, {
        action: "person.added",
        subjectId: person.id,
        summary: "Added the first administrator.",
      });
    }
    return (await makeSignInLink(person.id, config.publicUrl, transaction)).link;
  });
}
