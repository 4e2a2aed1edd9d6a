import { describe, expect, it } from "vitest";
import { migrations } from "../../server/migrations/migrate.ts";
import { createDatabase } from "../support/database.ts";

describe("migrations", () => {
  it("go up on an empty database, and the newest goes down and up again", async () => {
    const { sequelize, close } = await createDatabase();
    const umzug = migrations(sequelize);
    expect(await umzug.pending()).toEqual([]);
    const newest = (await umzug.executed()).at(-1)?.name;
    await umzug.down();
    expect((await umzug.pending()).map((migration) => migration.name)).toEqual([newest]);
    await umzug.up();
    expect(await umzug.pending()).toEqual([]);
    await close();
  });
});
