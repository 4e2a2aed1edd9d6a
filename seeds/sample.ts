import { ageBand, MAN, REMOTE } from "./person.ts";
import type { Population } from "./population.ts";
import type { Random } from "./random.ts";

/** How many draws of a place each stratum gets (districts down; town, village, remote place across), and how many adults each. */
export interface SamplePlan {
  draws: readonly (readonly [number, number, number])[];
  adultsPerDraw: readonly [number, number, number];
}

/** The full waves: remote places hold a fifth of the adults and get a third of the draws. */
export const WAVE_PLAN: SamplePlan = {
  draws: [
    [44, 26, 14],
    [34, 26, 20],
    [20, 28, 26],
    [16, 24, 26],
    [12, 22, 28],
  ],
  adultsPerDraw: [30, 29, 20],
};

/** The pilot: too small for two places everywhere, so that some strata have a single PSU. */
export const PILOT_PLAN: SamplePlan = {
  draws: [
    [8, 5, 3],
    [6, 5, 3],
    [4, 5, 3],
    [3, 4, 1],
    [1, 3, 1],
  ],
  adultsPerDraw: [25, 25, 20],
};

/** Adults of a sample in order of stratum and PSU, as rows of the population. */
export interface DrawnSample {
  row: Uint32Array;
  weight: Float64Array;
  /** First adult of each PSU, and one past the last. */
  psuStart: Uint32Array;
  /** First PSU of each stratum, and one past the last. */
  stratumStart: Uint32Array;
  /** Label of each PSU: its place's, and where the place was drawn again the turn. */
  psuLabel: readonly string[];
}

/**
 * Two stages within strata. Places are drawn with probability proportional to their adults and with replacement, so that
 * PSUs are independent, as the variance estimator takes them; a place drawn again gives other adults as another PSU.
 * Within a place adults are drawn at random without replacement. Each adult weighs N_h / (draws · adults of the draw).
 */
export function drawSample(population: Population, plan: SamplePlan, random: Random): DrawnSample {
  const rows: number[] = [];
  const weights: number[] = [];
  const psuStart = [0];
  const stratumStart = [0];
  const psuLabel: string[] = [];
  for (const [index, stratum] of population.strata.entries()) {
    const settlement = index % 3;
    const draws = plan.draws[Math.floor(index / 3)]![settlement]!;
    const adults = population.placeStart[stratum.to]! - population.placeStart[stratum.from]!;
    for (const [place, turns] of drawPlaces(population, stratum.from, adults, draws, random)) {
      const from = population.placeStart[place]!;
      const size = population.placeStart[place + 1]! - from;
      const perDraw = Math.min(plan.adultsPerDraw[settlement]!, Math.floor(size / turns));
      const chosen = someOf(size, perDraw * turns, random);
      for (let turn = 0; turn < turns; turn += 1) {
        for (let k = turn * perDraw; k < (turn + 1) * perDraw; k += 1) {
          rows.push(from + chosen[k]!);
          weights.push(adults / (draws * perDraw));
        }
        psuStart.push(rows.length);
        psuLabel.push(population.places[place]!.label + (turn === 0 ? "" : `-${turn + 1}`));
      }
    }
    stratumStart.push(psuLabel.length);
  }
  return {
    row: Uint32Array.from(rows),
    weight: Float64Array.from(weights),
    psuStart: Uint32Array.from(psuStart),
    stratumStart: Uint32Array.from(stratumStart),
    psuLabel,
  };
}

/** Places of one stratum and how often each was drawn: the place of an adult chosen at random is chosen in proportion to its adults. */
function drawPlaces({ placeStart }: Population, from: number, adults: number, draws: number, random: Random): [number, number][] {
  const turns = new Map<number, number>();
  for (let draw = 0; draw < draws; draw += 1) {
    const adult = placeStart[from]! + random.below(adults);
    let place = from;
    while (placeStart[place + 1]! <= adult) place += 1;
    turns.set(place, (turns.get(place) ?? 0) + 1);
  }
  return [...turns].sort(([a], [b]) => a - b);
}

/** `count` different numbers below `size`, in random order. */
function someOf(size: number, count: number, random: Random): Uint32Array {
  const all = Uint32Array.from({ length: size }, (_, index) => index);
  for (let k = 0; k < count; k += 1) {
    const other = k + random.below(size - k);
    const swapped = all[k]!;
    all[k] = all[other]!;
    all[other] = swapped;
  }
  return all.subarray(0, count);
}

/** Chance to take part, by age band; the young and men are harder to reach, remote places easier. */
const RESPONSE = { age: [0.5, 0.55, 0.6, 0.66, 0.72, 0.77, 0.7], man: -0.07, remote: 0.05 };

/**
 * Those of a sample who take part, with weights corrected for the rest: within each cell of settlement, sex and age band
 * the weights of those who take part are raised to the sum of all.
 */
export function respond(population: Population, sample: DrawnSample, random: Random): DrawnSample {
  const { settlement, sex, age } = population.values;
  const cellOf = (row: number) => (settlement[row]! * 3 + sex[row]!) * 10 + ageBand(age[row]!);
  const drawnWeight = new Map<number, number>();
  const respondingWeight = new Map<number, number>();
  const kept: number[] = [];
  const psuStart = [0];
  for (let psu = 0; psu < sample.psuLabel.length; psu += 1) {
    for (let k = sample.psuStart[psu]!; k < sample.psuStart[psu + 1]!; k += 1) {
      const row = sample.row[k]!;
      const cell = cellOf(row);
      const weight = sample.weight[k]!;
      drawnWeight.set(cell, (drawnWeight.get(cell) ?? 0) + weight);
      const chance =
        RESPONSE.age[ageBand(age[row]!)]! +
        (sex[row] === MAN ? RESPONSE.man : 0) +
        (settlement[row] === REMOTE ? RESPONSE.remote : 0);
      if (random.uniform() >= chance) continue;
      respondingWeight.set(cell, (respondingWeight.get(cell) ?? 0) + weight);
      kept.push(k);
    }
    psuStart.push(kept.length);
  }
  const row = Uint32Array.from(kept, (k) => sample.row[k]!);
  const weight = Float64Array.from(kept, (k, index) => {
    const cell = cellOf(row[index]!);
    return (sample.weight[k]! * drawnWeight.get(cell)!) / respondingWeight.get(cell)!;
  });
  return { ...sample, row, weight, psuStart: Uint32Array.from(psuStart) };
}
