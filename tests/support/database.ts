import { randomBytes } from "node:crypto";
import * as mariadb from "mariadb";
import type { Sequelize } from "sequelize";
import { inject } from "vitest";
import { connectDatabase } from "../../server/database.ts";
import { migrations } from "../../server/migrations/migrate.ts";

/** A fresh, migrated database on the tests' server. `close` drops it. */
export async function createDatabase(): Promise<{ sequelize: Sequelize; url: string; close: () => Promise<void> }> {
  const name = `perhundred_${randomBytes(6).toString("hex")}`;
  const server = inject("databaseServer");
  const connection = await mariadb.createConnection(`${server}perhundred`);
  await connection.query(`CREATE DATABASE ${name}`);
  const url = `${server}${name}`;
  const sequelize = connectDatabase(url);
  await migrations(sequelize).up();
  return {
    sequelize,
    url,
    close: async () => {
      await sequelize.close();
      await connection.query(`DROP DATABASE ${name}`);
      await connection.end();
    },
  };
}
