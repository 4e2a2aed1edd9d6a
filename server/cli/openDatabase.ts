import path from "node:path";
import type { Sequelize } from "sequelize";
import type { Config } from "../config.ts";
import { connectDatabase } from "../database.ts";
import { migrations } from "../migrations/migrate.ts";
import { CommandFault } from "./fault.ts";
import { startPrivateDatabase } from "./privateDatabase.ts";

export interface OpenDatabase {
  sequelize: Sequelize;
  url: string;
  /** Ends the connections, and the server where it is ours. */
  close: () => Promise<void>;
}

/**
 * Connects to the database of `DATABASE_URL`, or starts our private one, and brings its tables up to date.
 * @throws {CommandFault} when it can't be reached or started.
 */
export async function openDatabase(config: Config): Promise<OpenDatabase> {
  const server = config.databaseUrl === null ? await startPrivateDatabase(path.join(config.dataFolder, "mariadb")) : null;
  const url = server?.url ?? config.databaseUrl!;
  const sequelize = connectDatabase(url);
  const close = async () => {
    await sequelize.close();
    await server?.stop();
  };
  try {
    await sequelize.authenticate().catch((error: unknown) => {
      throw new CommandFault(
        "databaseUnreachable",
        `The database of DATABASE_URL can't be reached: ${error instanceof Error ? error.message : String(error)}`,
      );
    });
    await migrations(sequelize).up();
  } catch (error) {
    await close();
    throw error;
  }
  return { sequelize, url, close };
}
