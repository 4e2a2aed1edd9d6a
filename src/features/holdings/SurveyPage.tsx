import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { Link, useParams } from "react-router-dom";
import type { ReleaseSummary, SurveyView } from "../../../shared/contracts/holdings.ts";
import { formatCount, formatDate } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { DataTable } from "../../components/DataTable.tsx";
import { EmptyState } from "../../components/EmptyState.tsx";
import { LinkButton } from "../../components/LinkButton.tsx";
import { Page, Section } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { ReleaseStatusMark } from "../../components/ReleaseStatusMark.tsx";
import { columnsFor } from "../../components/tableFeatures.ts";
import { surveyQuery } from "../../lib/surveys.ts";
import { BringInForm } from "./BringInForm.tsx";
import { ImportList } from "./ImportList.tsx";
import { useUpdateSurvey } from "./queries.ts";
import { SurveyDialog } from "./SurveyDialog.tsx";

const column = columnsFor<ReleaseSummary>();
const COLUMNS = column.columns([
  column.accessor("wave", {
    header: "Release",
    cell: ({ row }) => (
      <Link className="link font-medium" to={`/releases/${row.original.id}`}>
        {row.original.wave}
      </Link>
    ),
  }),
  column.accessor("status", { header: "State", cell: ({ row }) => <ReleaseStatusMark status={row.original.status} /> }),
  column.accessor((release) => release.respondents ?? 0, {
    id: "respondents",
    header: "Respondents",
    cell: ({ getValue }) => formatCount(getValue()),
  }),
  column.accessor("variables", { header: "Variables", cell: ({ getValue }) => formatCount(getValue()) }),
  column.accessor((release) => release.publishedAt ?? "", {
    id: "published",
    header: "Published",
    cell: ({ row }) => (row.original.publishedAt ? formatDate(row.original.publishedAt) : "Not yet"),
  }),
  column.display({
    id: "acts",
    header: () => <span className="sr-only">Acts</span>,
    cell: ({ row }) =>
      row.original.can.ask && (
        <LinkButton kind="plain" to={`/ask?release=${row.original.id}`}>{`Ask of ${row.original.wave}`}</LinkButton>
      ),
  }),
]);

/** One survey: its releases, and for its stewards the way to bring in another. */
export function SurveyPage() {
  const { surveyId = "" } = useParams();
  const survey = useQuery(surveyQuery(surveyId));
  if (survey.isPending) return <PageLoading what="the survey" />;
  if (survey.isError) return <PageError error={survey.error} onRetry={survey.refetch} />;
  return <Survey survey={survey.data} />;
}

function Survey({ survey }: { survey: SurveyView }) {
  const [isEditing, setIsEditing] = useState(false);
  const update = useUpdateSurvey(survey.id);
  return (
    <Page
      title={survey.title}
      parent={{ to: "/holdings", label: "Holdings" }}
      lead={
        <>
          {survey.description !== "" && <p>{survey.description}</p>}
          <p className="mt-1 text-sm">
            Kept by {survey.stewards.map(({ name }) => name).join(", ")}.
            {survey.grantEndsOn !== null && ` Your access ends on ${formatDate(survey.grantEndsOn)}.`}
          </p>
        </>
      }
      actions={
        <>
          {survey.can.manageAccess && <LinkButton to={`/surveys/${survey.id}/access`}>Access</LinkButton>}
          {survey.can.update && <Button onPress={() => setIsEditing(true)}>Change the title</Button>}
        </>
      }
    >
      <Section title="Releases">
        {survey.releases.length === 0 ? (
          <EmptyState title="No release yet">
            <p>
              {survey.can.import
                ? "Bring in the microdata of a wave below. It stays a draft that only stewards see until you publish it."
                : "The stewards haven't published a release of this survey yet."}
            </p>
          </EmptyState>
        ) : (
          <DataTable
            caption={`Releases of ${survey.title}`}
            columns={COLUMNS}
            rows={survey.releases}
            rowKey={({ id }) => id}
            alignRight={["respondents", "variables"]}
          />
        )}
      </Section>
      {survey.can.import && (
        <>
          <ImportList surveyId={survey.id} />
          <Section
            title="Bring in a release"
            lead="A CSV file with one row for each respondent and the variables' names in the first line. A codebook says what the codes mean; without one it is guessed from the values, and you can mend it before you publish."
          >
            <BringInForm surveyId={survey.id} />
          </Section>
        </>
      )}
      <SurveyDialog
        title="Title and description"
        save="Keep the changes"
        survey={survey}
        isOpen={isEditing}
        onClose={() => setIsEditing(false)}
        mutation={update}
      />
    </Page>
  );
}
