import { infiniteQueryOptions } from "@tanstack/react-query";
import { LedgerView, type LedgerAction } from "../../../shared/contracts/ledger.ts";
import { api } from "../../lib/api.ts";

export interface LedgerFilter {
  survey: string | null;
  action: LedgerAction | null;
  text: string;
}

/** A filter as a query string, for the API and for the file to download. */
export function ledgerSearch({ survey, action, text }: LedgerFilter, before: number | null = null): string {
  const search = new URLSearchParams();
  if (survey) search.set("survey", survey);
  if (action) search.set("action", action);
  if (text.trim() !== "") search.set("text", text.trim());
  if (before !== null) search.set("before", String(before));
  const written = search.toString();
  return written === "" ? "" : `?${written}`;
}

export const ledgerQuery = (filter: LedgerFilter) =>
  infiniteQueryOptions({
    queryKey: ["ledger", filter],
    queryFn: ({ signal, pageParam }) => api.get(`/api/ledger${ledgerSearch(filter, pageParam)}`, LedgerView, { signal }),
    initialPageParam: null as number | null,
    getNextPageParam: ({ next }) => next,
  });
