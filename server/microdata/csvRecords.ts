import Papa from "papaparse";
import { readText } from "./csvText.ts";
import type { ImportProblem, ProblemLog } from "./problems.ts";

/** Longest record taken, in characters; a quote that is never closed would otherwise swallow the file. */
export const RECORD_LIMIT = 4 << 20;
/** Longest cell taken, in characters. */
export const CELL_LIMIT = 1 << 20;
export const COLUMN_LIMIT = 5000;

/** Records of a piece of a file; record i begins in line `lines[i]`. */
export interface RecordBatch {
  rows: string[][];
  lines: number[];
}

const DELIMITERS = [",", ";", "\t"] as const;
export type Delimiter = (typeof DELIMITERS)[number];

/** The delimiter that the header line holds most of, outside quotes; a comma where it holds none. */
export function detectDelimiter(header: string): Delimiter {
  const bare = header.replace(/"(?:[^"]|"")*"/g, "");
  const counts = DELIMITERS.map((delimiter) => bare.split(delimiter).length - 1);
  return DELIMITERS[counts.indexOf(Math.max(...counts))]!;
}

/** Where scanning a text for whole records stands. */
interface Scan {
  /** One past the last whole record. */
  end: number;
  /** Index of a quote that doesn't fit RFC 4180, or −1. */
  fault: number;
  /** Whether the text ends inside quotes. */
  isOpen: boolean;
}

/** Finds the end of the last whole record of a text that starts at a record's start. */
function scanRecords(text: string, delimiter: string): Scan {
  if (!text.includes('"')) return { end: text.lastIndexOf("\n") + 1, fault: -1, isOpen: false };
  const nextOf = finder(text);
  let end = 0;
  let at = 0;
  while (at < text.length) {
    if (text[at] === '"') {
      let close = at + 1;
      for (;;) {
        close = text.indexOf('"', close);
        if (close < 0) return { end, fault: -1, isOpen: true };
        if (text[close + 1] !== '"') break;
        close += 2;
      }
      const next = text[close + 1];
      if (next === undefined) return { end, fault: -1, isOpen: true };
      if (next !== delimiter && next !== "\n") return { end, fault: close, isOpen: false };
      at = close + 2;
      if (next === "\n") end = at;
    } else {
      const newline = nextOf("\n", at);
      const stop = Math.min(newline, nextOf(delimiter, at));
      const quote = nextOf('"', at);
      if (quote < stop) return { end, fault: quote, isOpen: false };
      at = stop + 1;
      if (stop === newline && stop < text.length) end = at;
    }
  }
  return { end, fault: -1, isOpen: false };
}

/** Next place of a character at or after an index, the text's length where there is none; looks at each stretch of text once. */
function finder(text: string): (character: string, from: number) => number {
  const known = new Map<string, number>();
  return (character, from) => {
    const last = known.get(character) ?? -1;
    if (last >= from) return last;
    const found = text.indexOf(character, from);
    const place = found < 0 ? text.length : found;
    known.set(character, place);
    return place;
  };
}

const linesIn = (text: string) => text.split("\n").length - 1;

function split(text: string, delimiter: Delimiter, firstLine: number): RecordBatch {
  const { data } = Papa.parse<string[]>(text.endsWith("\n") ? text.slice(0, -1) : text, {
    delimiter,
    newline: "\n",
    quoteChar: '"',
  });
  const lines: number[] = [];
  let line = firstLine;
  const isQuoted = text.includes('"');
  for (const row of data) {
    lines.push(line);
    line += 1;
    if (isQuoted) for (const cell of row) if (cell.includes("\n")) line += linesIn(cell);
  }
  return { rows: data, lines };
}

/**
 * Records of a CSV file (RFC 4180; comma, semicolon or tab, found from the header line), in batches.
 * The first record of the first batch is the header. Lines are those of the file, breaks inside quotes counted.
 * @throws {UnreadableFile} with the reason in `problems`: what `readText` refuses, a quote out of place or never closed, a record past the limit.
 */
export async function* readRecords(
  path: string,
  file: ImportProblem["file"],
  problems: ProblemLog,
  options: { signal: AbortSignal; onBytes?: (bytes: number) => void },
): AsyncGenerator<RecordBatch & { delimiter: Delimiter }> {
  let pending = "";
  let line = 1;
  let delimiter: Delimiter | null = null;
  const check = (scan: Scan) => {
    if (scan.fault >= 0) {
      const start = pending.lastIndexOf("\n", scan.fault) + 1;
      const message =
        'A quote stands where none may be: inside a field without quotes, or after a closing quote. Put the whole field into quotes and double the quotes in it, such as "5"" pipe".';
      problems.stop(
        { kind: "stray-quote", file, message },
        { line: line + linesIn(pending.slice(0, scan.fault)), value: pending.slice(start, start + 80) },
      );
    }
    if (pending.length - scan.end > RECORD_LIMIT) {
      const message = scan.isOpen
        ? "A quote is opened and not closed within four million characters. Close it, or remove it."
        : "A line is longer than four million characters. This isn't the CSV of a survey.";
      problems.stop(
        { kind: scan.isOpen ? "unclosed-quote" : "line-too-long", file, message },
        { line: line + linesIn(pending.slice(0, scan.end)) },
      );
    }
  };
  for await (const text of readText(path, file, problems, options)) {
    pending += text;
    if (delimiter === null) {
      const firstBreak = pending.indexOf("\n");
      if (firstBreak < 0 && pending.length <= RECORD_LIMIT) continue;
      delimiter = detectDelimiter(pending.slice(0, firstBreak < 0 ? undefined : firstBreak));
    }
    const scan = scanRecords(pending, delimiter);
    check(scan);
    if (scan.end === 0) continue;
    const whole = pending.slice(0, scan.end);
    yield { ...split(whole, delimiter, line), delimiter };
    line += linesIn(whole);
    pending = pending.slice(scan.end);
  }
  if (pending === "") return;
  delimiter ??= detectDelimiter(pending.split("\n", 1)[0]!);
  const last = `${pending}\n`;
  const scan = scanRecords(last, delimiter);
  pending = last;
  check(scan);
  if (scan.isOpen || scan.end < last.length) {
    const message = "A quote is opened and never closed, so the end of the file can't be read. Close it, or remove it.";
    problems.stop({ kind: "unclosed-quote", file, message }, { line: line + linesIn(last.slice(0, scan.end)) });
  }
  yield { ...split(last, delimiter, line), delimiter };
}
