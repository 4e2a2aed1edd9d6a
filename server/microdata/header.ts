import type { CodebookEntry } from "./codebook.ts";
import { COLUMN_LIMIT } from "./csvRecords.ts";
import { parseNumber } from "./numbers.ts";
import { UnreadableFile, type ProblemLog } from "./problems.ts";

const NAME_LIMIT = 64;
const file = "microdata";

/**
 * Names of the variables from a header line.
 * @throws {UnreadableFile} with every name that can't be used in `problems`.
 */
export function readHeader(header: readonly string[], problems: ProblemLog): string[] {
  const names = header.map((name) => name.trim());
  if (names.length > COLUMN_LIMIT)
    problems.stop({ kind: "too-many-columns", file, message: `The file has more than ${COLUMN_LIMIT} columns.` }, { line: 1 });
  if (names.every((name) => name === ""))
    problems.stop({ kind: "no-header", file, message: "The first line is blank. It must name the variables." }, { line: 1 });
  if (names.every((name) => parseNumber(name, true) !== null))
    problems.stop(
      {
        kind: "no-header",
        file,
        message: "The first line holds numbers, not names. Put a line with the variables' names first.",
      },
      { line: 1, value: names.join(", ") },
    );
  const seen = new Set<string>();
  names.forEach((name, i) => {
    const place = { line: 1, column: String(i + 1), value: name };
    const report = (kind: string, message: string) => problems.add({ kind, severity: "error", file, message }, place);
    if (name === "") report("column-without-name", "A column has no name. Name every column in the first line.");
    else if (name.length > NAME_LIMIT) report("column-name-too-long", `A variable's name has at most ${NAME_LIMIT} characters.`);
    else if (seen.has(name)) report("duplicate-column", "Two columns have the same name. Rename one.");
    seen.add(name);
  });
  if (problems.hasErrors()) throw new UnreadableFile();
  return names;
}

/** Codebook entries of every column, by name, checked against the header. */
export function matchCodebook(
  names: readonly string[],
  codebook: readonly CodebookEntry[] | null,
  guesses: ReadonlyMap<string, CodebookEntry>,
  problems: ProblemLog,
): CodebookEntry[] {
  const inFile = new Set(names);
  const byName = new Map((codebook ?? []).map((entry) => [entry.name, entry]));
  const absent = [...byName.keys()].filter((name) => !inFile.has(name));
  for (const name of absent) {
    const all = absent.length === byName.size;
    const message = all
      ? "None of the codebook's variables is in the microdata: these are files of different surveys."
      : "A variable of the codebook isn't in the microdata. Correct its name in one of the files, or take it out of the codebook.";
    problems.add(
      { kind: all ? "other-codebook" : "variable-not-in-data", severity: "error", file: "codebook", message },
      { line: null, column: name },
    );
  }
  return names.map((name) => {
    const entry = byName.get(name);
    if (!entry && codebook) {
      const message = "A column isn't in the codebook. Its kind was guessed from its values; check it on the codebook page.";
      problems.add({ kind: "column-not-in-codebook", severity: "warning", file, message }, { line: 1, column: name });
    }
    return entry ?? guesses.get(name) ?? { name, label: "", kind: "text", categories: [] };
  });
}
