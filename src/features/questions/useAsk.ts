import { useMemo } from "react";
import { useLocation, useNavigate } from "react-router-dom";
import { readAddress, writeAddress, type Ask } from "./address.ts";
import { tidyDraft, type Draft } from "./draft.ts";

/** The ask in the address, and ways to change it. A changed question is a new step of the history; a look at it isn't. */
export function useAsk() {
  const { search, pathname } = useLocation();
  const navigate = useNavigate();
  const ask = useMemo(() => readAddress(search), [search]);
  const go = (next: Ask, isStep: boolean) =>
    void navigate({ pathname, search: writeAddress(next) }, { replace: !isStep, preventScrollReset: true });
  return {
    ...ask,
    /** Changes the question. */
    change: (changes: Partial<Draft>) => go({ ...ask, draft: tidyDraft({ ...ask.draft, ...changes }) }, true),
    /** Changes how the answer is looked at. */
    look: (changes: Partial<Omit<Ask, "draft">>) => go({ ...ask, ...changes }, false),
  };
}
