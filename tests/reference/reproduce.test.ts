import { execFile, spawnSync } from "node:child_process";
import { mkdtemp, rm, writeFile } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { promisify } from "node:util";
import Papa from "papaparse";
import { expect, it } from "vitest";
import { bringIn } from "../../server/cli/reference/ask.ts";
import { readCases } from "../../server/cli/reference/cases.ts";
import { reproduceScript } from "../../server/questions/reproduce.ts";
import { DesignInput } from "../../shared/contracts/design.ts";
import { Question, type QuestionInput } from "../../shared/contracts/questions.ts";

const FOLDER = fileURLToPath(new URL(".", import.meta.url));
const RELEASE = "00000000-0000-4000-8000-000000000001";
const hasR = spawnSync("Rscript", ["-e", "library(survey)"]).status === 0;

/** Questions of every kind that a script is written for, over the invented survey. */
const QUESTIONS: Omit<QuestionInput, "releaseId">[] = [
  { outcome: { rule: { variable: "smoker", in: ["1"] } } },
  { outcome: { rule: { variable: "smoker", in: ["1"] } }, down: [{ variable: "education" }], across: [{ variable: "sex" }] },
  {
    outcome: { rule: { variable: "smoker", in: ["1"] } },
    among: { all: [{ variable: "age", between: [30, 64] }, { not: { variable: "education", in: ["4"] } }] },
    down: [{ variable: "sex" }],
  },
  { outcome: { variable: "age" }, down: [{ variable: "education" }] },
  {
    outcome: { rule: { variable: "smoker", in: ["0"] } },
    down: [
      {
        variable: "age",
        bands: [
          [18, 39, "to 39"],
          [40, null, "40+"],
        ],
      },
    ],
  },
];

/** What R's survey package makes of the same question, by key. */
async function recompute(script: string): Promise<Map<string, Record<string, string>>> {
  const folder = await mkdtemp(path.join(os.tmpdir(), "perhundred-reproduce-"));
  try {
    const file = path.join(folder, "table.R");
    await writeFile(file, script);
    const { stdout } = await promisify(execFile)("Rscript", [file, path.join(FOLDER, "coast.csv")]);
    const { data } = Papa.parse<Record<string, string>>(stdout, { header: true, skipEmptyLines: true });
    return new Map(data.map((row) => [row.key ?? "", row]));
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

// Source: R's survey package (Lumley 2004), run here where it is installed; nothing needs it.
it("writes a script by which R's survey package gets the same figures from the release's CSV", async () => {
  const entry = (await readCases(FOLDER)).find((one) => "case" in one && one.case.id === "invented-prevalence-sex-ageband");
  if (!entry || !("case" in entry)) throw new Error("The case is missing.");
  const reference = {
    ...entry.case,
    query: { ...entry.case.query, by: ["sex", "education"], among: { variable: "age", between: [0, 200] as [number, number] } },
  };
  const release = await bringIn(reference, FOLDER);
  const design = DesignInput.parse({ weight: "weight", strata: "stratum", psu: "psu" });
  for (const input of QUESTIONS) {
    const question = Question.parse({ releaseId: RELEASE, ...input });
    const script = reproduceScript(question, design, release.variables, "A question\nin two lines");
    expect(script).toMatch(/^# A question\n# in two lines\n/);
    if (!hasR) {
      console.log("R with its survey package isn't installed: the script was written and not run.");
      continue;
    }
    const recomputed = await recompute(script);
    const { answer, compiled } = await release.ask(input);
    const nodes = answer.nodes.filter(({ kind }) => kind !== "margin");
    expect(recomputed.size).toBe(nodes.length);
    for (const { key, kind, estimate } of nodes) {
      const codes = key.map((value, axis) => compiled.breakdowns[axis]!.values[value ?? 0]!.code).join("|");
      const row = recomputed.get(kind === "whole" ? "everyone" : codes);
      expect(Number(row?.respondents), codes).toBe(estimate.respondents);
      expect(Number(row?.estimate) / estimate.estimate!, codes).toBeCloseTo(1, 9);
      expect(Number(row?.se) / estimate.se!, codes).toBeCloseTo(1, 9);
      expect(Number(row?.df), codes).toBe(estimate.df);
    }
  }
}, 120_000);
