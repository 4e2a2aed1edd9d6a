import express, { type Express } from "express";
import type { Sequelize } from "sequelize";
import type { Config } from "./config.ts";
import { handleErrors, notFound } from "./middleware/errors.ts";
import type { SignInLimits } from "./middleware/limits.ts";
import { logRequests, type Logger } from "./middleware/requestLog.ts";
import { secureHeaders } from "./middleware/secureHeaders.ts";
import { serveClient } from "./middleware/client.ts";
import { sessions } from "./middleware/session.ts";
import { accessRoutes } from "./routes/access.ts";
import { accountRoutes } from "./routes/account.ts";
import { healthRoutes } from "./routes/health.ts";
import { holdingsRoutes } from "./routes/holdings.ts";
import { importRoutes } from "./routes/imports.ts";
import { ledgerRoutes } from "./routes/ledger.ts";
import { openapiRoutes } from "./routes/openapi.ts";
import { peopleRoutes } from "./routes/people.ts";
import { questionRoutes } from "./routes/questions.ts";
import { releaseRoutes } from "./routes/releases.ts";
import { sessionRoutes } from "./routes/session.ts";
import type { ColumnCache } from "./microdata/columnCache.ts";
import type { Imports } from "./microdata/imports.ts";
import type { Questions } from "./questions/questions.ts";
import type { Designs } from "./services/design.ts";

/** What the routes work with; made by `main.ts`, or by a test. */
export interface Services {
  config: Config;
  sequelize: Sequelize;
  logger: Logger;
  /** Key that signs session cookies. */
  sessionSecret: string;
  signInLimits: SignInLimits;
  imports: Imports;
  designs: Designs;
  columns: ColumnCache;
  questions: Questions;
}

/** The whole web application over its services; starts nothing by itself. */
export function createApp(services: Services): Express {
  const app = express();
  app.disable("x-powered-by");
  app.set("trust proxy", "loopback");
  app.use(logRequests(services.logger));
  app.use(secureHeaders(services.config));
  app.use("/api", healthRoutes(services));
  app.use("/api", openapiRoutes(services));
  app.use("/api", sessions(services));
  app.use("/api", sessionRoutes(services));
  app.use("/api", accountRoutes(services));
  app.use("/api", peopleRoutes(services));
  app.use("/api", holdingsRoutes(services));
  app.use("/api", accessRoutes(services));
  app.use("/api", importRoutes(services));
  app.use("/api", releaseRoutes(services));
  app.use("/api", questionRoutes(services));
  app.use("/api", ledgerRoutes());
  app.use("/api", notFound);
  app.use(serveClient());
  app.use(handleErrors(services));
  return app;
}
