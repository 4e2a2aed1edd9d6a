import { copyFile, mkdtemp, rm, writeFile } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { createPerson } from "../factories/people.ts";
import { createSurvey } from "../factories/surveys.ts";
import { createClient } from "../support/client.ts";
import { DesignInput } from "../../shared/contracts/design.ts";
import { Question, type QuestionInput } from "../../shared/contracts/questions.ts";
import { startPrivateDatabase } from "../../server/cli/privateDatabase.ts";
import { readConfig } from "../../server/config.ts";
import { connectDatabase } from "../../server/database.ts";
import { startServer } from "../../server/main.ts";
import { ColumnCache } from "../../server/microdata/columnCache.ts";
import { DatabaseStore } from "../../server/microdata/databaseStore.ts";
import { migrations } from "../../server/migrations/migrate.ts";
import { createLogger } from "../../server/middleware/requestLog.ts";
import { Release } from "../../server/models/Release.ts";
import { assign } from "../../server/questions/assign.ts";
import { compileQuestion } from "../../server/questions/compile.ts";
import { prepareWork } from "../../server/questions/questions.ts";
import { answer } from "../../server/questions/work.ts";
import { loadCodebook } from "../../server/services/codebook.ts";
import { publish } from "../../server/services/publication.ts";
import { createRandom } from "../../seeds/random.ts";
import { estimateTargets } from "../../server/statistics/estimate.ts";
import type { Sample } from "../../server/statistics/types.ts";
import { measureGroupBy } from "./groupBy.ts";
import { measure, type Measurement } from "./measure.ts";
import { BENCH_CODEBOOK, RESPONDENTS, writeBenchFile } from "./survey.ts";

const INTERVALS = ["korn-graubard", "logit", "wilson", "linear"] as const;
const LEVELS = [90, 95, 99] as const;
const CACHE_BYTES = 512 * 2 ** 20;

/** Measures the product over a generated survey on a database of its own, which is removed again. */
export async function runBench(tell: (line: string) => void): Promise<Measurement[]> {
  const folder = await mkdtemp(path.join(os.tmpdir(), "perhundred-bench-"));
  const database = await startPrivateDatabase(path.join(folder, "mariadb"));
  try {
    return await benchOver(folder, database.url, tell);
  } finally {
    await database.stop();
    await rm(folder, { recursive: true, force: true });
  }
}

async function benchOver(folder: string, url: string, tell: (line: string) => void): Promise<Measurement[]> {
  const sequelize = connectDatabase(url);
  await migrations(sequelize).up();
  const config = readConfig({
    NODE_ENV: "test",
    PERHUNDRED_DATA: folder,
    LOG_LEVEL: "silent",
    PORT: "0",
    SESSION_SECRET: "only for measuring, on loopback, then gone",
  });
  const server = await startServer({ config, database: { sequelize, url }, logger: createLogger("silent") });
  try {
    const { imports, designs } = server.services;
    const steward = await createPerson(["steward"]);
    const survey = await createSurvey([steward]);
    tell("Generating the survey …");
    const source = path.join(folder, "source.csv");
    await writeBenchFile(source);
    let releaseId = "";
    tell("Bringing it in …");
    const bringIn = await measure(
      "Import of the file, 7 variables, into MariaDB",
      { warmUp: 0, runs: 5, units: RESPONDENTS },
      async () => {
        const [microdataPath, codebookPath] = [path.join(folder, "microdata.csv"), path.join(folder, "codebook.csv")];
        await copyFile(source, microdataPath);
        await writeFile(codebookPath, BENCH_CODEBOOK);
        const outcome = await imports.run({ surveyId: survey.id, wave: "bench", microdataPath, codebookPath, actor: steward });
        if (!("releaseId" in outcome)) throw new Error(JSON.stringify(outcome.problems));
        releaseId = outcome.releaseId;
      },
    );
    const release = (await Release.findByPk(releaseId, { include: "survey" }))!;
    await designs.declare(steward, release, DesignInput.parse({ weight: "weight", strata: "stratum", psu: "psu" }));
    await publish(sequelize, designs, steward, release);
    const inProcess = await measureEngine(release, tell);
    tell("Asking over HTTP …");
    const client = createClient(`http://127.0.0.1:${server.port}`);
    await client.signIn(steward.email);
    const overHttp = await measure(
      "The same over HTTP, answer not kept, with audit of what may be shown",
      { warmUp: 2, runs: 8 },
      async (turn) => {
        // Each turn another level or interval, so that no answer is at hand.
        const turnAt = (turn + 12) % 12;
        const answered = await client.post("/api/tables", {
          ...question(releaseId),
          level: LEVELS[turnAt % 3],
          interval: INTERVALS[Math.floor(turnAt / 3)],
        });
        if (answered.status !== 200) throw new Error(answered.text);
      },
    );
    tell("The other way, in SQL …");
    return [...inProcess, overHttp, bringIn, await measureGroupBy(url, 5)];
  } finally {
    await server.close();
    await sequelize.close();
  }
}

