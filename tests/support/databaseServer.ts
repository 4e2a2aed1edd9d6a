import { mkdtemp, rm } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import type { TestProject } from "vitest/node";
import { startPrivateDatabase } from "../../server/cli/privateDatabase.ts";

declare module "vitest" {
  interface ProvidedContext {
    /** `mariadb://…/` of the tests' own server, without a database's name. */
    databaseServer: string;
  }
}

/** One throw-away MariaDB for a run of tests. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const folder = await mkdtemp(path.join(os.tmpdir(), "perhundred-tests-"));
  const database = await startPrivateDatabase(folder);
  project.provide("databaseServer", database.urlOf(""));
  return async () => {
    await database.stop();
    await rm(folder, { recursive: true, force: true });
  };
}
