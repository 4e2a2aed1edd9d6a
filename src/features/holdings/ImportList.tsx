import { useQuery, useQueryClient } from "@tanstack/react-query";
import { useEffect, useRef } from "react";
import type { ImportView } from "../../../shared/contracts/imports.ts";
import { formatCounted, formatDateTime } from "../../../shared/format.ts";
import { Button } from "../../components/Button.tsx";
import { LinkButton } from "../../components/LinkButton.tsx";
import { Notice } from "../../components/Notice.tsx";
import { Section } from "../../components/Page.tsx";
import { ProgressBar } from "../../components/ProgressBar.tsx";
import { messageOf } from "../../lib/form.ts";
import { surveysQuery } from "../../lib/surveys.ts";
import { importsQuery, isUnderWay, useCancelImport } from "./queries.ts";
import { ProblemReport } from "./ProblemReport.tsx";

/** Imports that run, with their progress, and how the last ones ended. */
export function ImportList({ surveyId }: { surveyId: string }) {
  const imports = useQuery(importsQuery(surveyId));
  const client = useQueryClient();
  const underWay = imports.data?.imports.filter(isUnderWay).length ?? 0;
  const before = useRef(0);
  useEffect(() => {
    // One has ended: its release is there now.
    if (underWay < before.current) void client.invalidateQueries({ queryKey: surveysQuery.queryKey });
    before.current = underWay;
  }, [underWay, client]);
  if (imports.isError) return <Notice kind="wrong">{messageOf(imports.error)}</Notice>;
  const list = imports.data?.imports ?? [];
  const running = list.filter(isUnderWay);
  const [latest, ...earlier] = list.filter((view) => !isUnderWay(view));
  if (list.length === 0) return null;
  return (
    <Section title="Imports">
      <ul className="space-y-6" aria-live="polite">
        {running.map((view) => (
          <li key={view.id}>
            <Running view={view} />
          </li>
        ))}
        {latest && (
          <li key={latest.id}>
            <Ended view={latest} />
          </li>
        )}
      </ul>
      {earlier.length > 0 && (
        <details className="mt-4">
          <summary className="link cursor-pointer">{formatCounted(earlier.length, "earlier import")}</summary>
          <ul className="mt-4 space-y-4">
            {earlier.map((view) => (
              <li key={view.id}>
                <Ended view={view} />
              </li>
            ))}
          </ul>
        </details>
      )}
    </Section>
  );
}

function Running({ view }: { view: ImportView }) {
  const cancel = useCancelImport(view.surveyId);
  return (
    <div className="measure">
      <ProgressBar
        label={`${view.wave}: ${view.stage}`}
        value={view.bytesTotal > 0 ? view.bytesDone / view.bytesTotal : null}
        detail={view.rows > 0 ? formatCounted(view.rows, "row") : ""}
      />
      <div className="mt-2 flex flex-wrap items-center gap-4">
        <Button
          onPress={() => cancel.mutate(view.id)}
          isPending={cancel.isPending}
          isDisabled={!view.can.cancel || cancel.isSuccess}
        >
          {cancel.isSuccess ? "Stopping" : "Cancel"}
        </Button>
        <span className="text-sm text-muted">You may leave this page; the import goes on.</span>
      </div>
      {cancel.isError && <Notice kind="wrong">{messageOf(cancel.error)}</Notice>}
    </div>
  );
}

function Ended({ view }: { view: ImportView }) {
  const when = view.endedAt === null ? "" : formatDateTime(view.endedAt);
  if (view.status === "cancelled")
    return (
      <Notice title={`${view.wave} was cancelled`}>
        <p>{when}. Nothing of it was kept.</p>
      </Notice>
    );
  if (view.status === "failed")
    return (
      <Notice kind="caution" title={`${view.wave} was not brought in`}>
        <p>{when}. Nothing of it was kept. Mend what is named here and bring the files in again.</p>
        <ProblemReport problems={view.problems} />
      </Notice>
    );
  return (
    <Notice kind={view.problems.length > 0 ? "note" : "done"} title={`${view.wave} was brought in`}>
      <p>
        {when}. {formatCounted(view.rows, "row")}
        {view.problems.length > 0 ? "; some things were guessed or need a look:" : ", and nothing to remark."}
      </p>
      <ProblemReport problems={view.problems} />
      {view.releaseId !== null && (
        <p className="pt-2">
          <LinkButton to={`/releases/${view.releaseId}`}>Open the release</LinkButton>
        </p>
      )}
    </Notice>
  );
}
