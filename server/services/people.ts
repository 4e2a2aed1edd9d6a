import { randomUUID } from "node:crypto";
import { UniqueConstraintError, type Sequelize, type Transaction } from "sequelize";
import type { PersonChange, PersonInput } from "../../shared/contracts/people.ts";
import { ROLE_LABELS, type Role } from "../../shared/roles.ts";
import { AppError } from "../errors.ts";
import { Person, PersonRole, SessionRow } from "../models/Person.ts";
import type { Reader } from "../policies/policy.ts";
import { record } from "./ledger.ts";
import { makeSignInLink } from "./signInLinks.ts";

const named = (roles: readonly Role[]) => roles.map((role) => ROLE_LABELS[role].toLowerCase()).join(", ");

/** Everyone with an account, by name. */
export function allPeople(): Promise<Person[]> {
  return Person.findAll({ include: "roleRows", order: [["name", "ASC"]] });
}

/** A person with their roles. @throws {AppError} `notFound`. */
export async function loadPerson(id: string, transaction?: Transaction): Promise<Person> {
  const person = await Person.findByPk(id, { include: "roleRows", ...(transaction ? { transaction } : {}) });
  if (!person) throw new AppError("notFound", "There is nobody with this account.");
  return person;
}

/** Adds a person with a one-time link to hand over. @throws {AppError} `conflict` when the e-mail is taken. */
export async function addPerson(sequelize: Sequelize, reader: Reader, input: PersonInput, publicUrl: string) {
  const id = randomUUID();
  const roles = [...new Set(input.roles)];
  try {
    return await sequelize.transaction(async (transaction) => {
      await Person.create({ id, name: input.name, email: input.email.toLowerCase(), createdAt: new Date() }, { transaction });
      await PersonRole.bulkCreate(
        roles.map((role) => ({ personId: id, role })),
        { transaction },
      );
      const made = await makeSignInLink(id, publicUrl, transaction);
      await record(transaction, reader, {
        action: "person.added",
        subjectId: id,
        summary: `Added ${input.name} as ${named(roles)}.`,
      });
      return { person: await loadPerson(id, transaction), ...made };
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw new AppError("conflict", "Somebody has an account with this e-mail address already. Nothing was added.", {
        email: "This address is taken.",
      });
    }
    throw error;
  }
}

/** Locks every administrator's row, so that two changes at once can't leave none. */
async function refuseLastAdministrator(person: Person, transaction: Transaction): Promise<void> {
  const rows = await PersonRole.findAll({ where: { role: "administrator" }, transaction, lock: transaction.LOCK.UPDATE });
  const others = rows.map((row) => row.personId).filter((id) => id !== person.id);
  const active = await Person.count({ where: { id: others, isActive: true }, transaction });
  if (active === 0)
    throw new AppError(
      "conflict",
      "This is the last active administrator. Make somebody else administrator first. Nothing was changed.",
    );
}

/** Changes name or roles, deactivates (the person's sessions end at once) or reactivates. */
export async function changePerson(sequelize: Sequelize, reader: Reader, id: string, change: PersonChange): Promise<Person> {
  return sequelize.transaction(async (transaction) => {
    const person = await loadPerson(id, transaction);
    const losesRole = change.roles !== undefined && !change.roles.includes("administrator");
    if (person.roles.includes("administrator") && person.isActive && (losesRole || change.isActive === false))
      await refuseLastAdministrator(person, transaction);
    if (change.name !== undefined && change.name !== person.name) {
      await record(transaction, reader, {
        action: "person.changed",
        subjectId: id,
        summary: `Renamed ${person.name} to ${change.name}.`,
      });
      await person.update({ name: change.name }, { transaction });
    }
    if (change.roles) {
      const roles = [...new Set(change.roles)];
      await PersonRole.destroy({ where: { personId: id }, transaction });
      await PersonRole.bulkCreate(
        roles.map((role) => ({ personId: id, role })),
        { transaction },
      );
      await record(transaction, reader, {
        action: "person.changed",
        subjectId: id,
        summary: `Made ${person.name} ${named(roles)}.`,
      });
    }
    if (change.isActive !== undefined && change.isActive !== person.isActive) {
      await person.update({ isActive: change.isActive }, { transaction });
      if (!change.isActive) await SessionRow.destroy({ where: { personId: id }, transaction });
      const action = change.isActive ? "person.reactivated" : "person.deactivated";
      await record(transaction, reader, {
        action,
        subjectId: id,
        summary: `${change.isActive ? "Reactivated" : "Deactivated"} ${person.name}.`,
      });
    }
    return loadPerson(id, transaction);
  });
}

/** A new one-time link for somebody who can't sign in; their sessions end, their password stays until the link is used. */
export async function renewSignInLink(sequelize: Sequelize, reader: Reader, id: string, publicUrl: string) {
  return sequelize.transaction(async (transaction) => {
    const person = await loadPerson(id, transaction);
    if (!person.isActive) throw new AppError("conflict", "This account is deactivated. Reactivate it first.");
    const made = await makeSignInLink(id, publicUrl, transaction);
    await SessionRow.destroy({ where: { personId: id }, transaction });
    await record(transaction, reader, {
      action: "person.linkMade",
      subjectId: id,
      summary: `Made a sign-in link for ${person.name}.`,
    });
    return { person, ...made };
  });
}
