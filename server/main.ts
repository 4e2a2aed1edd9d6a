import { randomBytes } from "node:crypto";
import { existsSync } from "node:fs";
import { mkdir, readFile, writeFile } from "node:fs/promises";
import http from "node:http";
import path from "node:path";
import type { Sequelize } from "sequelize";
import { createApp, type Services } from "./app.ts";
import type { Config } from "./config.ts";
import { ColumnCache } from "./microdata/columnCache.ts";
import { DatabaseStore } from "./microdata/databaseStore.ts";
import { createImports } from "./microdata/imports.ts";
import { SIGN_IN_LIMITS } from "./middleware/limits.ts";
import type { Logger } from "./middleware/requestLog.ts";
import { createQuestions } from "./questions/questions.ts";
import { createDesigns } from "./services/design.ts";

/** The key that signs session cookies: given, or made once and kept in the data folder. */
async function sessionSecret(config: Config): Promise<string> {
  if (config.sessionSecret !== null) return config.sessionSecret;
  const file = path.join(config.dataFolder, "session-secret");
  if (existsSync(file)) return (await readFile(file, "utf8")).trim();
  await mkdir(config.dataFolder, { recursive: true, mode: 0o700 });
  const secret = randomBytes(32).toString("base64url");
  await writeFile(file, `${secret}\n`, { mode: 0o600 });
  return secret;
}

export interface RunningServer {
  services: Services;
  port: number;
  /** Takes no new requests, lets running ones end, ends the workers. The database stays. */
  close: () => Promise<void>;
}

/** Builds the services over an open, migrated database and listens. */
export async function startServer(parts: {
  config: Config;
  database: { sequelize: Sequelize; url: string };
  logger: Logger;
}): Promise<RunningServer> {
  const { config, database, logger } = parts;
  const imports = await createImports({ config, sequelize: database.sequelize, databaseUrl: database.url, logger });
  const columns = new ColumnCache(new DatabaseStore(), config.columnCacheBytes);
  const designs = createDesigns({ config, sequelize: database.sequelize, columns });
  const questions = createQuestions({ config, columns });
  const services: Services = {
    config,
    sequelize: database.sequelize,
    logger,
    sessionSecret: await sessionSecret(config),
    signInLimits: SIGN_IN_LIMITS,
    imports,
    designs,
    columns,
    questions,
  };
  const server = http.createServer(createApp(services));
  // Keep-alive connections must not hold up a stop.
  server.keepAliveTimeout = 5000;
  await new Promise<void>((resolve, reject) => {
    server.once("error", reject);
    server.listen(config.port, config.host, resolve);
  });
  const address = server.address();
  const port = typeof address === "object" && address ? address.port : config.port;
  const close = async () => {
    const closed = new Promise((resolve) => server.close(resolve));
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), 3000).unref();
    await closed;
    await imports.close();
    await designs.close();
    await questions.close();
  };
  return { services, port, close };
}
