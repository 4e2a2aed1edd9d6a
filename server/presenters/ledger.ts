import Papa from "papaparse";
import type { LedgerEntryView } from "../../shared/contracts/ledger.ts";
import { guardTextCell } from "../../shared/csv.ts";
import type { LedgerLine } from "../services/readLedger.ts";

/** An entry of the ledger. */
export function presentLedgerLine({ entry, surveyTitle }: LedgerLine): LedgerEntryView {
  return {
    id: entry.id,
    at: entry.at.toISOString(),
    actor: entry.actorName,
    action: entry.action,
    surveyId: entry.surveyId,
    surveyTitle,
    summary: entry.summary,
  };
}

/** Entries as CSV (RFC 4180), text guarded against formulas. */
export function ledgerCsv(lines: readonly LedgerLine[]): string {
  const rows = lines.map(presentLedgerLine).map((line) => ({
    id: line.id,
    at: line.at,
    person: guardTextCell(line.actor ?? ""),
    act: line.action,
    survey: guardTextCell(line.surveyTitle ?? ""),
    summary: guardTextCell(line.summary),
  }));
  return Papa.unparse(rows, { columns: ["id", "at", "person", "act", "survey", "summary"], newline: "\r\n" });
}
