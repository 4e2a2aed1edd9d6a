import { randomUUID } from "node:crypto";
import { mkdtemp, rm } from "node:fs/promises";
import http from "node:http";
import os from "node:os";
import path from "node:path";
import type { Sequelize } from "sequelize";
import { createApp, type Services } from "../../server/app.ts";
import { readConfig } from "../../server/config.ts";
import { ColumnCache } from "../../server/microdata/columnCache.ts";
import { DatabaseStore } from "../../server/microdata/databaseStore.ts";
import { createImports } from "../../server/microdata/imports.ts";
import { createLogger } from "../../server/middleware/requestLog.ts";
import { createQuestions } from "../../server/questions/questions.ts";
import { createDesigns } from "../../server/services/design.ts";
import { createClient, type Client } from "./client.ts";
import { createDatabase } from "./database.ts";

/** The whole product over a fresh database, listening on a free port. */
export interface TestApp {
  services: Services;
  sequelize: Sequelize;
  databaseUrl: string;
  address: string;
  /** Somebody with a browser of their own, not signed in. */
  client(): Client;
  close(): Promise<void>;
}

const TRIES = 1000;

/** @param overrides Services to replace, such as narrower sign-in limits. */
export async function startTestApp(overrides: Partial<Pick<Services, "signInLimits">> = {}): Promise<TestApp> {
  const database = await createDatabase();
  const folder = await mkdtemp(path.join(os.tmpdir(), "perhundred-app-"));
  const server = http.createServer();
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  const listening = server.address();
  if (typeof listening !== "object" || listening === null) throw new Error("The test server has no address.");
  const address = `http://127.0.0.1:${listening.port}`;
  const config = readConfig({
    NODE_ENV: "test",
    PERHUNDRED_DATA: folder,
    LOG_LEVEL: "silent",
    PUBLIC_URL: address,
    COLUMN_CACHE_MB: "64",
  });
  const { sequelize, url } = database;
  const logger = createLogger(config.logLevel);
  const imports = await createImports({ config, sequelize, databaseUrl: url, logger });
  const columns = new ColumnCache(new DatabaseStore(), config.columnCacheBytes);
  const designs = createDesigns({ config, sequelize, columns });
  const questions = createQuestions({ config, columns });
  const services: Services = {
    config,
    sequelize,
    logger,
    sessionSecret: randomUUID(),
    signInLimits: { perPerson: TRIES, perAddress: TRIES, windowMs: 60_000 },
    imports,
    designs,
    columns,
    questions,
    ...overrides,
  };
  server.on("request", createApp(services));
  return {
    services,
    sequelize,
    databaseUrl: url,
    address,
    client: () => createClient(address),
    close: async () => {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      await imports.close();
      await designs.close();
      await questions.close();
      await database.close();
      await rm(folder, { recursive: true, force: true });
    },
  };
}
