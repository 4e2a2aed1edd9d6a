import { keepPreviousData, queryOptions, skipToken } from "@tanstack/react-query";
import { CodebookView } from "../../../shared/contracts/codebook.ts";
import type { Question } from "../../../shared/contracts/questions.ts";
import { Table } from "../../../shared/contracts/tables.ts";
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

export type DownloadFormat = "csv" | "text" | "png" | "svg";

/** Says to the ledger that figures leave the page; they may be saved once it has answered. */
export const recordDownload = (question: Question, format: DownloadFormat) =>
  api.post("/api/tables/downloads", { question, format }, Nothing);
