import { ageBand, LOOKING_FOR_WORK, MAN, type Person, REMOTE, WOMAN } from "./person.ts";

/** What adds to the linear predictor for some people beyond the main effects. */
interface Special {
  who: string;
  applies: (person: Person) => boolean;
  adds: number;
  /** Added again for each two years since 2021. */
  addsPerWave?: number;
}

/** A linear predictor: on the log-odds scale for a yes or no, on the log scale for a mean. */
export interface Terms {
  intercept: number;
  /** Women, men. */
  sex: readonly [number, number];
  /** 18–24, 25–34, 35–44, 45–54, 55–64, 65–74, 75 and over. */
  age: readonly number[];
  /** Primary or none, lower secondary, upper secondary, beyond. */
  education: readonly number[];
  /** Poorest fifth to richest fifth. */
  income: readonly number[];
  /** Town, village, remote place. */
  settlement: readonly [number, number, number];
  /** In the order of `DISTRICTS`. */
  district: readonly number[];
  /** Added for each two years since 2021. */
  perWave: number;
  /** Standard deviation of the effect that all people of one place share, at every wave. */
  placeSpread: number;
  specials: readonly Special[];
}

export const OUTCOMES = [
  "smokesDaily",
  "triedToQuit",
  "pressureUnchecked",
  "unvaccinated",
  "inactive",
  "careForgone",
  "distress",
  "doctorVisits",
] as const;
export type Outcome = (typeof OUTCOMES)[number];

/** The group whose smoking is far above all others', and doesn't fall. */
export const isPlantedGroup = (person: Person): boolean =>
  person.sex === MAN && person.settlement === REMOTE && person.age >= 25 && person.age < 45;

const POOREST = 1;
const SECOND_POOREST = 2;
const NONE5 = [0, 0, 0, 0, 0];

