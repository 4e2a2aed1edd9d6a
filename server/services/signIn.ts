import type { Request } from "express";
import type { Sequelize } from "sequelize";
import { AppError } from "../errors.ts";
import { Person, SessionRow, SignInLink } from "../models/Person.ts";
import { record, type Actor } from "./ledger.ts";
import { hashPassword, isRightPassword, weaknessOf } from "./passwords.ts";
import { findSignInLink } from "./signInLinks.ts";

/** The active person with this e-mail and password; null otherwise, in about the same time whatever was wrong. */
export async function findByPassword(email: string, password: string): Promise<Person | null> {
  const person = await Person.findOne({ where: { email: email.toLowerCase(), isActive: true }, include: "roleRows" });
  const isRight = await isRightPassword(person?.passwordHash ?? null, password);
  return isRight ? person : null;
}

/** A call of the session's own kind, with a callback, as a promise. */
const promised = (call: (done: (error?: unknown) => void) => unknown) =>
  new Promise<void>((resolve, reject) => {
    call((error) => {
      if (error === undefined || error === null) resolve();
      else reject(error instanceof Error ? error : new Error("The session store failed.", { cause: error }));
    });
  });
const regenerate = (request: Request) => promised((done) => request.session.regenerate(done));
const save = (request: Request) => promised((done) => request.session.save(done));

/** Starts a person's session under a new id, so that one planted before sign-in is worth nothing. */
export async function startSession(request: Request, person: Person, sequelize: Sequelize): Promise<void> {
  await regenerate(request);
  request.session.personId = person.id;
  request.session.startedAt = Date.now();
  await save(request);
  await sequelize.transaction(async (transaction) => {
    await person.update({ lastSignInAt: new Date() }, { transaction });
    await record(transaction, person, { action: "session.started", subjectId: person.id, summary: `${person.name} signed in.` });
  });
}

/** Notes a refused sign-in; the e-mail stands in the ledger only if it is somebody's. */
export async function noteRefusal(sequelize: Sequelize, email: string): Promise<void> {
  const person = await Person.findOne({ where: { email: email.toLowerCase() } });
  const summary = person ? `A sign-in as ${person.name} was refused.` : "A sign-in with an unknown e-mail address was refused.";
  await sequelize.transaction((transaction) =>
    record(transaction, null, { action: "session.refused", subjectId: person?.id ?? null, summary }),
  );
}

/** Ends the request's session on the server. */
export async function endSession(request: Request, actor: Actor, sequelize: Sequelize): Promise<void> {
  await promised((done) => request.session.destroy(done));
  if (!actor) return;
  await sequelize.transaction((transaction) =>
    record(transaction, actor, { action: "session.ended", subjectId: actor.id, summary: `${actor.name} signed out.` }),
  );
}

function refuseWeak(password: string, email: string): void {
  const weakness = weaknessOf(password, email);
  if (weakness) throw new AppError("invalid", `${weakness} Nothing was changed.`, { password: weakness });
}

/** Uses up a one-time link: sets the password and ends every session the person had. */
export async function acceptSignInLink(sequelize: Sequelize, token: string, password: string): Promise<Person> {
  return sequelize.transaction(async (transaction) => {
    const link = await findSignInLink(token, transaction);
    const person = await Person.findOne({ where: { id: link.personId, isActive: true }, include: "roleRows", transaction });
    if (!person) throw new AppError("notFound", "This account isn't active. Ask your administrator.");
    refuseWeak(password, person.email);
    await person.update({ passwordHash: await hashPassword(password) }, { transaction });
    await SignInLink.destroy({ where: { personId: person.id }, transaction });
    await SessionRow.destroy({ where: { personId: person.id }, transaction });
    await record(transaction, person, {
      action: "person.passwordSet",
      subjectId: person.id,
      summary: `${person.name} chose a password through a one-time link.`,
    });
    return person;
  });
}

/** Changes one's own password and ends one's other sessions. */
export async function changePassword(
  sequelize: Sequelize,
  personId: string,
  sessionId: string,
  input: { current: string; password: string },
): Promise<void> {
  const person = await Person.findByPk(personId);
  if (!person || !(await isRightPassword(person.passwordHash, input.current))) {
    throw new AppError("invalid", "Your present password isn't right. Nothing was changed.", {
      current: "This isn't your present password.",
    });
  }
  refuseWeak(input.password, person.email);
  const passwordHash = await hashPassword(input.password);
  await sequelize.transaction(async (transaction) => {
    await person.update({ passwordHash }, { transaction });
    const rows = await SessionRow.findAll({ where: { personId }, attributes: ["sid"], transaction });
    const others = rows.map((row) => row.sid).filter((sid) => sid !== sessionId);
    await SessionRow.destroy({ where: { sid: others }, transaction });
    await record(transaction, person, {
      action: "person.passwordSet",
      subjectId: personId,
      summary: `${person.name} changed their password.`,
    });
  });
}
