import { summary, type Measurement } from "../../tests/bench/measure.ts";
import { runBench } from "../../tests/bench/run.ts";
import { PSUS, RESPONDENTS, STRATA } from "../../tests/bench/survey.ts";
import { runCommand } from "./runCommand.ts";

const ms = (value: number) => (value < 100 ? value.toFixed(1) : value.toFixed(0));

/** Speed as ratios to the same totals by SQL in the same run; with `--json` the same for machines. */
await runCommand(async () => {
  const isJson = process.argv.includes("--json");
  const measurements = await runBench((line) => console.error(line));
  const sql = summary(measurements.at(-1)!).medianMs;
  const lines = measurements.map((measurement: Measurement) => {
    const { medianMs, leastMs, greatestMs } = summary(measurement);
    const perSecond = measurement.units === null ? null : Math.round(measurement.units / (medianMs / 1000));
    return {
      name: measurement.name,
      medianMs,
      leastMs,
      greatestMs,
      runs: measurement.runs.length,
      perSecond,
      ratioToSql: medianMs / sql,
    };
  });
  if (isJson) {
    console.log(JSON.stringify({ respondents: RESPONDENTS, strata: STRATA, psus: PSUS, measurements: lines }, null, 2));
    return;
  }
  console.log(
    `${RESPONDENTS.toLocaleString("en-GB")} respondents, ${STRATA} strata, ${PSUS.toLocaleString("en-GB")} PSUs; median (least to greatest), ratio to the SQL.`,
  );
  for (const { name, medianMs, leastMs, greatestMs, perSecond, ratioToSql } of lines) {
    const rate = perSecond === null ? "" : `, ${perSecond.toLocaleString("en-GB")} rows/s`;
    console.log(
      `${ms(medianMs).padStart(8)} ms (${ms(leastMs)} to ${ms(greatestMs)})  × ${ratioToSql.toPrecision(3)}${rate}  ${name}`,
    );
  }
});
