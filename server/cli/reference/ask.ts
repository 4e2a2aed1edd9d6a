import { mkdtemp, readFile, rm, writeFile } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import Papa from "papaparse";
import { DesignInput, type Design } from "../../../shared/contracts/design.ts";
import { Question, type QuestionInput } from "../../../shared/contracts/questions.ts";
import { ruleVariables } from "../../../shared/rules.ts";
import { ColumnCache } from "../../microdata/columnCache.ts";
import type { CodebookVariable } from "../../microdata/codebook.ts";
import { importFiles } from "../../microdata/importFiles.ts";
import { MemoryStore } from "../../microdata/memoryStore.ts";
import { compileQuestion, type CompiledQuestion } from "../../questions/compile.ts";
import { prepareWork } from "../../questions/questions.ts";
import { answer, type Answer, type Work } from "../../questions/work.ts";
import { asList, type ReferenceCase } from "./cases.ts";

/** A case's data as a release in memory, brought in and laid out by the product's own code. */
export interface CaseRelease {
  variables: CodebookVariable[];
  /** Answers a question with nothing withheld. */
  ask(question: Omit<QuestionInput, "releaseId">): Promise<{ compiled: CompiledQuestion; answer: Answer; work: Work }>;
}

/** What a steward would have to say of a case's variables: which hold numbers, and which categories. */
async function codebookOf({ data, design, query }: ReferenceCase, folder: string): Promise<string> {
  const { data: rows, meta } = Papa.parse<Record<string, string>>(await readFile(path.join(folder, data), "utf8"), {
    header: true,
    skipEmptyLines: true,
  });
  const names = meta.fields ?? [];
  const numeric = new Set([...asList(design.weight), ...asList(design.fpc)]);
  if (design.replicates) for (const name of names) if (new RegExp(design.replicates.pattern).test(name)) numeric.add(name);
  if (query.outcome.affected === undefined) numeric.add(query.outcome.variable);
  const categorical = new Set([
    ...asList(query.by),
    ...asList(query.adjustFor),
    ...asList(query.scores),
    ...asList(query.ordered),
  ]);
  if (query.standardise) categorical.add(query.standardise.variable);
  if (query.outcome.affected !== undefined) categorical.add(query.outcome.variable);
  if (query.among) for (const name of ruleVariables(query.among)) if (!categorical.has(name)) numeric.add(name);
  const lines: Record<string, string>[] = [];
  for (const name of names) {
    if (numeric.has(name)) lines.push({ variable: name, label: name, kind: "numeric" });
    if (!categorical.has(name)) continue;
    lines.push({ variable: name, label: name, kind: "categorical" });
    const codes = [...new Set(rows.map((row) => row[name] ?? ""))]
      .filter((code) => code !== "")
      .sort((a, b) => a.localeCompare(b, "en", { numeric: true }));
    for (const code of codes) lines.push({ variable: name, code, "category label": code });
  }
  return Papa.unparse(lines, { columns: ["variable", "label", "kind", "code", "category label", "missing"] });
}

/** First and last of the columns that a case's regular expression means. */
function replicateRange(pattern: string, variables: readonly CodebookVariable[]): string {
  const names = variables.map(({ name }) => name).filter((name) => new RegExp(pattern).test(name));
  names.sort((a, b) => a.localeCompare(b, "en", { numeric: true }));
  return `${names[0] ?? ""}–${names.at(-1) ?? ""}`;
}

function designOf({ design }: ReferenceCase, variables: readonly CodebookVariable[]): Design {
  const method =
    (["BRR", "Fay", "JK1", "JKn", "bootstrap"] as const).find((name) => design.replicates?.method.includes(name)) ?? "other";
  const single = (names: string | string[] | undefined) => (names === undefined ? null : names);
  return DesignInput.parse({
    weight: design.weight ?? null,
    strata: design.strata ?? null,
    psu: single(design.psu),
    populationSize: single(design.fpc),
    lonely: design.lonely ?? "centred",
    replicates: design.replicates
      ? {
          pattern: replicateRange(design.replicates.pattern, variables),
          method,
          scale: design.replicates.scale,
          replicateScales: design.replicates.rscales,
          mse: design.replicates.mse,
        }
      : null,
    minimums: { respondents: 0, affected: 0, unaffected: 0 },
  });
}

const RELEASE_ID = "00000000-0000-4000-8000-000000000001";
const CACHE_BYTES = 512 * 2 ** 20;

/** Brings a case's file in as a steward would: codebook, import, design. @throws {Error} with the import's own problems. */
export async function bringIn(reference: ReferenceCase, folder: string): Promise<CaseRelease> {
  const scratch = await mkdtemp(path.join(os.tmpdir(), "perhundred-reference-"));
  try {
    const codebookPath = path.join(scratch, "codebook.csv");
    await writeFile(codebookPath, await codebookOf(reference, folder));
    const store = new MemoryStore();
    const signal = new AbortController().signal;
    const result = await importFiles({ microdataPath: path.join(folder, reference.data), codebookPath, signal }, store);
    if (!("respondents" in result)) throw new Error(result.problems.map((problem) => problem.message).join(" "));
    store.declare(designOf(reference, result.variables), result.variables, result.respondents);
    const columns = new ColumnCache(store, CACHE_BYTES);
    return {
      variables: result.variables,
      async ask(input) {
        const question = Question.parse({ releaseId: RELEASE_ID, ...input });
        const compiled = compileQuestion(question, result.variables);
        const work = await prepareWork(compiled, question, {
          releaseId: RELEASE_ID,
          columns,
          variables: result.variables,
          minimums: null,
        });
        return { compiled, answer: await answer(work), work };
      },
    };
  } finally {
    await rm(scratch, { recursive: true, force: true });
  }
}
