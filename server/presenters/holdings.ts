import type { ReleaseSummary, ReleaseView, SurveyView } from "../../shared/contracts/holdings.ts";
import type { Release } from "../models/Release.ts";
import type { Survey } from "../models/Survey.ts";
import type { Reader } from "../policies/policy.ts";
import { releasePolicy, surveyPolicy, type SurveyAccess } from "../policies/survey.ts";

/** What is counted beside a release rather than kept in it. */
export interface ReleaseExtras {
  variables: number;
  importId: string | null;
}

/** A release as a line of its survey. */
export function presentRelease(release: Release, survey: SurveyAccess, reader: Reader, extras: ReleaseExtras): ReleaseSummary {
  const access = { ...survey, status: release.status };
  const isDraft = release.status === "draft";
  return {
    id: release.id,
    surveyId: release.surveyId,
    wave: release.wave,
    status: release.status,
    respondents: release.respondents,
    variables: extras.variables,
    hasDesign: release.design !== null,
    createdAt: release.createdAt.toISOString(),
    publishedAt: release.publishedAt?.toISOString() ?? null,
    importId: releasePolicy.readDesign(reader, access) ? extras.importId : null,
    can: {
      import: surveyPolicy.import(reader, survey),
      design: isDraft && releasePolicy.updateDesign(reader, access),
      publish: isDraft && releasePolicy.publish(reader, access),
      ask: releasePolicy.ask(reader, access),
      remove: isDraft && releasePolicy.remove(reader, access),
    },
  };
}

/** A release by itself; its `survey` is loaded. */
export function presentReleaseView(
  release: Release,
  survey: SurveyAccess,
  reader: Reader,
  extras: ReleaseExtras & { publishedBy: string | null },
): ReleaseView {
  return {
    ...presentRelease(release, survey, reader, extras),
    surveyTitle: release.survey?.title ?? "",
    checksum: release.checksum,
    publishedBy: extras.publishedBy,
  };
}

/** A survey with those of its releases that the reader may see, newest wave first. */
export function presentSurvey(
  survey: Survey,
  releases: ReleaseSummary[],
  access: SurveyAccess,
  reader: Reader,
  grantEndsOn: string | null,
): SurveyView {
  return {
    id: survey.id,
    title: survey.title,
    description: survey.description,
    stewards: (survey.stewards ?? []).map(({ id, name }) => ({ id, name })),
    releases,
    grantEndsOn,
    can: {
      update: surveyPolicy.update(reader, access),
      import: surveyPolicy.import(reader, access),
      manageAccess: surveyPolicy.manageAccess(reader, access),
    },
  };
}
