import { useQuery } from "@tanstack/react-query";
import { Outlet, useOutletContext, useParams } from "react-router-dom";
import type { ReleaseView } from "../../../shared/contracts/holdings.ts";
import { LinkButton } from "../../components/LinkButton.tsx";
import { Page } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { PageTabs } from "../../components/PageTabs.tsx";
import { ReleaseStatusMark } from "../../components/ReleaseStatusMark.tsx";
import { releaseQuery } from "./queries.ts";

/** Around a release's tabs; those for stewards only are offered to them alone. */
export function ReleaseLayout() {
  const { releaseId = "" } = useParams();
  const release = useQuery(releaseQuery(releaseId));
  if (release.isPending) return <PageLoading what="the release" />;
  if (release.isError) return <PageError error={release.error} onRetry={release.refetch} />;
  const { id, surveyId, surveyTitle, wave, status, can } = release.data;
  const address = `/releases/${id}`;
  const tabs = [
    { to: address, label: "Overview", isIndex: true },
    { to: `${address}/codebook`, label: "Codebook" },
    ...(can.import
      ? [
          { to: `${address}/design`, label: "Design" },
          { to: `${address}/readiness`, label: "Readiness" },
        ]
      : []),
  ];
  return (
    <Page
      title={wave}
      windowTitle={`${surveyTitle}, ${wave}`}
      parent={{ to: `/surveys/${surveyId}`, label: surveyTitle }}
      lead={<ReleaseStatusMark status={status} />}
      actions={
        can.ask && (
          <LinkButton kind="primary" to={`/ask?release=${id}`}>
            Ask
          </LinkButton>
        )
      }
    >
      <PageTabs label="Parts of the release" tabs={tabs} />
      <Outlet context={release.data} />
    </Page>
  );
}

/** The release whose tab this is. */
export const useRelease = () => useOutletContext<ReleaseView>();