/** The whole model of the outcomes: every coefficient that the demo's figures come from. */
export const MODEL: Record<Outcome, Terms> = {
  smokesDaily: {
    intercept: -1.38,
    sex: [-0.22, 0.22],
    age: [-0.05, 0.2, 0.25, 0.15, 0, -0.55, -1.2],
    education: [0.45, 0.25, -0.1, -0.75],
    income: [0.3, 0.15, 0, -0.15, -0.3],
    settlement: [0, 0.05, 0.1],
    district: [0.1, -0.1, 0, 0, 0.05],
    perWave: -0.12,
    placeSpread: 0.42,
    specials: [
      { who: "men aged 25 to 44 in remote places", applies: isPlantedGroup, adds: 0.7, addsPerWave: 0.12 },
      {
        who: "men aged 35 to 54 in Lowmere",
        applies: ({ sex, age, district }) => sex === MAN && age >= 35 && age < 55 && district === 1,
        adds: 0.4,
      },
      { who: "people looking for work", applies: ({ work }) => work === LOOKING_FOR_WORK, adds: 0.35 },
    ],
  },
  triedToQuit: {
    intercept: -0.25,
    sex: [0.15, -0.1],
    age: [0.25, 0.2, 0.1, 0, 0.05, -0.1, -0.4],
    education: [-0.25, -0.1, 0.05, 0.3],
    income: [-0.15, -0.05, 0, 0.05, 0.15],
    settlement: [0.1, 0, -0.35],
    district: [0.1, 0, 0, -0.1, -0.1],
    perWave: 0.08,
    placeSpread: 0.35,
    specials: [],
  },
  pressureUnchecked: {
    intercept: -0.95,
    sex: [-0.3, 0.3],
    age: [0.85, 0.6, 0.35, -0.1, -0.7, -1.2, -1.5],
    education: [0.2, 0.1, 0, -0.2],
    income: [0.3, 0.15, 0, -0.1, -0.2],
    settlement: [0, 0.2, 0.55],
    district: [-0.1, -0.05, 0.05, 0.1, 0.2],
    perWave: -0.08,
    placeSpread: 0.46,
    specials: [
      { who: "remote places, where it grows", applies: ({ settlement }) => settlement === REMOTE, adds: 0, addsPerWave: 0.2 },
      {
        who: "men under 35 in Ochre Headland",
        applies: ({ sex, age, district }) => sex === MAN && age < 35 && district === 4,
        adds: 0.45,
      },
    ],
  },
  unvaccinated: {
    intercept: 0.9,
    sex: [-0.1, 0.1],
    age: [0.7, 0.6, 0.45, 0.15, -0.2, -1.1, -1.5],
    education: [0.25, 0.15, 0, -0.3],
    income: [0.2, 0.1, 0, -0.1, -0.2],
    settlement: [-0.05, 0.05, 0.3],
    district: [-0.1, -0.1, 0, 0.1, 0.2],
    perWave: -0.2,
    placeSpread: 0.48,
    specials: [
      { who: "Upper Driftwold, where it doesn't fall", applies: ({ district }) => district === 5, adds: 0, addsPerWave: 0.2 },
    ],
  },
  inactive: {
    intercept: -0.8,
    sex: [0.15, -0.15],
    age: [-0.5, -0.3, -0.1, 0, 0.15, 0.4, 1],
    education: [0.35, 0.15, -0.05, -0.35],
    income: [0.2, 0.1, 0, -0.05, -0.15],
    settlement: [0.15, -0.1, -0.15],
    district: [0, 0.1, 0, -0.1, 0],
    perWave: 0,
    placeSpread: 0.42,
    specials: [
      {
        who: "women under 45 who left school early",
        applies: ({ sex, age, education }) => sex === WOMAN && age < 45 && education <= 2,
        adds: 0.45,
      },
    ],
  },
  careForgone: {
    intercept: -2.45,
    sex: [0.1, -0.1],
    age: [-0.1, 0.1, 0.15, 0.15, 0.1, -0.25, -0.5],
    education: [0.2, 0.1, 0, -0.15],
    income: [0.9, 0.5, 0, -0.45, -0.95],
    settlement: [0, 0.15, 0.35],
    district: [-0.15, 0, 0.05, 0.1, 0.15],
    perWave: 0,
    placeSpread: 0.46,
    specials: [
      {
        who: "the poorest fifth in remote places",
        applies: ({ income, settlement }) => income === POOREST && settlement === REMOTE,
        adds: 0.5,
      },
      {
        who: "the two poorest fifths, where it grows",
        applies: ({ income }) => income <= SECOND_POOREST,
        adds: 0,
        addsPerWave: 0.1,
      },
    ],
  },
  distress: {
    intercept: 1.5,
    sex: [0.1, -0.1],
    age: [0.2, 0.1, 0.05, 0, -0.05, -0.15, -0.1],
    education: [0.08, 0.04, 0, -0.05],
    income: [0.3, 0.12, 0, -0.08, -0.15],
    settlement: [0, -0.03, 0.05],
    district: NONE5,
    perWave: 0.02,
    placeSpread: 0.16,
    specials: [
      {
        who: "women under 25, whose distress grows",
        applies: ({ sex, age }) => sex === WOMAN && age < 25,
        adds: 0.1,
        addsPerWave: 0.1,
      },
      { who: "people looking for work", applies: ({ work }) => work === LOOKING_FOR_WORK, adds: 0.3 },
      { who: "people in poor or very poor health", applies: ({ health }) => health >= 4, adds: 0.5 },
    ],
  },
  doctorVisits: {
    intercept: 0.05,
    sex: [0.15, -0.15],
    age: [-0.3, -0.2, -0.15, 0, 0.15, 0.3, 0.4],
    education: [0, 0, 0, 0.05],
    income: NONE5,
    settlement: [0.1, 0, -0.35],
    district: [0.05, 0.05, 0, -0.05, -0.1],
    perWave: 0,
    placeSpread: 0.24,
    specials: [
      { who: "people in fair health", applies: ({ health }) => health === 3, adds: 0.4 },
      { who: "people in poor or very poor health", applies: ({ health }) => health >= 4, adds: 0.9 },
    ],
  },
};

/** Score's and visits' shape of the gamma that spreads people of one mean: the lower, the more skewed. */
export const SHAPE = { distress: 1.4, doctorVisits: 1 } as const;
/** Highest score of the distress scale. */
export const DISTRESS_LIMIT = 40;

/**
 * A person's linear predictor.
 * @param placeEffect The place's draw from a standard normal.
 * @param waves Steps of two years since 2021.
 */
export function predictor(terms: Terms, person: Person, placeEffect: number, waves: number): number {
  let sum =
    terms.intercept +
    terms.sex[person.sex - 1]! +
    terms.age[ageBand(person.age)]! +
    terms.education[person.education - 1]! +
    terms.income[person.income - 1]! +
    terms.settlement[person.settlement - 1]! +
    terms.district[person.district - 1]! +
    terms.perWave * waves +
    terms.placeSpread * placeEffect;
  for (const special of terms.specials) {
    if (special.applies(person)) sum += special.adds + (special.addsPerWave ?? 0) * waves;
  }
  return sum;
}