const question = (releaseId: string): QuestionInput => ({
  releaseId,
  outcome: { rule: { variable: "y", in: ["1"] } },
  down: [{ variable: "a" }, { variable: "b" }],
  across: [{ variable: "c" }],
  comparison: { kind: "rest" },
});

async function measureEngine(release: Release, tell: (line: string) => void): Promise<Measurement[]> {
  const variables = await loadCodebook(release);
  const asked = Question.parse(question(release.id));
  const compiled = compileQuestion(asked, variables);
  const prepare = (columns: ColumnCache) =>
    prepareWork(compiled, asked, { releaseId: release.id, columns, variables, minimums: null });
  tell("Loading columns …");
  const load = await measure(
    "Cold load of four columns, weights and layout from MariaDB",
    { warmUp: 1, runs: 5, units: RESPONDENTS },
    () => prepare(new ColumnCache(new DatabaseStore(), CACHE_BYTES)),
  );
  const work = await prepare(new ColumnCache(new DatabaseStore(), CACHE_BYTES));
  const assignment = assign(work.plan, work.columns, work.sample.weight);
  const slots = [9, 7, 5] as const;
  const targets = Array.from({ length: 192 }, (_, cell) => {
    const [a, b, c] = [Math.floor(cell / 24), Math.floor(cell / 4) % 6, cell % 4];
    return { cells: [(a * slots[1] + b) * slots[2] + c] };
  });
  const options = { level: 95, interval: "korn-graubard", difference: "linear", isBinary: true } as const;
  const workOf = async (more: Partial<QuestionInput>) => {
    const other = Question.parse({ ...question(release.id), ...more });
    const source = {
      releaseId: release.id,
      columns: new ColumnCache(new DatabaseStore(), CACHE_BYTES),
      variables,
      minimums: null,
    };
    return prepareWork(compileQuestion(other, variables), other, source);
  };
  const standardised = await workOf({
    down: [{ variable: "a" }],
    standardise: { variable: "b", weights: { own: [3, 2, 2, 1, 1, 1] } },
  });
  const adjusted = await workOf({
    down: [{ variable: "a" }],
    across: [],
    adjustFor: [{ variable: "b" }, { variable: "c" }],
    comparison: { kind: "group", breakdown: "a", value: "0" },
  });
  const replicated = { ...work.sample, replicates: generatedReplicates(work.sample.weight) };
  tell("Estimating …");
  return [
    await measure("Estimates and standard errors of 192 cells", { warmUp: 20, runs: 25, units: RESPONDENTS }, () =>
      estimateTargets(work.sample, assignment, targets, [], { ...options, interval: "linear" }),
    ),
    await measure("Assigning respondents to cells", { warmUp: 5, runs: 15, units: RESPONDENTS }, () =>
      assign(work.plan, work.columns, work.sample.weight),
    ),
    await measure(
      "The whole table of 192 cells and its margins, exact intervals, differences with the rest",
      { warmUp: 2, runs: 8, units: RESPONDENTS },
      () => answer(work),
    ),
    await measure(
      "Table of 32 standardised cells with differences from the rest",
      { warmUp: 2, runs: 8, units: RESPONDENTS },
      () => answer(standardised),
    ),
    await measure(
      "Table of 8 adjusted groups with differences, logistic on 10 more levels",
      { warmUp: 2, runs: 8, units: RESPONDENTS },
      () => answer(adjusted),
    ),
    await measure(`192 cells with ${REPLICATES} replicate weights`, { warmUp: 1, runs: 5, units: RESPONDENTS }, () =>
      estimateTargets(replicated, assignment, targets, [], { ...options, interval: "linear" }),
    ),
    load,
  ];
}

const REPLICATES = 80;

/** Replicate weights as a bootstrap's would be: each respondent's weight times a whole number drawn at random. */
function generatedReplicates(weight: Float64Array): NonNullable<Sample["replicates"]> {
  const random = createRandom(80);
  const weights = Array.from({ length: REPLICATES }, () => weight.map((value) => value * random.poisson(1)));
  const scale = 1 / (REPLICATES - 1);
  return { weights, scale, replicateScales: new Float64Array(REPLICATES).fill(1), mse: true, degreesOfFreedom: REPLICATES - 1 };
}
