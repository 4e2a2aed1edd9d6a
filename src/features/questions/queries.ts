import { keepPreviousData, queryOptions, skipToken } from "@tanstack/react-query";
import { CodebookView } from "../../../shared/contracts/codebook.ts";
import type { Question } from "../../../shared/contracts/questions.ts";
import { ScriptView, Table } from "../../../shared/contracts/tables.ts";
import { api, Nothing } from "../../lib/api.ts";

const TABLE_STALE_MS = 10 * 60_000;

/** The variables a question can be put with. */
export const codebookQuery = (releaseId: string) =>
  queryOptions({
    queryKey: ["codebook", releaseId],
    queryFn: ({ signal }) => api.get(`/api/releases/${releaseId}/codebook`, CodebookView, { signal }),
  });

/** The answer to a question; the last one stays in view while another is worked out. A release never changes, so it keeps. */
export const tableQuery = (question: Question | null) =>
  queryOptions({
    queryKey: ["tables", question],
    queryFn: question ? () => api.post("/api/tables", question, Table) : skipToken,
    placeholderData: keepPreviousData,
    staleTime: TABLE_STALE_MS,
  });

export type DownloadFormat = "csv" | "text" | "png" | "svg" | "bundle";

/** Says to the ledger that figures leave the page; they may be saved once it has answered. */
export const recordDownload = (question: Question, format: DownloadFormat) =>
  api.post("/api/tables/downloads", { question, format }, Nothing);

/** A script in R that works the table out again; null where there is none for such a question. */
export const fetchScript = (question: Question) => api.post("/api/tables/script", { question }, ScriptView);
