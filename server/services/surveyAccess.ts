import { Op } from "sequelize";
import { AppError } from "../errors.ts";
import { Grant } from "../models/Grant.ts";
import { Release } from "../models/Release.ts";
import { Survey, SurveySteward } from "../models/Survey.ts";
import type { Policy, Reader } from "../policies/policy.ts";
import type { ReleaseAccess, SurveyAccess } from "../policies/survey.ts";

/** Today as `YYYY-MM-DD`, UTC: grants end with their last day there. */
export const today = (): string => new Date().toISOString().slice(0, 10);

/** What decides whether a reader may see each of these surveys, read from the database now: a grant taken back counts at once. */
export async function surveyAccesses(reader: Reader, surveyIds: readonly string[]): Promise<Map<string, SurveyAccess>> {
  const [stewards, grants] = await Promise.all([
    SurveySteward.findAll({ where: { surveyId: [...surveyIds] } }),
    Grant.findAll({ where: { surveyId: [...surveyIds], personId: reader.id, revokedAt: null, endsOn: { [Op.gte]: today() } } }),
  ]);
  return new Map(
    surveyIds.map((surveyId) => [
      surveyId,
      {
        surveyId,
        stewardIds: stewards.filter((row) => row.surveyId === surveyId).map((row) => row.personId),
        hasActiveGrant: grants.some((grant) => grant.surveyId === surveyId),
      },
    ]),
  );
}

/** Throws 404 for what the reader may not see (as if it weren't there) and 403 for what they may see but not do. */
export function authorize<Thing, Rules extends Policy<Thing>>(
  rules: Rules,
  act: keyof Rules & string,
  reader: Reader,
  thing: Thing,
): void {
  if (!rules.read(reader, thing)) throw new AppError("notFound", "There is nothing here, or you may not see it.");
  const rule = rules[act];
  if (!rule?.(reader, thing)) throw new AppError("forbidden", "You may see this, but not do that. Nothing was changed.");
}

/** A survey with what decides about it. @throws {AppError} `notFound`. */
export async function loadSurvey(reader: Reader, surveyId: string): Promise<{ survey: Survey; access: SurveyAccess }> {
  const survey = await Survey.findByPk(surveyId, { include: "stewards" });
  const access = (await surveyAccesses(reader, [surveyId])).get(surveyId);
  if (!survey || !access) throw new AppError("notFound", "There is nothing here, or you may not see it.");
  return { survey, access };
}

/** A release (its `survey` loaded) with what decides about it. @throws {AppError} `notFound`. */
export async function loadRelease(reader: Reader, releaseId: string): Promise<{ release: Release; access: ReleaseAccess }> {
  const release = await Release.findByPk(releaseId, { include: "survey" });
  if (!release) throw new AppError("notFound", "There is nothing here, or you may not see it.");
  const access = (await surveyAccesses(reader, [release.surveyId])).get(release.surveyId);
  if (!access) throw new AppError("notFound", "There is nothing here, or you may not see it.");
  return { release, access: { ...access, status: release.status } };
}
