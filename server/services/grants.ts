import { randomUUID } from "node:crypto";
import { Op, type Sequelize } from "sequelize";
import type { GrantInput } from "../../shared/contracts/access.ts";
import { AppError } from "../errors.ts";
import { Grant } from "../models/Grant.ts";
import { Person } from "../models/Person.ts";
import type { Survey } from "../models/Survey.ts";
import type { Reader } from "../policies/policy.ts";
import { record } from "./ledger.ts";
import { today } from "./surveyAccess.ts";

const PEOPLE = ["person", "giver", "revoker"];
const LONGEST_YEARS = 5;

/** All grants of a survey, newest first, with the people they name. */
export function grantsOf(surveyId: string): Promise<Grant[]> {
  return Grant.findAll({ where: { surveyId }, include: PEOPLE, order: [["givenAt", "DESC"]] });
}

function checkEnd(endsOn: string): void {
  const latest = new Date();
  latest.setUTCFullYear(latest.getUTCFullYear() + LONGEST_YEARS);
  const message =
    endsOn < today()
      ? "The last day has passed already."
      : endsOn > latest.toISOString().slice(0, 10)
        ? `A grant lasts ${LONGEST_YEARS} years at most.`
        : null;
  if (message) throw new AppError("invalid", `${message} Nothing was changed.`, { endsOn: message });
}

/** Gives a person leave to ask of a survey. @throws {AppError} `conflict` while the person has a grant that holds. */
export async function giveGrant(sequelize: Sequelize, reader: Reader, survey: Survey, input: GrantInput): Promise<Grant> {
  checkEnd(input.endsOn);
  const id = randomUUID();
  await sequelize.transaction(async (transaction) => {
    // The person's row is the lock: two grants at once for one person come one after the other.
    const person = await Person.findOne({
      where: { id: input.personId, isActive: true },
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (!person)
      throw new AppError("invalid", "Nobody active has this account. Nothing was changed.", {
        personId: "Choose an active person.",
      });
    const holding = await Grant.count({
      where: { surveyId: survey.id, personId: person.id, revokedAt: null, endsOn: { [Op.gte]: today() } },
      transaction,
    });
    if (holding > 0)
      throw new AppError("conflict", `${person.name} has a grant that holds. Take it back first to give another.`, {
        personId: "Has a grant already.",
      });
    await Grant.create({ id, surveyId: survey.id, ...input, givenBy: reader.id, givenAt: new Date() }, { transaction });
    const summary = `Gave ${person.name} leave to ask of “${survey.title}” until ${input.endsOn}, for: ${input.purpose}`;
    await record(transaction, reader, { action: "grant.given", surveyId: survey.id, subjectId: id, summary });
  });
  return loadGrant(id);
}

/** A grant with its survey and the people it names. @throws {AppError} `notFound`. */
export async function loadGrant(id: string): Promise<Grant> {
  const grant = await Grant.findByPk(id, { include: [...PEOPLE, "survey"] });
  if (!grant) throw new AppError("notFound", "There is nothing here, or you may not see it.");
  return grant;
}

/** Takes a grant back: requests read grants afresh, so the very next one is refused. */
export async function revokeGrant(sequelize: Sequelize, reader: Reader, grant: Grant): Promise<Grant> {
  await sequelize.transaction(async (transaction) => {
    const [changed] = await Grant.update(
      { revokedAt: new Date(), revokedBy: reader.id },
      { where: { id: grant.id, revokedAt: null }, transaction },
    );
    if (changed === 0) throw new AppError("conflict", "This grant was taken back already.");
    const summary = `Took back ${grant.person?.name ?? "a person"}'s leave to ask of “${grant.survey?.title ?? "a survey"}”.`;
    await record(transaction, reader, { action: "grant.revoked", surveyId: grant.surveyId, subjectId: grant.id, summary });
  });
  return loadGrant(grant.id);
}
