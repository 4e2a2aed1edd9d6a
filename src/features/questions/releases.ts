import type { ReleaseSummary, SurveyView } from "../../../shared/contracts/holdings.ts";
import { formatCounted, formatDate } from "../../../shared/format.ts";
import type { Choice } from "../../components/Chooser.tsx";

/** A release that questions may be put to, with its survey's title. */
export interface AskableRelease extends ReleaseSummary {
  surveyTitle: string;
}

/** Releases this reader may ask, the one published last first. */
export const askableReleases = (surveys: readonly SurveyView[]): AskableRelease[] =>
  surveys
    .flatMap(({ title, releases }) => releases.map((release) => ({ ...release, surveyTitle: title })))
    .filter(({ status, can }) => status === "published" && can.ask)
    .sort(
      (a, b) => (b.publishedAt ?? "").localeCompare(a.publishedAt ?? "") || b.wave.localeCompare(a.wave, "en", { numeric: true }),
    );

export const releaseName = ({ surveyTitle, wave }: AskableRelease) => `${surveyTitle}, ${wave}`;

export const releaseChoice = (release: AskableRelease): Choice => ({
  id: release.id,
  label: releaseName(release),
  detail: [
    release.respondents === null ? null : formatCounted(release.respondents, "respondent"),
    release.publishedAt === null ? null : `published ${formatDate(release.publishedAt)}`,
  ]
    .filter((part) => part !== null)
    .join(" · "),
});

/** Waves of the other releases of a release's survey, by id. */
export function otherWaves(releases: readonly AskableRelease[], releaseId: string | null): ReadonlyMap<string, string> {
  const surveyId = releases.find(({ id }) => id === releaseId)?.surveyId;
  const others = releases.filter((release) => release.surveyId === surveyId && release.id !== releaseId);
  return new Map(others.map(({ id, wave }) => [id, wave]));
}
