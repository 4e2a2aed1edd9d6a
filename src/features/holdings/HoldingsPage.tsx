import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { Link } from "react-router-dom";
import type { SurveyView } from "../../../shared/contracts/holdings.ts";
import { formatDate } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { EmptyState } from "../../components/EmptyState.tsx";
import { Page } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { ReleaseStatusMark } from "../../components/ReleaseStatusMark.tsx";
import { useSession } from "../../lib/session.tsx";
import { surveysQuery } from "../../lib/surveys.ts";
import { SurveyDialog } from "./SurveyDialog.tsx";
import { useCreateSurvey } from "./queries.ts";

/** The surveys this person may see, with their releases. */
export function HoldingsPage() {
  const { permissions } = useSession();
  const surveys = useQuery(surveysQuery);
  const [isCreating, setIsCreating] = useState(false);
  const create = useCreateSurvey();
  if (surveys.isPending) return <PageLoading what="the holdings" />;
  if (surveys.isError) return <PageError error={surveys.error} onRetry={surveys.refetch} />;
  const list = surveys.data.surveys;
  return (
    <Page
      title="Holdings"
      lead="Surveys that are open to you, and their releases."
      actions={
        permissions.createSurvey && (
          <Button kind="primary" onPress={() => setIsCreating(true)}>
            New survey
          </Button>
        )
      }
    >
      {list.length === 0 ? (
        <EmptyState title={permissions.createSurvey ? "No survey is in your care yet" : "No survey is open to you yet"}>
          <p>
            {permissions.createSurvey
              ? "Create a survey, then bring in its microdata with a codebook. Nobody else sees it until you publish a release and give access."
              : "A survey's steward gives access, for a purpose and until a day. Once given, the survey stands here."}
          </p>
        </EmptyState>
      ) : (
        <div className="space-y-10">
          {list.map((survey) => (
            <Survey key={survey.id} survey={survey} />
          ))}
        </div>
      )}
      <SurveyDialog
        title="New survey"
        save="Create the survey"
        isOpen={isCreating}
        onClose={() => setIsCreating(false)}
        mutation={create}
      />
    </Page>
  );
}

function Survey({ survey }: { survey: SurveyView }) {
  return (
    <section aria-label={survey.title}>
      <h2 className="text-xl font-light">
        <Link to={`/surveys/${survey.id}`} className="link">
          {survey.title}
        </Link>
      </h2>
      {survey.description !== "" && <p className="measure mt-1 text-sm text-muted">{survey.description}</p>}
      <p className="mt-1 text-sm text-muted">
        Kept by {survey.stewards.map(({ name }) => name).join(", ")}
        {survey.grantEndsOn !== null && `. Your access ends on ${formatDate(survey.grantEndsOn)}.`}
      </p>
      {survey.releases.length > 0 && (
        <ul className="mt-3 flex flex-wrap gap-x-8 gap-y-2">
          {survey.releases.map((release) => (
            <li key={release.id} className="inline-flex items-center gap-2">
              <Link className="link font-medium" to={`/releases/${release.id}`}>
                {release.wave}
              </Link>
              <span className="text-sm text-muted">
                <ReleaseStatusMark status={release.status} />
              </span>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
