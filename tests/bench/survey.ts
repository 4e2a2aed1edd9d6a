import { createWriteStream } from "node:fs";
import { finished } from "node:stream/promises";
import { createRandom } from "../../seeds/random.ts";

export const RESPONDENTS = 430_000;
export const STRATA = 800;
export const PSUS = 13_000;
/** Categories of the three breakdowns: 192 cells. */
export const GROUPS = [8, 6, 4] as const;

/** One generated respondent. */
export interface BenchRow {
  stratum: number;
  psu: number;
  weight: number;
  a: number;
  b: number;
  c: number;
  y: number;
}

/** Generated respondents in the order of a file as it comes: PSUs mixed. The same at every run. */
export function* benchRows(): Generator<BenchRow> {
  const random = createRandom(192);
  for (let row = 0; row < RESPONDENTS; row++) {
    const psu = random.below(PSUS);
    const a = random.below(GROUPS[0]);
    yield {
      stratum: psu % STRATA,
      psu,
      weight: Math.round((0.2 + 3 * random.uniform()) * 1000) / 1000,
      a,
      b: random.below(GROUPS[1]),
      c: random.below(GROUPS[2]),
      y: random.uniform() < 0.08 + 0.02 * a ? 1 : 0,
    };
  }
}

/** Writes the survey as microdata (CSV). */
export async function writeBenchFile(path: string): Promise<void> {
  const file = createWriteStream(path);
  file.write("stratum,psu,weight,a,b,c,y\n");
  let lines: string[] = [];
  for (const { stratum, psu, weight, a, b, c, y } of benchRows()) {
    lines.push(`${stratum},${psu},${weight},${a},${b},${c},${y}\n`);
    if (lines.length < 10_000) continue;
    file.write(lines.join(""));
    lines = [];
  }
  file.end(lines.join(""));
  await finished(file);
}

/** Its codebook. */
export const BENCH_CODEBOOK = [
  "variable,label,kind,code,category label,missing",
  ...["stratum", "psu", "weight"].map((name) => `${name},,numeric,,,`),
  ...(["a", "b", "c"] as const).flatMap((name, i) => [
    `${name},,categorical,,,`,
    ...Array.from({ length: GROUPS[i]! }, (_, code) => `${name},,,${code},,`),
  ]),
  "y,,categorical,,,",
  "y,,,0,,",
  "y,,,1,,",
  "",
].join("\n");
