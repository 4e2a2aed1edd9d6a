import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { questionSentence } from "../../../shared/wording.ts";
import { Notice } from "../../components/Notice.tsx";
import { Page } from "../../components/Page.tsx";
import { PageError } from "../../components/PageError.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { Answer } from "./Answer.tsx";
import { AskStart } from "./AskStart.tsx";
import { questionOf } from "./draft.ts";
import { cellId, cellsById, type CellId } from "./pivot.ts";
import { codebookQuery, tableQuery } from "./queries.ts";
import { QuestionLine } from "./QuestionLine.tsx";
import { Reading } from "./Reading.tsx";
import type { AskableRelease } from "./releases.ts";
import { useAsk } from "./useAsk.ts";
import { askable } from "./variables.ts";

/** The question line, its answer and the reading of one cell. */
export function AskBoard({ releases }: { releases: readonly AskableRelease[] }) {
  const ask = useAsk();
  const draft = { ...ask.draft, releaseId: ask.draft.releaseId ?? releases[0]?.id ?? null };
  const question = questionOf(draft);
  const codebook = useQuery({ ...codebookQuery(draft.releaseId ?? ""), placeholderData: keepPreviousData });
  const table = useQuery(tableQuery(question));
  const [chosen, setChosen] = useState<CellId | null>(null);

  if (codebook.isPending) return <PageLoading what="the codebook" />;
  if (codebook.isError) return <PageError error={codebook.error} onRetry={codebook.refetch} />;
  const variables = askable(codebook.data);
  const release = releases.find(({ id }) => id === draft.releaseId);
  const change: typeof ask.change = (changes) => ask.change({ releaseId: draft.releaseId, ...changes });
  const cells = question && table.data ? cellsById(table.data) : null;
  const wholeId = cellId(table.data?.breakdowns.map(() => null) ?? []);
  const selected = chosen !== null && cells?.has(chosen) ? chosen : wholeId;
  const cell = cells?.get(selected);

  return (
    <Page
      title={<QuestionLine draft={draft} releases={releases} variables={variables} onChange={change} />}
      windowTitle={
        question && release
          ? questionSentence(question, {
              surveyTitle: release.surveyTitle,
              wave: release.wave,
              variables: codebook.data.variables,
            })
          : "Ask"
      }
      aside={table.data && cell ? <Reading cell={cell} table={table.data} variables={codebook.data.variables} /> : undefined}
    >
      {ask.unread.length > 0 && (
        <div className="mb-6">
          <Notice kind="caution" title="Part of this address couldn't be read.">
            Left out: {ask.unread.join(", ")}. The sentence above is what is asked; choose those parts anew.
          </Notice>
        </div>
      )}
      {question ? (
        <Answer
          query={table}
          draft={draft}
          view={ask.view}
          measures={ask.measures}
          variables={codebook.data.variables}
          selected={selected}
          onSelect={setChosen}
          onChange={change}
          onLook={ask.look}
        />
      ) : (
        <AskStart variables={variables} onChange={change} />
      )}
    </Page>
  );
}
