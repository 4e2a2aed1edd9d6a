import { DISTRESS_LIMIT, MODEL, type Outcome, OUTCOMES, predictor, SHAPE } from "./outcomes.ts";
import { ATTRIBUTES, ageBand, type Attribute, drawCircumstances, ordinal, type Person } from "./person.ts";
import { makePlaces, type Place, type Stratum } from "./places.ts";
import { createRandom, type Random } from "./random.ts";

/** Waves of the demo, and the pilot that waits unpublished. */
export const WAVES = ["2021", "2023", "2025", "2026"] as const;
export type Wave = (typeof WAVES)[number];

const SEED = 4180;
const FIRST_YEAR = 2021;
const MOST_VISITS = 30;

/** All adults of the Tamarisk Coast at one wave. What is true of them is known exactly. */
export interface Population {
  wave: Wave;
  adults: number;
  places: readonly Place[];
  strata: readonly Stratum[];
  /** First adult of each place, and one past the last adult. */
  placeStart: Uint32Array;
  values: Record<Attribute, Uint8Array>;
}

/** A yes or no about one person; `person` is a view that the next person overwrites. */
export type Claim = (person: Readonly<Person>) => boolean;

const isYes = (random: Random, logOdds: number) => random.uniform() < 1 / (1 + Math.exp(-logOdds));

/** Smokers below daily, former and never, of those who don't smoke daily: cuts of a latent value that rises with age. */
function drawSmoking(isDaily: boolean, person: Person, random: Random): number {
  if (isDaily) return 1;
  return 4 - ordinal(random.logistic() + 0.25 * (ageBand(person.age) - 3), [0.9, 3]);
}

function drawOutcomes(person: Person, random: Random, predict: (outcome: Outcome) => number): void {
  person.smoking = drawSmoking(isYes(random, predict("smokesDaily")), person, random);
  person.triedToQuit = person.smoking > 2 ? 0 : isYes(random, predict("triedToQuit")) ? 1 : 2;
  person.bloodPressure = isYes(random, predict("pressureUnchecked")) ? 3 : random.uniform() < 0.75 ? 1 : 2;
  person.fluVaccination = isYes(random, predict("unvaccinated")) ? 2 : 1;
  person.activity = isYes(random, predict("inactive")) ? 1 : random.uniform() < 0.45 ? 2 : 3;
  person.careForgone = isYes(random, predict("careForgone")) ? 1 : 2;
  person.distress = Math.min(DISTRESS_LIMIT, Math.floor(Math.exp(predict("distress")) * random.gamma(SHAPE.distress)));
  const visits = random.poisson(Math.exp(predict("doctorVisits")) * random.gamma(SHAPE.doctorVisits));
  person.doctorVisits = Math.min(MOST_VISITS, visits);
}

/** Everyone, drawn from the stated model (MODEL.md). Places and what they share are the same at every wave; people are drawn anew. */
export function makePopulation(wave: Wave): Population {
  const { places, strata } = makePlaces(SEED);
  const placeStart = new Uint32Array(places.length + 1);
  for (const [index, place] of places.entries()) placeStart[index + 1] = placeStart[index]! + place.adults;
  const adults = placeStart[places.length]!;
  const values = columns(adults);
  const placeRandom = createRandom(SEED + 1);
  const random = createRandom(SEED + Number(wave));
  const waves = (Number(wave) - FIRST_YEAR) / 2;
  const person = emptyPerson();
  for (const [index, place] of places.entries()) {
    const effects = new Map(OUTCOMES.map((outcome) => [outcome, placeRandom.normal()]));
    const predict = (outcome: Outcome) => predictor(MODEL[outcome], person, effects.get(outcome)!, waves);
    for (let row = placeStart[index]!; row < placeStart[index + 1]!; row += 1) {
      person.district = place.district;
      person.settlement = place.settlement;
      drawCircumstances(person, random);
      drawOutcomes(person, random, predict);
      for (const attribute of ATTRIBUTES) values[attribute][row] = person[attribute];
    }
  }
  return { wave, adults, places, strata, placeStart, values };
}

/** The true share of `isAffected` among the adults of whom `isAmong` holds. */
export function trueShare(population: Population, isAffected: Claim, isAmong: Claim = () => true): number {
  return trueMean(population, (person) => (isAffected(person) ? 1 : 0), isAmong);
}

/** The true mean of a measure among the adults of whom `isAmong` holds. */
export function trueMean(population: Population, measure: (person: Readonly<Person>) => number, isAmong: Claim): number {
  let sum = 0;
  let count = 0;
  forEachPerson(population, (person) => {
    if (!isAmong(person)) return;
    sum += measure(person);
    count += 1;
  });
  return sum / count;
}

/** Visits every adult in order; `person` is a view that the next one overwrites. */
export function forEachPerson(population: Population, visit: (person: Readonly<Person>, row: number) => void): void {
  const person = emptyPerson();
  for (let row = 0; row < population.adults; row += 1) {
    for (const attribute of ATTRIBUTES) person[attribute] = population.values[attribute][row]!;
    visit(person, row);
  }
}

function columns(length: number): Record<Attribute, Uint8Array> {
  return byAttribute(() => new Uint8Array(length));
}

function emptyPerson(): Person {
  return byAttribute(() => 0);
}

function byAttribute<Value>(make: () => Value): Record<Attribute, Value> {
  return {
    district: make(),
    settlement: make(),
    sex: make(),
    age: make(),
    education: make(),
    work: make(),
    income: make(),
    household: make(),
    health: make(),
    smoking: make(),
    triedToQuit: make(),
    bloodPressure: make(),
    fluVaccination: make(),
    activity: make(),
    distress: make(),
    doctorVisits: make(),
    careForgone: make(),
  };
}
