import { readConfig } from "../config.ts";
import { connectDatabase } from "../database.ts";
import { startServer } from "../main.ts";
import { createLogger } from "../middleware/requestLog.ts";
import { closeOnSignal, runCommand } from "./runCommand.ts";

/** The API alone over `DATABASE_URL`; `dev.ts` runs it again whenever a file changes. */
await runCommand(async () => {
  const config = readConfig(process.env);
  if (config.databaseUrl === null) throw new Error("Give DATABASE_URL; `npm run dev` does.");
  const sequelize = connectDatabase(config.databaseUrl);
  const server = await startServer({
    config,
    database: { sequelize, url: config.databaseUrl },
    logger: createLogger(config.logLevel),
  });
  closeOnSignal(async () => {
    await server.close();
    await sequelize.close();
  });
});
