import { mkdtemp, rm, writeFile } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { assembleColumn, asNumbers, missingCode } from "../../../server/microdata/columns.ts";
import { importFiles, type ImportOutcome } from "../../../server/microdata/importFiles.ts";
import type { Segment } from "../../../server/microdata/segments.ts";

/** Segments by variable, kept in memory. */
export class KeptSegments {
  readonly byVariable = new Map<string, Segment[]>();

  put(variableId: string, number: number, segment: Segment): Promise<void> {
    const segments = this.byVariable.get(variableId) ?? [];
    segments[number] = segment;
    this.byVariable.set(variableId, segments);
    return Promise.resolve();
  }
}

/** Brings texts (or bytes) in as files. */
export async function bringIn(
  microdata: string | Uint8Array,
  codebook: string | Uint8Array | null = null,
): Promise<{ outcome: ImportOutcome; kept: KeptSegments }> {
  const folder = await mkdtemp(path.join(os.tmpdir(), "perhundred-import-"));
  try {
    const microdataPath = path.join(folder, "microdata.csv");
    await writeFile(microdataPath, microdata);
    const codebookPath = codebook === null ? null : path.join(folder, "codebook.csv");
    if (codebookPath !== null && codebook !== null) await writeFile(codebookPath, codebook);
    const kept = new KeptSegments();
    const outcome = await importFiles({ microdataPath, codebookPath, signal: new AbortController().signal }, kept);
    return { outcome, kept };
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

/** What was brought in, as a reader of the file would say it: by name, each row's code, number or text; null for missing. */
export async function readBack(
  microdata: string | Uint8Array,
  codebook: string | Uint8Array | null = null,
): Promise<Record<string, (string | number | null)[]>> {
  const { outcome, kept } = await bringIn(microdata, codebook);
  if (!("respondents" in outcome)) throw new Error(JSON.stringify(outcome.problems));
  return Object.fromEntries(
    outcome.variables.map((variable): [string, (string | number | null)[]] => {
      const column = assembleColumn(variable.storage, kept.byVariable.get(variable.id) ?? [], outcome.respondents);
      if (variable.storage === "number")
        return [variable.name, Array.from(asNumbers(column, variable), (value) => (Number.isNaN(value) ? null : value))];
      const missing = missingCode(column.values);
      const textOf = (value: number) => (variable.storage === "code" ? variable.categories[value]?.code : column.texts[value]);
      return [
        variable.name,
        Array.from<number, string | null>(column.values, (value) => (value === missing ? null : (textOf(value) ?? "?"))),
      ];
    }),
  );
}
