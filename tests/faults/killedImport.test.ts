import { spawn } from "node:child_process";
import { once } from "node:events";
import { copyFile, mkdtemp, readdir, rm, writeFile } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, expect, it } from "vitest";
import { readConfig } from "../../server/config.ts";
import { createImports } from "../../server/microdata/imports.ts";
import { createLogger } from "../../server/middleware/requestLog.ts";
import { ColumnSegment } from "../../server/models/Column.ts";
import { Import } from "../../server/models/Import.ts";
import { Release } from "../../server/models/Release.ts";
import { Variable } from "../../server/models/Variable.ts";
import { createPerson } from "../factories/people.ts";
import { createSurvey } from "../factories/surveys.ts";
import { createDatabase } from "../support/database.ts";

let database: Awaited<ReturnType<typeof createDatabase>>;
let folder: string;

beforeAll(async () => {
  database = await createDatabase();
  folder = await mkdtemp(path.join(os.tmpdir(), "perhundred-fault-"));
});
afterAll(async () => {
  await database.close();
  await rm(folder, { recursive: true, force: true });
});

it("leaves nothing of an import whose process is killed in the middle, and says so at the next start", async () => {
  const steward = await createPerson(["steward"]);
  const survey = await createSurvey([steward]);
  const source = path.join(folder, "source.csv");
  const rows = Array.from({ length: 400_000 }, (_, i) => `${i % 3},${(i * 1.37).toFixed(3)},${i % 11}`);
  await writeFile(source, `code,amount,more\n${rows.join("\n")}\n`);
  const microdataPath = path.join(folder, "microdata.csv");
  await copyFile(source, microdataPath);
  const input = {
    databaseUrl: database.url,
    dataFolder: folder,
    surveyId: survey.id,
    microdataPath,
    actor: { id: steward.id, name: steward.name },
  };
  const script = fileURLToPath(new URL("./support/importer.ts", import.meta.url));
  const child = spawn(process.execPath, ["--import", import.meta.resolve("tsx"), script, JSON.stringify(input)], {
    stdio: "inherit",
  });
  const exited = once(child, "exit");
  // Past the first segment, so that rows of the database have been written.
  await expect
    .poll(async () => (await Import.findOne())?.rowCount ?? 0, { timeout: 30_000, interval: 20 })
    .toBeGreaterThan(65_536);
  child.kill("SIGKILL");
  await exited;
  expect((await Import.findOne())?.status).toBe("running");
  await Import.update({ heartbeatAt: new Date(0) }, { where: {} });
  const config = readConfig({ NODE_ENV: "test", PERHUNDRED_DATA: folder, LOG_LEVEL: "silent" });
  const imports = await createImports({
    config,
    sequelize: database.sequelize,
    databaseUrl: database.url,
    logger: createLogger("silent"),
  });
  try {
    const row = await Import.findOne();
    expect(row).toMatchObject({ status: "failed", releaseId: null });
    expect(row?.problems[0]?.message).toContain("Nothing of it was kept");
    expect([await Release.count(), await Variable.count(), await ColumnSegment.count()]).toEqual([0, 0, 0]);
    expect(await readdir(imports.uploadFolder)).toEqual([]);
  } finally {
    await imports.close();
  }
});
