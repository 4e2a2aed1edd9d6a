import type { Random } from "./random.ts";

/** What is known of each adult of the population: whole numbers, codes from 1 as the codebook has them. */
export const ATTRIBUTES = [
  "district",
  "settlement",
  "sex",
  "age",
  "education",
  "work",
  "income",
  "household",
  "health",
  "smoking",
  "triedToQuit",
  "bloodPressure",
  "fluVaccination",
  "activity",
  "distress",
  "doctorVisits",
  "careForgone",
] as const;
export type Attribute = (typeof ATTRIBUTES)[number];
export type Person = Record<Attribute, number>;

export const WOMAN = 1;
export const MAN = 2;
export const REMOTE = 3;
/** Code of `work`. */
const WORK = { paid: 1, looking: 2, learning: 3, home: 4, retired: 5, ill: 6 } as const;
export const LOOKING_FOR_WORK = WORK.looking;

/** First age of each band of the model; the last is open. */
export const BAND_STARTS = [18, 25, 35, 45, 55, 65, 75] as const;
const OLDEST = 95;
const BAND_SHARES = [0.11, 0.16, 0.17, 0.17, 0.17, 0.13, 0.09];

/** Position of an age's band. */
export function ageBand(age: number): number {
  let band = BAND_STARTS.length - 1;
  while (band > 0 && age < BAND_STARTS[band]!) band -= 1;
  return band;
}

/** Position of the band of a latent value between ordered cuts. */
export function ordinal(latent: number, cuts: readonly number[]): number {
  let level = 0;
  while (level < cuts.length && latent >= cuts[level]!) level += 1;
  return level;
}

/** Shares of `work` by age band, for women and for men: paid, looking, learning, at home, retired, ill. */
const WORK_SHARES: readonly (readonly [readonly number[], readonly number[]])[] = [
  [
    [0.4, 0.1, 0.37, 0.11, 0, 0.02],
    [0.5, 0.14, 0.32, 0.02, 0, 0.02],
  ],
  [
    [0.66, 0.07, 0.04, 0.2, 0, 0.03],
    [0.83, 0.1, 0.03, 0.01, 0, 0.03],
  ],
  [
    [0.73, 0.05, 0.01, 0.17, 0, 0.04],
    [0.87, 0.07, 0, 0.02, 0, 0.04],
  ],
  [
    [0.75, 0.05, 0, 0.13, 0.01, 0.06],
    [0.85, 0.07, 0, 0.01, 0.01, 0.06],
  ],
  [
    [0.58, 0.03, 0, 0.13, 0.16, 0.1],
    [0.69, 0.05, 0, 0.01, 0.15, 0.1],
  ],
  [
    [0.09, 0, 0, 0.08, 0.79, 0.04],
    [0.14, 0, 0, 0, 0.82, 0.04],
  ],
  [
    [0.01, 0, 0, 0.04, 0.93, 0.02],
    [0.03, 0, 0, 0, 0.95, 0.02],
  ],
];
/** Added to the latent schooling of each age band and settlement, and its cuts: primary, lower, upper, beyond. */
const SCHOOLING = { age: [0.3, 0.6, 0.5, 0.2, -0.2, -0.7, -1.2], settlement: [0.25, -0.2, -0.55], cuts: [-1.9, -0.5, 1.1] };
/** Added to the latent income, and its cuts into five groups. */
const INCOME = {
  education: [-1.1, -0.5, 0.2, 1.1],
  work: [0.5, -1.5, -0.7, -0.5, -0.3, -1.2],
  settlement: [0.15, -0.1, -0.4],
  district: [0.15, 0.1, -0.05, -0.15, -0.3],
  cuts: [-1.5, -0.5, 0.4, 1.5],
};
/** Mean number of others in the household, by age band and settlement. */
const OTHERS = { age: [2.6, 1.9, 2.4, 2, 1.2, 0.8, 0.5], settlement: [0.95, 1, 1.1] };
/** Added to the latent ill health; cuts: very good, good, fair, poor, very poor. */
const HEALTH = {
  age: [-0.9, -0.7, -0.4, 0, 0.4, 0.7, 1.2],
  income: [0.6, 0.25, 0, -0.25, -0.5],
  ill: 1.8,
  cuts: [-1.1, 0.9, 2.3, 3.7],
};

/** Fills in who a person is: everything that the outcomes depend on. District and settlement are there already. */
export function drawCircumstances(person: Person, random: Random): void {
  const band = random.pick(BAND_SHARES);
  const from = BAND_STARTS[band]!;
  const to = BAND_STARTS[band + 1] ?? OLDEST + 1;
  person.age = from + random.below(to - from);
  const womenShare = 0.495 + 0.02 * Math.max(0, band - 3);
  person.sex = random.uniform() < womenShare ? WOMAN : MAN;
  const settlement = person.settlement - 1;
  person.education = 1 + ordinal(SCHOOLING.age[band]! + SCHOOLING.settlement[settlement]! + random.logistic(), SCHOOLING.cuts);
  person.work = 1 + random.pick(WORK_SHARES[band]![person.sex - 1]!);
  const income =
    INCOME.education[person.education - 1]! +
    INCOME.work[person.work - 1]! +
    INCOME.settlement[settlement]! +
    INCOME.district[person.district - 1]!;
  person.income = 1 + ordinal(income + random.logistic(), INCOME.cuts);
  person.household = Math.min(12, 1 + random.poisson(OTHERS.age[band]! * OTHERS.settlement[settlement]!));
  const illness = HEALTH.age[band]! + HEALTH.income[person.income - 1]! + (person.work === WORK.ill ? HEALTH.ill : 0);
  person.health = 1 + ordinal(illness + random.logistic(), HEALTH.cuts);
}
