import type { Sequelize } from "sequelize";
import { SequelizeStorage, Umzug } from "umzug";
import { people } from "./0001People.ts";
import { holdings } from "./0002Holdings.ts";
import { microdata } from "./0003Microdata.ts";
import { ledger } from "./0004Ledger.ts";

const MIGRATIONS = [people, holdings, microdata, ledger];

/** The migrations of this version over one database; `up()` brings it up to date, `down()` takes the newest back. */
export function migrations(sequelize: Sequelize): Umzug {
  const run = async (statements: readonly string[]) => {
    for (const statement of statements) await sequelize.query(statement);
  };
  return new Umzug({
    migrations: MIGRATIONS.map((migration) => ({
      name: migration.name,
      up: () => run(migration.up),
      down: () => run(migration.down),
    })),
    storage: new SequelizeStorage({ sequelize, tableName: "migrations" }),
    logger: undefined,
  });
}
