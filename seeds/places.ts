import { createRandom } from "./random.ts";

/** The five districts of the invented Tamarisk Coast; code 1 is the first. */
export const DISTRICTS = ["Lowmere", "Heronmouth", "Marram Flats", "Ochre Headland", "Upper Driftwold"] as const;
/** Kinds of settlement; code 1 is the first. */
export const SETTLEMENTS = ["Town", "Village", "Remote place"] as const;

/** Places of each district (rows) and settlement (columns): town blocks, villages, remote places. */
const PLACES: readonly (readonly [number, number, number])[] = [
  [95, 45, 62],
  [70, 50, 80],
  [36, 65, 106],
  [22, 56, 110],
  [14, 46, 112],
];
/** Fewest and most adults of a place, by settlement. */
const ADULTS: readonly (readonly [number, number])[] = [
  [200, 440],
  [130, 350],
  [55, 115],
];

/** A town block, a village or a remote place: the primary sampling unit. */
export interface Place {
  /** Two digits for the stratum and three for the place in it. */
  label: string;
  /** Position of its stratum, district by district. */
  stratum: number;
  /** Codes from 1. */
  district: number;
  settlement: number;
  adults: number;
}

/** A district's settlements of one kind. */
export interface Stratum {
  /** District and settlement code, such as "23". */
  code: string;
  label: string;
  /** First place, and one past the last. */
  from: number;
  to: number;
}

/** Every place with its number of adults, in order of stratum; the same at every wave. */
export function makePlaces(seed: number): { places: Place[]; strata: Stratum[] } {
  const random = createRandom(seed);
  const places: Place[] = [];
  const strata: Stratum[] = [];
  for (const [districtIndex, counts] of PLACES.entries()) {
    for (const [settlementIndex, count] of counts.entries()) {
      const [fewest, most] = ADULTS[settlementIndex]!;
      const code = `${districtIndex + 1}${settlementIndex + 1}`;
      const from = places.length;
      for (let place = 1; place <= count; place += 1) {
        places.push({
          label: `${code}${String(place).padStart(3, "0")}`,
          stratum: strata.length,
          district: districtIndex + 1,
          settlement: settlementIndex + 1,
          adults: fewest + random.below(most - fewest + 1),
        });
      }
      const label = `${DISTRICTS[districtIndex]!}, ${SETTLEMENTS[settlementIndex]!.toLowerCase()}`;
      strata.push({ code, label, from, to: places.length });
    }
  }
  return { places, strata };
}
