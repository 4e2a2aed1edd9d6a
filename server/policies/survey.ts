import type { ReleaseStatus } from "../../shared/contracts/holdings.ts";
import type { Policy, Reader } from "./policy.ts";

/** What the rules about a survey look at. Built by `services/surveyAccess.ts` afresh for each request. */
export interface SurveyAccess {
  surveyId: string;
  stewardIds: readonly string[];
  /** Whether the reader has a grant that is neither revoked nor past its last day. */
  hasActiveGrant: boolean;
}

/** A release together with its survey's access. */
export interface ReleaseAccess extends SurveyAccess {
  status: ReleaseStatus;
}

/** A steward keeps the role: someone who lost it no longer acts on surveys they once looked after. */
const isSteward = (reader: Reader, survey: SurveyAccess) =>
  reader.roles.includes("steward") && survey.stewardIds.includes(reader.id);
const maySee = (reader: Reader, survey: SurveyAccess) => isSteward(reader, survey) || survey.hasActiveGrant;
const mayAskAtAll = (reader: Reader) =>
  reader.roles.some((role) => role === "epidemiologist" || role === "planner" || role === "steward");

/** Surveys and what belongs to them as wholes. */
export const surveyPolicy = {
  read: maySee,
  update: isSteward,
  import: isSteward,
  manageAccess: isSteward,
} satisfies Policy<SurveyAccess>;

/** Releases: drafts are their stewards' alone. */
export const releasePolicy = {
  read: (reader, release) => isSteward(reader, release) || (release.hasActiveGrant && release.status !== "draft"),
  readReadiness: isSteward,
  readDesign: isSteward,
  updateCodebook: isSteward,
  updateDesign: isSteward,
  publish: isSteward,
  remove: isSteward,
  ask: (reader, release) => mayAskAtAll(reader) && maySee(reader, release) && release.status === "published",
} satisfies Policy<ReleaseAccess>;
