import { strToU8, zipSync } from "fflate";
import type { Table } from "../../../shared/contracts/tables.ts";
import { tableCsv } from "./tableCsv.ts";

/**
 * Everything to work a table out again, as a zip: figures (CSV), the question (JSON), how it was done in words, and a
 * script in R where there is one for such a question.
 */
export function tableBundle(table: Table, script: string | null): Uint8Array<ArrayBuffer> {
  const { release } = table;
  const method = [
    table.caption,
    "",
    `Source: ${release.surveyTitle}, ${release.wave}; SHA-256 of the columns ${release.checksum}; ${table.engine}.`,
    "",
    ...table.notes,
    "",
    script === null
      ? "There is no script for this kind of question yet; the notes above say how its figures are worked out."
      : "table.R works the figures out again: Rscript table.R microdata.csv, with the CSV that the release was brought in from.",
    "",
  ].join("\n");
  return zipSync({
    "figures.csv": strToU8(`\uFEFF${tableCsv(table)}`),
    "question.json": strToU8(`${JSON.stringify(table.question, null, 2)}\n`),
    "method.txt": strToU8(method),
    ...(script === null ? {} : { "table.R": strToU8(script) }),
  });
}
