import { describe, expect, it } from "vitest";
import { adjustPValues } from "../../server/statistics/adjustments.ts";
import { estimateTargets, intervalFor } from "../../server/statistics/estimate.ts";
import { reliabilityOfShare } from "../../server/statistics/reliability.ts";
import { buildSample, type Row } from "./support/buildSample.ts";
import { estimateAll, load, options } from "./support/published.ts";
import { readTable } from "./support/referenceCases.ts";

const examination = { weight: "WTMEC2YR", strata: "SDMVSTRA", psu: "SDMVPSU" };
const cholesterol = { variable: "HI_CHOL", affected: 1 };

// Everyone of the file by sex, race and age: age 1 is under 20, 2 is 20–39, 3 is 40–59, 4 is 60 and over.
const nhanes = load("nhanes.csv", examination, { outcome: cholesterol, by: ["RIAGENDR", "race", "agecat"] });
type Among = { sex?: number; race?: number; ages?: number[] };
const adults = [2, 3, 4];

function cellsOf({ sex, race, ages }: Among): number[] {
  return nhanes.keys.flatMap((key, cell) => {
    const isIn = (sex ?? key[0]) === key[0] && (race ?? key[1]) === key[1] && (ages?.includes(Number(key[2])) ?? true);
    return isIn ? [cell] : [];
  });
}

function nhanesContrasts(groups: Among[], pairs: [number, number][]) {
  const targets = groups.map((group) => ({ cells: cellsOf(group) }));
  const requests = pairs.map(([of, from]) => ({ of, from }));
  return estimateTargets(nhanes.sample, nhanes.assignment, targets, requests, options).contrasts;
}

// High total cholesterol, NHANES 2009–2010 (Carroll, Kit & Lacher 2012, NCHS Data Brief 92, from public-use data), by the
// steps of Series 2, No. 175: n, events, df, p, SE, deff, effective n, the same adjusted, limits, whether to present.
const CRUDE: [string, Among, number, number, number, number, number, number, number, number, number, number, boolean][] = [
  ["everyone", {}, 7846, 787, 16, 0.112143, 0.005446, 2.337, 3357.263, 2870.666, 0.100826, 0.124258, true],
  ["20+", { ages: adults }, 5696, 771, 16, 0.136178, 0.006573, 2.0918, 2723, 2328.603, 0.122497, 0.150781, true],
  ["under 20", { ages: [1] }, 2150, 16, 16, 0.00866, 0.002667, 1.7811, 1207.093, 1032.983, 0.003956, 0.016406, true],
  ["20–39", { ages: [2] }, 1905, 158, 16, 0.078891, 0.009069, 2.1562, 883.485, 756.162, 0.06069, 0.100454, true],
  ["40–59", { ages: [3] }, 1911, 340, 16, 0.178494, 0.010985, 1.5725, 1215.229, 1040.093, 0.155677, 0.203146, true],
  ["60+", { ages: [4] }, 1880, 273, 16, 0.155297, 0.012568, 2.2638, 830.478, 710.806, 0.129443, 0.18405, true],
  ["men", { sex: 1, ages: adults }, 2760, 353, 16, 0.123291, 0.008648, 1.9097, 1445.229, 1236.463, 0.105474, 0.142921, true],
  ["women", { sex: 2, ages: adults }, 2936, 418, 16, 0.148259, 0.007407, 1.2756, 2301.634, 1969.055, 0.132841, 0.164731, true],
  ["black", { race: 3, ages: adults }, 970, 102, 14, 0.100952, 0.012784, 1.7466, 555.364, 464.934, 0.075106, 0.132003, true],
  ["other", { race: 4, ages: adults }, 315, 44, 14, 0.125039, 0.033683, 3.2666, 96.432, 81.153, 0.062007, 0.21713, true],
  [
    "other women",
    { sex: 2, race: 4, ages: adults },
    164,
    18,
    12,
    0.111415,
    0.038729,
    2.4847,
    66.005,
    54.213,
    0.042176,
    0.226402,
    false,
  ],
  [
    "other men",
    { sex: 1, race: 4, ages: adults },
    151,
    26,
    13,
    0.140913,
    0.043592,
    2.3703,
    63.705,
    53.29,
    0.060845,
    0.263579,
    false,
  ],
  ["black 20–39", { race: 3, ages: [2] }, 329, 18, 10, 0.050016, 0.015318, 1.6247, 202.503, 157.854, 0.021692, 0.096565, false],
  ["other 40–59", { race: 4, ages: [3] }, 101, 14, 10, 0.133163, 0.054709, 2.6189, 38.566, 30.577, 0.038077, 0.304912, false],
  ["other 60+", { race: 4, ages: [4] }, 78, 13, 6, 0.150492, 0.05038, 1.5486, 50.369, 33.357, 0.050874, 0.316648, false],
];

