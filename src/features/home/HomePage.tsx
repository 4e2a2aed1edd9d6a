import { useQuery } from "@tanstack/react-query";
import { Link } from "react-router-dom";
import type { ReleaseSummary, SurveyView } from "../../../shared/contracts/holdings.ts";
import { formatCounted, formatDate } from "../../../shared/format.ts";
import { EmptyState } from "../../components/EmptyState.tsx";
import { LinkButton } from "../../components/LinkButton.tsx";
import { Page, Section } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { ReleaseStatusMark } from "../../components/ReleaseStatusMark.tsx";
import { useSession } from "../../lib/session.tsx";
import { surveysQuery } from "../../lib/surveys.ts";

interface SurveyRelease {
  survey: SurveyView;
  release: ReleaseSummary;
}

/** What waits for this person: drafts to finish, releases to ask of, and how to begin where nothing is. */
export function HomePage() {
  const { person, permissions } = useSession();
  const surveys = useQuery(surveysQuery);
  if (surveys.isPending) return <PageLoading what="what waits for you" />;
  if (surveys.isError) return <PageError error={surveys.error} onRetry={surveys.refetch} />;
  const releases = surveys.data.surveys.flatMap((survey) => survey.releases.map((release) => ({ survey, release })));
  const drafts = releases.filter(({ release }) => release.can.publish);
  const published = releases.filter(({ release }) => release.status === "published");
  return (
    <Page title={`Good to see you, ${person.name.split(" ")[0] ?? person.name}`} windowTitle="Home">
      {drafts.length > 0 && (
        <Section title="Drafts that wait for you">
          <ul className="border-t border-line">
            {drafts.map(({ survey, release }) => (
              <Draft key={release.id} survey={survey} release={release} />
            ))}
          </ul>
        </Section>
      )}
      {published.length > 0 && (
        <Section title="Releases to ask of">
          <ul className="border-t border-line">
            {published.map(({ survey, release }) => (
              <Published key={release.id} survey={survey} release={release} />
            ))}
          </ul>
        </Section>
      )}
      {permissions.managePeople && (
        <Section title="Accounts">
          <p className="measure text-muted">Add people, give them roles, and help those who can't sign in.</p>
          <div className="mt-4">
            <LinkButton to="/people">Go to People</LinkButton>
          </div>
        </Section>
      )}
      {surveys.data.surveys.length === 0 && permissions.createSurvey && (
        <EmptyState
          title="No survey is in your care yet"
          actions={
            <LinkButton to="/holdings" kind="primary">
              Go to Holdings
            </LinkButton>
          }
        >
          <p>
            Create a survey, bring in a release of its microdata, declare the design, look at its readiness, and publish. Then
            give people access.
          </p>
        </EmptyState>
      )}
      {surveys.data.surveys.length === 0 && !permissions.createSurvey && permissions.ask && (
        <EmptyState
          title="No survey is open to you yet"
          actions={<LinkButton to="/help">Read how figures come about</LinkButton>}
        >
          <p>
            A survey's steward gives access, for a purpose and until a day. Ask the steward of the survey you need; it will stand
            here.
          </p>
        </EmptyState>
      )}
    </Page>
  );
}

function Draft({ survey, release }: SurveyRelease) {
  const next = release.hasDesign
    ? { to: `/releases/${release.id}/readiness`, label: "Look at its readiness" }
    : { to: `/releases/${release.id}/design`, label: "Declare its design" };
  return (
    <li className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2 border-b border-line py-3">
      <div>
        <Link className="link font-medium" to={`/releases/${release.id}`}>
          {survey.title}, {release.wave}
        </Link>
        <p className="text-sm text-muted">
          {release.respondents !== null && `${formatCounted(release.respondents, "respondent")} · `}brought in on{" "}
          {formatDate(release.createdAt)}
        </p>
      </div>
      <div className="flex items-center gap-5">
        <ReleaseStatusMark status={release.status} />
        <LinkButton to={next.to}>{next.label}</LinkButton>
      </div>
    </li>
  );
}

function Published({ survey, release }: SurveyRelease) {
  return (
    <li className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2 border-b border-line py-3">
      <div>
        <Link className="link font-medium" to={`/releases/${release.id}`}>
          {survey.title}, {release.wave}
        </Link>
        <p className="text-sm text-muted">
          {release.respondents !== null && formatCounted(release.respondents, "respondent")}
          {release.publishedAt !== null && ` · published on ${formatDate(release.publishedAt)}`}
          {survey.grantEndsOn !== null && ` · your access ends on ${formatDate(survey.grantEndsOn)}`}
        </p>
      </div>
      {release.can.ask && <LinkButton to={`/ask?release=${release.id}`}>Ask</LinkButton>}
    </li>
  );
}
