import { stat } from "node:fs/promises";
import type { CodebookEntry, ImportedVariable } from "./codebook.ts";
import { readCodebook } from "./codebookCsv.ts";
import { CELL_LIMIT, readRecords, type Delimiter } from "./csvRecords.ts";
import { ColumnEncoder } from "./encode.ts";
import { matchCodebook, readHeader } from "./header.ts";
import { ColumnGuess } from "./infer.ts";
import { ProblemLog, UnreadableFile, type ImportProblem } from "./problems.ts";
import { sha256, type SegmentSink } from "./segments.ts";

/** How far an import is; bytes count each reading of the microdata. */
export interface ImportProgress {
  stage: string;
  bytesDone: number;
  bytesTotal: number;
  rows: number;
}

export interface ImportInput {
  microdataPath: string;
  codebookPath: string | null;
  signal: AbortSignal;
  onProgress?: (progress: ImportProgress) => void;
}

/** What was brought in, or why nothing was. */
export type ImportOutcome =
  | { variables: ImportedVariable[]; respondents: number; checksum: string; problems: ImportProblem[] }
  | { problems: ImportProblem[] };

const DISTINCT_LIMIT = 100_000;
/** Distinct values kept over all columns together, so that many columns don't take more memory than a few. */
const DISTINCT_BUDGET = 2_000_000;

const file = "microdata";

/** Reads the microdata once: the header to `onHeader`, each sound row to `onRow`. Rows of another length are noted. */
async function readRows(
  input: ImportInput,
  problems: ProblemLog,
  onBytes: (bytes: number) => void,
  onHeader: (names: string[], delimiter: Delimiter) => void,
  onRow: (cells: readonly string[], line: number) => Promise<void> | undefined,
): Promise<void> {
  let names: string[] | null = null;
  for await (const { rows, lines, delimiter } of readRecords(input.microdataPath, file, problems, {
    signal: input.signal,
    onBytes,
  })) {
    for (let i = 0; i < rows.length; i++) {
      const cells = rows[i]!;
      const line = lines[i]!;
      if (names === null) {
        names = readHeader(cells, problems);
        onHeader(names, delimiter);
      } else if (cells.length === names.length && !(cells.length === 1 && cells[0] === "")) {
        const long = cells.findIndex((cell) => cell.length > CELL_LIMIT);
        if (long >= 0)
          problems.stop(
            {
              kind: "cell-too-long",
              file,
              message: "A cell is longer than a million characters. This isn't the CSV of a survey.",
            },
            { line, column: names[long]!, value: cells[long]! },
          );
        const waiting = onRow(cells, line);
        if (waiting) await waiting;
      } else if (cells.length > 1 || cells[0] !== "") {
        const message = `A row doesn't have the header's ${names.length} ${names.length === 1 ? "cell" : "cells"}. A delimiter may be missing, or a field with one in it needs quotes.`;
        problems.add(
          { kind: "ragged-row", severity: "error", file, message },
          { line, column: null, value: `${cells.length} cells` },
        );
      }
    }
    input.signal.throwIfAborted();
  }
  if (names === null)
    problems.stop({ kind: "empty-file", file, message: "The file is empty. Choose one with a header line and rows." });
}

/** Describes the columns that no codebook does, from all their values. */
async function guess(
  input: ImportInput,
  problems: ProblemLog,
  described: ReadonlySet<string>,
  onBytes: (bytes: number) => void,
): Promise<Map<string, CodebookEntry>> {
  let guesses: (ColumnGuess | null)[] = [];
  let names: string[] = [];
  await readRows(
    input,
    problems,
    onBytes,
    (header, delimiter) => {
      names = header;
      const limit = Math.min(DISTINCT_LIMIT, Math.floor(DISTINCT_BUDGET / header.length));
      guesses = header.map((name) => (described.has(name) ? null : new ColumnGuess(limit, delimiter === ";")));
    },
    (cells) => {
      for (let i = 0; i < guesses.length; i++) guesses[i]?.add(cells[i]!);
      return undefined;
    },
  );
  const entries = new Map<string, CodebookEntry>();
  guesses.forEach((column, i) => {
    if (!column) return;
    const name = names[i]!;
    entries.set(name, column.entry(name));
    for (const word of column.missingWords) {
      const message =
        "Words that stand for no answer are taken as missing codes. Change that in the codebook if they are values.";
      problems.add({ kind: "missing-word", severity: "warning", file, message }, { line: null, column: name, value: word });
    }
  });
  return entries;
}