describe("NHANES 2009–2010, crude prevalence of high total cholesterol", () => {
  it.each(CRUDE)("%s", (_, among, n, events, df, p, se, deff, effective, adjusted, low, high, isPresented) => {
    const { targets } = estimateTargets(nhanes.sample, nhanes.assignment, [{ cells: cellsOf(among) }], [], options);
    const actual = targets[0]!;
    expect(actual).toMatchObject({ respondents: n, affectedRespondents: events, df });
    expect(actual.estimate).toBeCloseTo(p, 6);
    expect(actual.se).toBeCloseTo(se, 6);
    expect(actual.deff).toBeCloseTo(deff, 4);
    expect(actual.effectiveBeforeAdjustment).toBeCloseTo(effective, 3);
    expect(actual.effectiveRespondents).toBeCloseTo(adjusted, 3);
    expect(actual.low).toBeCloseTo(low, 6);
    expect(actual.high).toBeCloseTo(high, 6);
    expect(reliabilityOfShare(actual).verdict === "reliable").toBe(isPresented);
  });

  it("has 28 million adults with the condition, with the published standard errors of totals", () => {
    const groups: Among[] = [{ ages: adults }, { sex: 1, ages: adults }, { sex: 2, ages: adults }];
    const targets = groups.map((group) => ({ cells: cellsOf(group) }));
    const [all, men, women] = estimateTargets(nhanes.sample, nhanes.assignment, targets, [], options).targets;
    // Printed 28,218,434; the sexes' printed counts add up to one more, which is how .5 rounds.
    expect(all!.affectedPeople).toBeCloseTo(28_218_434.5, 0);
    expect(Math.round(all!.affectedPeopleSe!)).toBe(2_022_446);
    expect(Math.round(all!.people)).toBe(207_216_825);
    expect(Math.round(all!.peopleSe!)).toBe(11_846_600);
    expect(Math.round(men!.affectedPeopleSe!)).toBe(1_092_309);
    expect(Math.round(women!.affectedPeopleSe!)).toBe(1_099_134);
  });
});

