import { type DrawnSample } from "../../../seeds/sample.ts";
import type { Claim, Population } from "../../../seeds/population.ts";
import { forEachPerson } from "../../../seeds/population.ts";
import type { Sample } from "../../../server/statistics/types.ts";

/** A drawn sample as the engine takes it. */
export function sampleOf({ weight, psuStart, stratumStart }: DrawnSample): Sample {
  return {
    weight,
    psuStart,
    stratumStart,
    lonely: "centred",
    stratumPopulation: null,
    secondStage: null,
    replicates: null,
  };
}

/** 1 for each adult of whom the claim holds. */
export function flags(population: Population, claim: Claim): Uint8Array {
  const holds = new Uint8Array(population.adults);
  forEachPerson(population, (person, row) => {
    holds[row] = claim(person) ? 1 : 0;
  });
  return holds;
}

/** Values of the drawn adults, in the sample's order. */
export function ofDrawn(sample: DrawnSample, values: Uint8Array): Float64Array {
  return Float64Array.from(sample.row, (row) => values[row]!);
}
