import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { useParams } from "react-router-dom";
import type { GrantView } from "../../../shared/contracts/access.ts";
import { formatDate } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { DataTable } from "../../components/DataTable.tsx";
import { ConfirmDialog } from "../../components/Dialog.tsx";
import { EmptyState } from "../../components/EmptyState.tsx";
import { Page, Section } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { columnsFor } from "../../components/tableFeatures.ts";
import { GiveGrantForm } from "./GiveGrantForm.tsx";
import { grantsQuery, useRevokeGrant } from "./queries.ts";
import { Stewards } from "./Stewards.tsx";

const column = columnsFor<GrantView>();

function stateOf({ status, endsOn, revokedAt, revokedBy }: GrantView): string {
  if (status === "active") return `Holds until ${formatDate(endsOn)}`;
  if (status === "ended") return `Ended on ${formatDate(endsOn)}`;
  return `Taken back${revokedAt ? ` on ${formatDate(revokedAt)}` : ""}${revokedBy ? ` by ${revokedBy}` : ""}`;
}

/** Who may ask of a survey, why and until when; here it is given and taken back. */
export function AccessPage() {
  const { surveyId = "" } = useParams();
  const grants = useQuery(grantsQuery(surveyId));
  const [revoking, setRevoking] = useState<GrantView | null>(null);
  const revoke = useRevokeGrant(surveyId);
  if (grants.isPending) return <PageLoading what="access" />;
  if (grants.isError) return <PageError error={grants.error} onRetry={grants.refetch} />;
  const close = () => {
    setRevoking(null);
    revoke.reset();
  };
  const columns = column.columns([
    column.accessor(({ person }) => person.name, {
      id: "person",
      header: "Person",
      cell: ({ row }) => (
        <>
          <span className="block min-w-52 font-medium">{row.original.person.name}</span>
          <span className="block wrap-anywhere text-muted">{row.original.person.email}</span>
        </>
      ),
    }),
    column.accessor("purpose", { header: "For what" }),
    column.accessor(stateOf, { id: "state", header: "State" }),
    column.accessor("givenAt", {
      header: "Given",
      cell: ({ row }) => `${formatDate(row.original.givenAt)} by ${row.original.givenBy}`,
    }),
    column.display({
      id: "acts",
      header: () => <span className="sr-only">Acts</span>,
      cell: ({ row }) =>
        row.original.can.revoke && (
          <Button
            kind="plain"
            aria-label={`Take back from ${row.original.person.name}`}
            onPress={() => setRevoking(row.original)}
          >
            Take back
          </Button>
        ),
    }),
  ]);
  const { surveyTitle } = grants.data;
  return (
    <Page
      title="Access"
      windowTitle={`Access to ${surveyTitle}`}
      parent={{ to: `/surveys/${surveyId}`, label: surveyTitle }}
      lead="A survey is visible to its stewards and to people with a grant. A grant names a purpose and ends by itself; taking it back holds from the very next request."
    >
      <Section title="Give access">
        <GiveGrantForm surveyId={surveyId} />
      </Section>
      <Section title="Grants">
        {grants.data.grants.length === 0 ? (
          <EmptyState title="Nobody has a grant yet">
            <p>
              Only the survey's stewards see it so far. Give an epidemiologist or a planner access above; they find the survey
              under Holdings and on Ask.
            </p>
          </EmptyState>
        ) : (
          <DataTable caption="Grants" columns={columns} rows={grants.data.grants} rowKey={({ id }) => id} />
        )}
      </Section>
      <Stewards surveyId={surveyId} />
      <ConfirmDialog
        title={`Take access back from ${revoking?.person.name ?? ""}?`}
        isOpen={revoking !== null}
        onClose={close}
        confirm="Take back"
        isDanger
        isPending={revoke.isPending}
        error={revoke.error}
        onConfirm={() => revoking && revoke.mutate(revoking.id, { onSuccess: close })}
      >
        <p>
          From their very next request on, “{surveyTitle}” isn't there for them. What they already took away stays with them. The
          ledger keeps both acts.
        </p>
      </ConfirmDialog>
    </Page>
  );
}