describe("NHANES 2009–2010, differences with the covariance of shared sampling units", () => {
  it("women less men", () => {
    const [women] = nhanesContrasts(
      [
        { sex: 2, ages: adults },
        { sex: 1, ages: adults },
      ],
      [[0, 1]],
    );
    expect(women!.difference).toBeCloseTo(0.0249675, 7);
    expect(women!.se).toBeCloseTo(0.00919, 5);
    expect(women!.low).toBeCloseTo(0.005488, 6);
    expect(women!.high).toBeCloseTo(0.044447, 6);
    expect(women!.covariance).toBeCloseTo(2.261e-5, 9);
    // Rao–Scott's F(1, 16) = 6.98575 of the same two groups has almost the same p.
    expect(women!.p).toBeCloseTo(0.015, 2);
  });

  it("age groups, adjusted for three comparisons", () => {
    const groups: Among[] = [{ ages: [2] }, { ages: [3] }, { ages: [4] }];
    const contrasts = nhanesContrasts(groups, [
      [1, 0],
      [2, 0],
      [2, 1],
    ]);
    const published = [
      [0.099602, 0.013755, 1.97e-6],
      [0.076406, 0.014355, 6.87e-5],
      [-0.023197, 0.01365, 0.1086],
    ] as const;
    published.forEach(([difference, se, p], index) => {
      expect(contrasts[index]!.difference).toBeCloseTo(difference, 6);
      expect(contrasts[index]!.se).toBeCloseTo(se, 6);
      expect(contrasts[index]!.p! / p).toBeCloseTo(1, 2);
    });
    expect(contrasts[0]!.low).toBeCloseTo(0.070443, 6);
    expect(contrasts[0]!.high).toBeCloseTo(0.128762, 6);
    const raw = contrasts.map(({ p }) => p);
    const holm = adjustPValues(raw, "holm");
    expect(holm[0]! / 5.91e-6).toBeCloseTo(1, 2);
    expect(holm[1]! / 1.374e-4).toBeCloseTo(1, 2);
    expect(holm[2]).toBeCloseTo(0.1086, 4);
    expect(adjustPValues(raw, "benjamini-hochberg")[1]! / 1.031e-4).toBeCloseTo(1, 2);
  });

  it("ethnic groups, each against each: none left at 5 % but one", () => {
    const groups = [1, 2, 3, 4].map((race): Among => ({ race, ages: adults }));
    const contrasts = nhanesContrasts(groups, [
      [2, 1],
      [2, 0],
      [0, 1],
      [3, 0],
      [3, 1],
      [3, 2],
    ]);
    expect(contrasts[0]!.difference).toBeCloseTo(-0.041645, 6);
    expect(contrasts[0]!.se).toBeCloseTo(0.013312, 6);
    expect(contrasts[1]!.se).toBeCloseTo(0.015333, 6);
    const raw = contrasts.map(({ p }) => p);
    for (const p of raw.slice(2)) expect(p).toBeGreaterThan(0.44);
    expect(adjustPValues(raw, "holm")[0]).toBeCloseTo(0.0389, 4);
    expect(adjustPValues(raw, "holm")[1]).toBeCloseTo(0.1561, 4);
    expect(adjustPValues(raw, "benjamini-hochberg")[1]).toBeCloseTo(0.0936, 4);
  });
});

describe("a subgroup as a domain", () => {
  it("keeps the standard error that falls by a third when everyone else is deleted first", () => {
    const among: Among = { race: 4, ages: [4] };
    const whole = estimateTargets(nhanes.sample, nhanes.assignment, [{ cells: cellsOf(among) }], [], options).targets[0]!;
    expect(whole.se).toBeCloseTo(0.05038, 5);
    const rows = readTable("nhanes.csv")
      .filter((row) => row["race"] === "4" && row["agecat"] === "4" && row["HI_CHOL"] !== "")
      .map((row): Row => ({
        stratum: row["SDMVSTRA"]!,
        psu: row["SDMVPSU"]!,
        weight: Number(row["WTMEC2YR"]),
        y: Number(row["HI_CHOL"]),
      }));
    const deleted = estimateAll(buildSample(rows, { lonely: "certainty" }));
    expect(deleted.estimate).toBeCloseTo(whole.estimate!, 12);
    expect(deleted.se).toBeCloseTo(0.03499, 5);
    expect(() => estimateAll(buildSample(rows, { lonely: "refuse" }))).toThrow("only one primary sampling unit");
  });
});

describe("the youth risk survey of 2015 (CDC 2016, Software for Analysis of YRBS Data, table 3)", () => {
  const helmet = load(
    "yrbs2015.csv",
    { weight: "weight", strata: "stratum", psu: "psu" },
    { outcome: { variable: "helmet", affected: 1 }, by: [] },
  );
  const actual = estimateTargets(helmet.sample, helmet.assignment, [{ cells: [0] }], [], { ...options, interval: "logit" });
  const { estimate, se, respondents: n, df, low, high } = actual.targets[0]!;

  it("gives the estimate and error of the guide", () => {
    expect(estimate).toBeCloseTo(0.8136225, 8);
    expect(se).toBeCloseTo(0.020089006, 8);
  });

  it("counts degrees of freedom where someone answered, and shows the design's beside", () => {
    expect(actual.designDf).toBe(41);
    expect(df).toBe(39);
    expect(low).toBeCloseTo(0.769548, 6);
    expect(high).toBeCloseTo(0.850901, 6);
    const asDesign = intervalFor("logit", { estimate, se, n, df: 41, level: 95, isBinary: true });
    expect(asDesign.low).toBeCloseTo(0.76962211, 7);
    expect(asDesign.high).toBeCloseTo(0.8508478, 7);
  });
});
