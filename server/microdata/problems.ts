import type { z } from "zod";
import type { ImportProblem as Contract } from "../../shared/contracts/imports.ts";

export type ImportProblem = z.infer<typeof Contract>;

/** Where in a file something was seen. Lines count from 1, the header being line 1. */
export interface Place {
  line: number | null;
  column?: string | null;
  value?: string | null;
}

const PLACES_KEPT = 5;
const VALUE_SHOWN = 60;
/** After this many errors a file is taken for something else and reading stops. */
export const ERRORS_ENOUGH = 20_000;

/** A file can't be read any further; whatever was found so far is in the log. */
export class UnreadableFile extends Error {
  constructor() {
    super("The file can't be read any further.");
    this.name = "UnreadableFile";
  }
}

function shorten(value: string | null | undefined): string | null {
  if (value === null || value === undefined) return null;
  // Control characters would garble the report.
  const printable = value.replace(/\p{Cc}/gu, "␣");
  return printable.length > VALUE_SHOWN ? `${printable.slice(0, VALUE_SHOWN)}…` : printable;
}

/** Gathers what is wrong with the files of an import: each kind once, with its count and first places. */
export class ProblemLog {
  readonly #problems = new Map<string, ImportProblem>();
  #errors = 0;

  /**
   * Notes one place. The message is kept from the first place of its kind and column-free, so that it stands for all.
   * @throws {UnreadableFile} when so much is wrong that more would help nobody.
   */
  add(
    problem: { kind: string; severity: ImportProblem["severity"]; file: ImportProblem["file"]; message: string },
    place: Place | null = null,
  ): void {
    const key = `${problem.file} ${problem.kind}`;
    const known = this.#problems.get(key) ?? { ...problem, count: 0, first: [] };
    this.#problems.set(key, known);
    known.count += 1;
    if (place && known.first.length < PLACES_KEPT)
      known.first.push({ line: place.line, column: shorten(place.column), value: shorten(place.value) });
    if (problem.severity !== "error") return;
    this.#errors += 1;
    if (this.#errors >= ERRORS_ENOUGH) throw new UnreadableFile();
  }

  /** Notes an error after which the file can't be read on. */
  stop(problem: { kind: string; file: ImportProblem["file"]; message: string }, place: Place | null = null): never {
    this.add({ ...problem, severity: "error" }, place);
    throw new UnreadableFile();
  }

  /** Whether something was noted that makes the files unfit. */
  hasErrors(): boolean {
    return this.#errors > 0;
  }

  /** Errors first, then warnings, each in order of appearance. */
  list(): ImportProblem[] {
    const all = [...this.#problems.values()];
    return [...all.filter(({ severity }) => severity === "error"), ...all.filter(({ severity }) => severity === "warning")];
  }
}
