import Papa from "papaparse";
import { VariableKind } from "../../shared/contracts/codebook.ts";
import { guardTextCell } from "../../shared/csv.ts";
import type { CodebookEntry } from "./codebook.ts";
import { readRecords } from "./csvRecords.ts";
import type { ProblemLog } from "./problems.ts";

/**
 * Columns of a codebook file. A variable has one row with an empty `code` that gives its label and kind (categorical,
 * numeric or text), then a row for each category, or for each missing code of a numeric variable (`missing`: yes).
 */
export const CODEBOOK_COLUMNS = ["variable", "label", "kind", "code", "category label", "missing"] as const;
type Column = (typeof CODEBOOK_COLUMNS)[number];

const YES = new Set(["yes", "y", "true", "1", "x"]);
const NO = new Set(["", "no", "n", "false", "0"]);
const NAME_LIMIT = 64;
const LABEL_LIMIT = 400;

type Report = (kind: string, message: string, line: number, column?: string, value?: string) => void;

function headerOf(header: readonly string[], problems: ProblemLog): Map<Column, number> {
  const found = new Map<Column, number>();
  header.forEach((name, i) => {
    const column = CODEBOOK_COLUMNS.find((known) => known === name.trim().toLowerCase());
    if (column) found.set(column, i);
  });
  if (!found.has("variable") || !found.has("kind")) {
    const message = `A codebook needs a header line with the columns ${CODEBOOK_COLUMNS.join(", ")}; at least “variable” and “kind”. The template shows how.`;
    problems.stop({ kind: "codebook-header", file: "codebook", message }, { line: 1, value: header.join(", ") });
  }
  return found;
}

/** One row of a codebook file by column, trimmed. */
type Row = (column: Column) => string;

function addVariable(entries: Map<string, CodebookEntry>, row: Row, line: number, report: Report): void {
  const name = row("variable");
  const kind = VariableKind.safeParse(row("kind").toLowerCase());
  if (name.length > NAME_LIMIT)
    return report("codebook-name", `A variable's name has at most ${NAME_LIMIT} characters.`, line, "variable", name);
  if (entries.has(name))
    return report("codebook-duplicate", "A variable is described twice. Keep one of its rows.", line, "variable", name);
  if (!kind.success) {
    report("codebook-kind", "A kind is categorical, numeric or text.", line, "kind", row("kind"));
    return;
  }
  entries.set(name, { name, label: row("label").slice(0, LABEL_LIMIT), kind: kind.data, categories: [] });
}

function addCategory(entries: Map<string, CodebookEntry>, row: Row, line: number, report: Report): void {
  const entry = entries.get(row("variable"));
  if (!entry)
    return report(
      "codebook-order",
      "A category stands before its variable's own row. Put the variable's row first.",
      line,
      "variable",
      row("variable"),
    );
  const code = row("code");
  const missing = row("missing").toLowerCase();
  if (entry.categories.some((category) => category.code === code))
    return report("codebook-code-twice", "A variable has the same code twice.", line, entry.name, code);
  if (code.length > 200) return report("codebook-code", "A code has at most 200 characters.", line, entry.name, code);
  if (!YES.has(missing) && !NO.has(missing))
    return report("codebook-missing", "“missing” is yes or no (or empty).", line, entry.name, row("missing"));
  entry.categories.push({ code, label: row("category label").slice(0, LABEL_LIMIT), isMissing: YES.has(missing) });
}

/** Reads a codebook file. What is wrong stands in `problems`. @throws {UnreadableFile} where it can't be read on. */
export async function readCodebook(path: string, problems: ProblemLog, signal: AbortSignal): Promise<CodebookEntry[]> {
  const entries = new Map<string, CodebookEntry>();
  const report: Report = (kind, message, line, column, value) => {
    problems.add({ kind, severity: "error", file: "codebook", message }, { line, column, value });
  };
  let columns: Map<Column, number> | null = null;
  for await (const { rows, lines } of readRecords(path, "codebook", problems, { signal })) {
    rows.forEach((cells, i) => {
      if (columns === null) {
        columns = headerOf(cells, problems);
        return;
      }
      const present = columns;
      const row: Row = (column) => (cells[present.get(column) ?? -1] ?? "").trim();
      if (cells.every((cell) => cell.trim() === "")) return;
      const line = lines[i]!;
      if (row("variable") === "") report("codebook-no-variable", "A row names no variable.", line, "variable", cells.join(", "));
      else if (row("code") === "") addVariable(entries, row, line, report);
      else addCategory(entries, row, line, report);
    });
  }
  if (entries.size === 0 && !problems.hasErrors())
    problems.stop({
      kind: "codebook-empty",
      file: "codebook",
      message: "The codebook describes no variable. Add its rows, or bring the microdata in without one.",
    });
  return [...entries.values()];
}

/** A codebook as a file that can be brought in again. */
export function writeCodebook(entries: readonly CodebookEntry[]): string {
  const lines = entries.flatMap(({ name, label, kind, categories }) => [
    [name, guardTextCell(label), kind, "", "", ""],
    ...categories.map((category) => [
      name,
      "",
      "",
      category.code,
      guardTextCell(category.label),
      category.isMissing ? "yes" : "",
    ]),
  ]);
  return `${Papa.unparse({ fields: [...CODEBOOK_COLUMNS], data: lines }, { newline: "\r\n" })}\r\n`;
}

/** An example with each kind of row. */
export const CODEBOOK_TEMPLATE = writeCodebook([
  { name: "respondent", label: "Respondent's number", kind: "text", categories: [] },
  { name: "weight", label: "Weight: design and non-response", kind: "numeric", categories: [] },
  {
    name: "stratum",
    label: "Stratum",
    kind: "categorical",
    categories: [
      { code: "1", label: "North, towns", isMissing: false },
      { code: "2", label: "North, villages", isMissing: false },
    ],
  },
  {
    name: "smoking",
    label: "Smoking now",
    kind: "categorical",
    categories: [
      { code: "1", label: "Daily", isMissing: false },
      { code: "2", label: "Less than daily", isMissing: false },
      { code: "3", label: "Not at all", isMissing: false },
      { code: "9", label: "Refused", isMissing: true },
    ],
  },
  {
    name: "visits",
    label: "Visits to a doctor in three months",
    kind: "numeric",
    categories: [{ code: "98", label: "Does not know", isMissing: true }],
  },
]);