/**
 * Reads microdata (CSV) with or without a codebook, checks every cell, and hands the encoded columns to `sink` as they are made.
 * Without a codebook, or for columns it leaves out, the microdata are read twice: first to guess the kinds.
 * Memory is bounded by a segment of each column and the distinct values counted, whatever the number of rows.
 * @returns Variables and counts; only the problems where something makes the files unfit (what the sink got is to be thrown away then).
 * @throws {DOMException} `AbortError` when cancelled.
 */
export async function importFiles(input: ImportInput, sink: SegmentSink): Promise<ImportOutcome> {
  const problems = new ProblemLog();
  try {
    const imported = await bringIn(input, sink, problems);
    return problems.hasErrors() ? { problems: problems.list() } : { ...imported, problems: problems.list() };
  } catch (error) {
    if (error instanceof UnreadableFile) return { problems: problems.list() };
    throw error;
  }
}

async function bringIn(
  input: ImportInput,
  sink: SegmentSink,
  problems: ProblemLog,
): Promise<Omit<Extract<ImportOutcome, { respondents: number }>, "problems">> {
  const { size } = await stat(input.microdataPath);
  const codebook = input.codebookPath === null ? null : await readCodebook(input.codebookPath, problems, input.signal);
  if (problems.hasErrors()) throw new UnreadableFile();
  const names = await readNames(input, problems);
  const described = new Set((codebook ?? []).map(({ name }) => name));
  const needsGuess = names.some((name) => !described.has(name));
  const progress: ImportProgress = {
    stage: "Looking at the values",
    bytesDone: 0,
    bytesTotal: needsGuess ? 2 * size : size,
    rows: 0,
  };
  const onBytes = (bytes: number) => {
    progress.bytesDone += bytes;
    input.onProgress?.({ ...progress });
  };
  const guesses = needsGuess ? await guess(input, problems, described, onBytes) : new Map<string, CodebookEntry>();
  if (problems.hasErrors()) throw new UnreadableFile();
  const entries = matchCodebook(names, codebook, guesses, problems);
  if (problems.hasErrors()) throw new UnreadableFile();
  progress.stage = "Reading and checking";
  let encoders: ColumnEncoder[] = [];
  const checksums: string[][] = names.map(() => []);
  let segments = 0;
  const flush = async () => {
    for (const [i, encoder] of encoders.entries()) {
      const segment = encoder.take();
      if (!segment) continue;
      checksums[i]!.push(segment.checksum);
      // Once something is wrong nothing will be kept: go on checking only.
      if (!problems.hasErrors()) await sink.put(encoder.id, segments, segment);
    }
    segments += 1;
  };
  await readRows(
    input,
    problems,
    onBytes,
    (header, delimiter) => {
      const options = {
        takesComma: delimiter === ";",
        distinctLimit: Math.min(DISTINCT_LIMIT, Math.floor(DISTINCT_BUDGET / header.length)),
        problems,
      };
      encoders = entries.map((entry, position) => new ColumnEncoder(entry, position, options));
    },
    (cells, line) => {
      for (let i = 0; i < encoders.length; i++) encoders[i]!.add(cells[i]!, line);
      progress.rows += 1;
      return encoders[0]!.isFull ? flush() : undefined;
    },
  );
  await flush();
  if (progress.rows === 0 && !problems.hasErrors())
    problems.stop(
      { kind: "no-rows", file, message: "The file has a header line and no rows. Choose one with microdata." },
      { line: 1 },
    );
  return {
    variables: encoders.map((encoder) => encoder.variable()),
    respondents: progress.rows,
    checksum: sha256(checksums.flat().join("\n")),
  };
}

async function readNames(input: ImportInput, problems: ProblemLog): Promise<string[]> {
  for await (const { rows } of readRecords(input.microdataPath, file, problems, { signal: input.signal })) {
    const [header] = rows;
    if (header) return readHeader(header, problems);
  }
  return problems.stop({ kind: "empty-file", file, message: "The file is empty. Choose one with a header line and rows." });
}
