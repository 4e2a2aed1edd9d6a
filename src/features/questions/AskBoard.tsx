import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { questionSentence } from "../../../shared/wording.ts";
import { Notice } from "../../components/Notice.tsx";
import { Page } from "../../components/Page.tsx";
import { PageLoading } from "../../components/PageLoading.tsx";
import { Answer } from "./Answer.tsx";
import { AskStart } from "./AskStart.tsx";
import { questionOf } from "./draft.ts";
import { cellId, cellsById, type CellId } from "./pivot.ts";
import { codebookQuery, tableQuery } from "./queries.ts";
import { QuestionLine } from "./QuestionLine.tsx";
import { Refusal } from "./Refusal.tsx";
import { Reading } from "./Reading.tsx";
import { otherWaves, type AskableRelease } from "./releases.ts";
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

  const change: typeof ask.change = (changes) => ask.change({ releaseId: draft.releaseId, ...changes });
  const known = codebook.data?.variables ?? [];
  const variables = codebook.data ? askable(codebook.data) : [];
  const release = releases.find(({ id }) => id === draft.releaseId);
  const cells = codebook.data && question && table.data ? cellsById(table.data) : null;
  const wholeId = cellId(table.data?.breakdowns.map(() => null) ?? []);
  const selected = chosen !== null && cells?.has(chosen) ? chosen : wholeId;
  const cell = cells?.get(selected);

  // The sentence keeps its place through every state: a chooser that is open in it must not be taken down.
  return (
    <Page
      title={
        <QuestionLine draft={draft} releases={releases} variables={variables} isPending={codebook.isPending} onChange={change} />
      }
      windowTitle={
        question && release && codebook.data
          ? questionSentence(question, {
              surveyTitle: release.surveyTitle,
              wave: release.wave,
              variables: known,
              waves: otherWaves(releases, draft.releaseId),
            })
          : "Ask"
      }
      aside={table.data && cell ? <Reading cell={cell} table={table.data} variables={known} /> : undefined}
    >
      {ask.unread.length > 0 && (
        <div className="mb-6">
          <Notice kind="caution" title="Part of this address couldn't be read.">
            Left out: {ask.unread.join(", ")}. The sentence above is what is asked; choose those parts anew.
          </Notice>
        </div>
      )}
      {codebook.isPending ? (
        <PageLoading what="the codebook" />
      ) : codebook.isError ? (
        <Refusal error={codebook.error} onRetry={codebook.refetch} />
      ) : question ? (
        <Answer
          query={table}
          draft={draft}
          view={ask.view}
          measures={ask.measures}
          variables={known}
          askableVariables={variables}
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
