import * as mariadb from "mariadb";
import { measure, type Measurement } from "./measure.ts";
import { benchRows, GROUPS, RESPONDENTS } from "./survey.ts";

const AT_ONCE = 20_000;

/** The other way to the same totals: one GROUP BY over a table with one row for each respondent, clustered by stratum and PSU. */
export async function measureGroupBy(databaseUrl: string, runs: number): Promise<Measurement> {
  const connection = await mariadb.createConnection(databaseUrl);
  try {
    await connection.query(
      "CREATE TABLE bench_rows (stratum SMALLINT UNSIGNED, psu SMALLINT UNSIGNED, id INT UNSIGNED, cell SMALLINT UNSIGNED, w DOUBLE, y TINYINT, PRIMARY KEY (stratum, psu, id))",
    );
    await connection.beginTransaction();
    let rows: number[][] = [];
    let id = 0;
    const flush = async () => {
      if (rows.length > 0) await connection.batch("INSERT INTO bench_rows VALUES (?, ?, ?, ?, ?, ?)", rows);
      rows = [];
    };
    for (const { stratum, psu, weight, a, b, c, y } of benchRows()) {
      rows.push([stratum, psu, id++, (a * GROUPS[1] + b) * GROUPS[2] + c, weight, y]);
      if (rows.length === AT_ONCE) await flush();
    }
    await flush();
    await connection.commit();
    await connection.query("ANALYZE TABLE bench_rows");
    return await measure("GROUP BY stratum, psu, cell in MariaDB (totals only)", { warmUp: 1, runs, units: RESPONDENTS }, () =>
      connection.query("SELECT stratum, psu, cell, COUNT(*), SUM(w), SUM(w * y) FROM bench_rows GROUP BY stratum, psu, cell"),
    );
  } finally {
    await connection.end();
  }
}
