import { Question, type Outcome } from "../../../shared/contracts/questions.ts";

/** A question while it is being put together: the release and the outcome may still be missing. */
export type Draft = Omit<Question, "releaseId" | "outcome"> & { releaseId: string | null; outcome: Outcome | null };

export const emptyDraft: Draft = {
  releaseId: null,
  outcome: null,
  down: [],
  across: [],
  comparison: { kind: "none" },
  level: 95,
  interval: "korn-graubard",
  difference: "linear",
  adjustment: "none",
  adjustFor: [],
  overall: [],
};

/** The question a draft puts once nothing is missing. */
export function questionOf(draft: Draft): Question | null {
  const { success, data } = Question.safeParse(draft);
  return success ? data : null;
}

/** The same draft where a comparison with what is no longer there is let go: a group of a split, or the release asked of itself. */
export function tidyDraft(draft: Draft): Draft {
  const { comparison } = draft;
  if (comparison.kind === "release" && comparison.releaseId === draft.releaseId)
    return { ...draft, comparison: { kind: "none" } };
  if (comparison.kind !== "group") return draft;
  const breakdown = [...draft.down, ...draft.across].find(({ variable }) => variable === comparison.breakdown);
  const isThere = breakdown !== undefined && (!breakdown.bands || Number(comparison.value) <= breakdown.bands.length);
  return isThere ? draft : { ...draft, comparison: { kind: "none" } };
}
