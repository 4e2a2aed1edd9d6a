import { writeFile } from "node:fs/promises";
import path from "node:path";
import papaparse from "papaparse";
import { DOES_NOT_KNOW, NOT_ASKED, type DemoVariable, demoVariables, REFUSED } from "./codebook.ts";
import { makePopulation, type Population, type Wave } from "./population.ts";
import { createRandom, type Random } from "./random.ts";
import { type DrawnSample, drawSample, PILOT_PLAN, respond, WAVE_PLAN } from "./sample.ts";

const SAMPLE_SEED = 100_000;
const PILOT = "2026";
/** The pilot tried a short form that left the distress questions out for some. */
const PILOT_UNASKED_DISTRESS = 0.42;
/** Answers after which a person is asked whether they tried to stop. */
const SMOKES = new Set<string | undefined>(["1", "2"]);

/** One wave as its files: microdata and codebook, both CSV. */
export interface ReleaseFiles {
  microdata: string;
  codebook: string;
}

/** Draws one wave's respondents and writes down what they answered; the same text at every run. */
export function releaseFiles(wave: Wave): ReleaseFiles {
  const population = makePopulation(wave);
  const random = createRandom(SAMPLE_SEED + Number(wave));
  const plan = wave === PILOT ? PILOT_PLAN : WAVE_PLAN;
  const sample = respond(population, drawSample(population, plan, random), random);
  const variables = demoVariables(population.strata).map((variable) =>
    wave === PILOT && variable.name === "distress"
      ? { ...variable, missing: { ...variable.missing, empty: PILOT_UNASKED_DISTRESS } }
      : variable,
  );
  return { microdata: microdataText(population, sample, variables, random), codebook: codebookText(variables) };
}

/** Writes one wave's files into a folder. */
export async function writeReleaseFiles(folder: string, wave: Wave): Promise<{ microdataPath: string; codebookPath: string }> {
  const files = releaseFiles(wave);
  const microdataPath = path.join(folder, `microdata-${wave}.csv`);
  const codebookPath = path.join(folder, `codebook-${wave}.csv`);
  await writeFile(microdataPath, files.microdata);
  await writeFile(codebookPath, files.codebook);
  return { microdataPath, codebookPath };
}

function microdataText(population: Population, sample: DrawnSample, variables: readonly DemoVariable[], random: Random): string {
  const lines = [];
  let stratum = 0;
  for (let psu = 0; psu < sample.psuLabel.length; psu += 1) {
    while (psu >= sample.stratumStart[stratum + 1]!) stratum += 1;
    for (let k = sample.psuStart[psu]!; k < sample.psuStart[psu + 1]!; k += 1) {
      const made: Record<string, string | undefined> = {
        respondent: `${population.wave.slice(2)}-${String(k + 1).padStart(5, "0")}`,
        stratum: population.strata[stratum]!.code,
        psu: sample.psuLabel[psu]!,
        weight: sample.weight[k]!.toFixed(4),
      };
      for (const { name, attribute, missing } of variables) {
        if (attribute === null) continue;
        const value = answer(missing, population.values[attribute][sample.row[k]!]!, random);
        made[name] = name === "tried_to_quit" && !SMOKES.has(made.smoking) ? NOT_ASKED : value;
      }
      lines.push(variables.map(({ name }) => made[name]));
    }
  }
  return papaparse.unparse({ fields: variables.map(({ name }) => name), data: lines }, { newline: "\n" }) + "\n";
}

/** What the file holds for a true value; absences are drawn whatever the value, so that answers stand for all. */
function answer({ doesNotKnow, refused, empty }: DemoVariable["missing"], value: number, random: Random): string {
  const draw = random.uniform();
  if (draw < doesNotKnow) return DOES_NOT_KNOW;
  if (draw < doesNotKnow + refused) return REFUSED;
  if (draw < doesNotKnow + refused + empty) return "";
  return String(value);
}

function codebookText(variables: readonly DemoVariable[]): string {
  const lines = variables.flatMap(({ name, label, kind, categories }) => [
    [name, label, kind, "", "", ""],
    ...categories.map((category) => [name, "", "", category.code, category.label, category.isMissing ? "yes" : ""]),
  ]);
  const fields = ["variable", "label", "kind", "code", "category label", "missing"];
  return papaparse.unparse({ fields, data: lines }, { newline: "\n" }) + "\n";
}
