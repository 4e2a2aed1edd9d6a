import { useQuery } from "@tanstack/react-query";
import { surveysQuery } from "../../lib/surveys.ts";
import { Page } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { AskBoard } from "./AskBoard.tsx";
import { NothingToAsk } from "./AskStart.tsx";
import { askableReleases } from "./releases.ts";

/** Where a question is put. */
export function AskPage() {
  const surveys = useQuery(surveysQuery);
  if (surveys.isPending) return <PageLoading what="the surveys open to you" />;
  if (surveys.isError) return <PageError error={surveys.error} onRetry={surveys.refetch} />;
  const releases = askableReleases(surveys.data.surveys);
  if (releases.length === 0)
    return (
      <Page title="Ask" lead="Of every 100 people in each group, how many are affected?">
        <NothingToAsk hasSurveys={surveys.data.surveys.length > 0} />
      </Page>
    );
  return <AskBoard releases={releases} />;
}
