import { randomUUID } from "node:crypto";
import { fn, col, Op, type Sequelize } from "sequelize";
import type { SurveyInput, SurveyView } from "../../shared/contracts/holdings.ts";
import { AppError } from "../errors.ts";
import { Grant } from "../models/Grant.ts";
import { Import } from "../models/Import.ts";
import { Person, PersonRole } from "../models/Person.ts";
import { Survey, SurveySteward } from "../models/Survey.ts";
import { Variable } from "../models/Variable.ts";
import type { Reader } from "../policies/policy.ts";
import { releasePolicy, surveyPolicy } from "../policies/survey.ts";
import { presentRelease, presentSurvey, type ReleaseExtras } from "../presenters/holdings.ts";
import { record } from "./ledger.ts";
import { surveyAccesses, today } from "./surveyAccess.ts";

/** Numbers of variables and last imports of releases, by release. */
export async function releaseExtras(releaseIds: readonly string[]): Promise<Map<string, ReleaseExtras>> {
  const where = { releaseId: [...releaseIds] };
  const counts = await Variable.findAll({
    where,
    attributes: ["releaseId", [fn("COUNT", col("id")), "position"]],
    group: ["releaseId"],
  });
  const imports = await Import.findAll({ where, attributes: ["id", "releaseId"], order: [["startedAt", "ASC"]] });
  const countOf = new Map(counts.map((row) => [row.releaseId, row.position]));
  const importOf = new Map(imports.map((row) => [row.releaseId, row.id]));
  return new Map(releaseIds.map((id) => [id, { variables: countOf.get(id) ?? 0, importId: importOf.get(id) ?? null }]));
}

async function visibleIds(reader: Reader): Promise<string[]> {
  const [stewarded, granted] = await Promise.all([
    SurveySteward.findAll({ where: { personId: reader.id } }),
    Grant.findAll({ where: { personId: reader.id, revokedAt: null, endsOn: { [Op.gte]: today() } } }),
  ]);
  return [...new Set([...stewarded, ...granted].map((row) => row.surveyId))];
}

/** The surveys a reader may see, by title, as they see them. @param only One survey's id, or all. */
export async function visibleSurveys(reader: Reader, only?: string): Promise<SurveyView[]> {
  const ids = (await visibleIds(reader)).filter((id) => only === undefined || id === only);
  const surveys = await Survey.findAll({ where: { id: ids }, include: ["stewards", "releases"], order: [["title", "ASC"]] });
  const accesses = await surveyAccesses(reader, ids);
  const grants = await Grant.findAll({
    where: { personId: reader.id, surveyId: ids, revokedAt: null, endsOn: { [Op.gte]: today() } },
  });
  const extras = await releaseExtras(surveys.flatMap((survey) => releasesOf(survey).map((release) => release.id)));
  return surveys.flatMap((survey) => {
    const access = accesses.get(survey.id);
    if (!access || !surveyPolicy.read(reader, access)) return [];
    const releases = releasesOf(survey)
      .filter((release) => releasePolicy.read(reader, { ...access, status: release.status }))
      .sort((a, b) => b.wave.localeCompare(a.wave, "en", { numeric: true }) || b.createdAt.getTime() - a.createdAt.getTime())
      .map((release) => presentRelease(release, access, reader, extras.get(release.id) ?? { variables: 0, importId: null }));
    const endsOn = grants.filter((grant) => grant.surveyId === survey.id).map((grant) => grant.endsOn);
    return [presentSurvey(survey, releases, access, reader, endsOn.sort().at(-1) ?? null)];
  });
}

const releasesOf = (survey: Survey) => survey.releases ?? [];

/** One survey as the reader sees it. @throws {AppError} `notFound`. */
export async function visibleSurvey(reader: Reader, surveyId: string): Promise<SurveyView> {
  const [survey] = await visibleSurveys(reader, surveyId);
  if (!survey) throw new AppError("notFound", "There is nothing here, or you may not see it.");
  return survey;
}

/** Creates a survey whose steward is its creator. @returns its id. */
export async function createSurvey(sequelize: Sequelize, reader: Reader, input: SurveyInput): Promise<string> {
  const id = randomUUID();
  await sequelize.transaction(async (transaction) => {
    await Survey.create({ id, title: input.title, description: input.description ?? "", createdAt: new Date() }, { transaction });
    await SurveySteward.create({ surveyId: id, personId: reader.id }, { transaction });
    await record(transaction, reader, {
      action: "survey.created",
      surveyId: id,
      subjectId: id,
      summary: `Created the survey “${input.title}”.`,
    });
  });
  return id;
}

/** Changes a survey's title and description. */
export async function updateSurvey(sequelize: Sequelize, reader: Reader, survey: Survey, input: SurveyInput): Promise<void> {
  await sequelize.transaction(async (transaction) => {
    await survey.update({ title: input.title, description: input.description ?? "" }, { transaction });
    await record(transaction, reader, {
      action: "survey.changed",
      surveyId: survey.id,
      subjectId: survey.id,
      summary: `Changed title or description of “${input.title}”.`,
    });
  });
}

/** Sets a survey's stewards. @throws {AppError} `invalid` when somebody isn't an active data steward. */
export async function setStewards(
  sequelize: Sequelize,
  reader: Reader,
  survey: Survey,
  personIds: readonly string[],
): Promise<void> {
  const ids = [...new Set(personIds)];
  await sequelize.transaction(async (transaction) => {
    const people = await Person.findAll({ where: { id: ids, isActive: true }, include: "roleRows", transaction });
    const stewards = people.filter((person) => person.roles.includes("steward"));
    if (stewards.length < ids.length) {
      const message = "Only active people with the role of data steward can be a survey's stewards.";
      throw new AppError("invalid", `${message} Nothing was changed.`, { personIds: message });
    }
    await SurveySteward.destroy({ where: { surveyId: survey.id }, transaction });
    await SurveySteward.bulkCreate(
      ids.map((personId) => ({ surveyId: survey.id, personId })),
      { transaction },
    );
    const names = stewards.map((person) => person.name).join(", ");
    await record(transaction, reader, {
      action: "survey.stewardsChanged",
      surveyId: survey.id,
      subjectId: survey.id,
      summary: `Stewards of “${survey.title}” are now ${names}.`,
    });
  });
}

/** Active people who may be given access: everyone who asks questions or keeps surveys, by name. */
export async function accessCandidates(): Promise<Person[]> {
  const roles = await PersonRole.findAll({ where: { role: ["steward", "epidemiologist", "planner"] } });
  const ids = [...new Set(roles.map((row) => row.personId))];
  return Person.findAll({ where: { id: ids, isActive: true }, include: "roleRows", order: [["name", "ASC"]] });
}
