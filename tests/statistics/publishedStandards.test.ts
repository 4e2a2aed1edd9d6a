import { describe, expect, it } from "vitest";
import { reliabilityOfShare } from "../../server/statistics/reliability.ts";
import { standardise } from "../../server/statistics/standardise.ts";
import { STANDARDS } from "../../shared/standards.ts";
import { weightsForBands } from "../../server/statistics/standards.ts";
import { buildSample, type Row } from "./support/buildSample.ts";
import { expectClose } from "./support/close.ts";
import { load, options } from "./support/published.ts";

const standard = (id: string) => STANDARDS.find((one) => one.id === id)!;
const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

describe("published standard populations", () => {
  it("have as many groups as their sources print, and their printed totals", () => {
    const totals = STANDARDS.map(({ id, bands }) => [id, bands.length, sum(bands.map(({ weight }) => weight))] as const);
    expect(totals.map(([id, count, total]) => [id, count, Number(total.toFixed(6))])).toEqual([
      // The World Health Organization's printed percentages sum to 100.03.
      ["who-2000-2025", 18, 100.03],
      ["europe-2013", 19, 100_000],
      ["us-2000", 11, 1],
      ["us-2000-adults-5", 5, 1],
      ["us-2000-adults-3", 3, 195_850],
    ]);
  });

  it("have bands that follow one another without a gap, the last open", () => {
    for (const { bands } of STANDARDS) {
      bands.slice(1).forEach(({ from }, index) => expect(bands[index]!.to).toBe(from - 1));
      expect(bands.at(-1)!.to).toBeNull();
    }
  });

  it("give a survey's bands their shares, normalised", () => {
    // Klein & Schoenborn's adult shares as the examination survey uses them.
    const adults = [
      { from: 20, to: 39 },
      { from: 40, to: 59 },
      { from: 60, to: null },
    ];
    const { weights } = weightsForBands(standard("us-2000-adults-3"), adults)!;
    [0.396579, 0.371795, 0.231626].forEach((share, band) => expect(weights[band]).toBeCloseTo(share, 6));
    const world = weightsForBands(standard("who-2000-2025"), [
      { from: 15, to: 24 },
      { from: 25, to: 84 },
      { from: 85, to: null },
    ])!;
    expect(sum(world.weights)).toBeCloseTo(1, 14);
    expectClose(
      world.weights[0],
      (8.47 + 8.22) / (8.47 + 8.22 + 7.93 + 7.61 + 7.15 + 6.59 + 6.04 + 5.37 + 4.55 + 3.72 + 2.96 + 2.21 + 1.52 + 0.91 + 0.63),
      1e-12,
      "15–24",
    );
  });

  it("have no weight for a band that cuts one of theirs", () => {
    expect(weightsForBands(standard("europe-2013"), [{ from: 18, to: null }])).toBeNull();
    expect(
      weightsForBands(standard("europe-2013"), [
        { from: 85, to: 89 },
        { from: 90, to: 94 },
      ]),
    ).toBeNull();
    expect(weightsForBands(standard("us-2000-adults-3"), [{ from: 0, to: 19 }])).toBeNull();
  });
});

/** Counts and populations as a sample of one row a cell: what standardises is the arithmetic alone. */
function ratesOf(groups: { cases: number[]; people: number[] }[], weights: number[]) {
  const bands = weights.length;
  const rows = groups.flatMap(({ cases, people }, group) =>
    people.map((weight, band): Row => ({ weight, y: cases[band]! / weight, cell: group * bands + band })),
  );
  const { sample, assignment } = buildSample(rows, { isBinary: false });
  const cells = groups.map((_, group) => weights.map((__, band) => ({ cells: [group * bands + band] })));
  return standardise(sample, assignment, cells, weights, [], { ...options, isBinary: false }).groups.map(
    ({ estimate }) => 1e5 * estimate!,
  );
}

describe("directly standardised rates", () => {
  // Fay MP, Feuer EJ. Statistics in Medicine 1997; 16: 791-801, Table 1: Down syndrome by birth order, mother's age bands.
  const births = [
    { people: [230061, 329449, 114920, 39487, 14208, 3052], cases: [107, 141, 60, 40, 39, 25] },
    { people: [72202, 326701, 208667, 83228, 28466, 5375], cases: [25, 150, 110, 84, 82, 39] },
    { people: [15050, 175702, 207081, 117300, 45026, 8660], cases: [3, 71, 114, 103, 108, 75] },
    { people: [2293, 68800, 132424, 98301, 46075, 9834], cases: [1, 26, 64, 89, 137, 96] },
    { people: [327, 30666, 123419, 149919, 104088, 34392], cases: [0, 8, 63, 112, 262, 295] },
  ];
  it("are Fay and Feuer's by birth order", () => {
    const weights = [63986.6, 186263.6, 157302.2, 97647, 47572.6, 12262.6];
    expect(ratesOf(births, weights).map((rate) => rate.toFixed(1))).toEqual(["92.3", "91.2", "85.1", "92.7", "75.5"]);
  });

  it("are Dobson's for the European standard", () => {
    const people = [
      84935, 80367, 72122, 79259, 99806, 87362, 81579, 71103, 70001, 69007, 63203, 52638, 46087, 40887, 32604, 28399, 21625,
      13021, 7355,
    ];
    const cases = [27, 45, 55, 100, 125, 300, 295, 270, 275, 450, 455, 459, 345, 300, 270, 265, 100, 90, 35];
    const weights = standard("europe-2013").bands.map(({ weight }) => weight);
    expect(ratesOf([{ people, cases }], weights)[0]).toBeCloseTo(464.9157, 4);
  });
});

// Carroll MD, Kit BK, Lacher DA. NCHS Data Brief 92, 2012: adults' high cholesterol, age-adjusted, from public-use data.
// Published %, then share, SE, n, deff, df and limits by the steps of Series 2, No. 175.
type Adjusted = [string, { sex?: number; race?: number }, number, number, number, number, number, number, number, number];
const AGE_ADJUSTED: Adjusted[] = [
  ["all", {}, 13.4, 0.133621, 0.00716, 5696, 2.5158, 16, 0.11877, 0.14959],
  ["men", { sex: 1 }, 12.2, 0.121643, 0.008688, 2760, 1.8701, 16, 0.10411, 0.14095],
  ["women", { sex: 2 }, 14.3, 0.143271, 0.007834, 2936, 1.5124, 16, 0.12676, 0.16105],
  ["Hispanic", { race: 1 }, 14.5, 0.145063, 0.006791, 1633, 0.6151, 16, 0.12833, 0.16309],
  ["white", { race: 2 }, 13.5, 0.135392, 0.008327, 2778, 1.5942, 16, 0.11842, 0.15381],
  ["black", { race: 3 }, 10.3, 0.103005, 0.01256, 970, 1.7087, 14, 0.07717, 0.1339],
  ["Hispanic men", { sex: 1, race: 1 }, 15.4, 0.154379, 0.008318, 764, 0.4082, 16, 0.12948, 0.18198],
  ["Hispanic women", { sex: 2, race: 1 }, 13.2, 0.131643, 0.013419, 869, 1.4271, 16, 0.10383, 0.1637],
  ["white men", { sex: 1, race: 2 }, 11.4, 0.114295, 0.010183, 1368, 1.2786, 16, 0.09441, 0.13669],
  ["white women", { sex: 2, race: 2 }, 15.4, 0.154325, 0.008932, 1410, 0.8686, 16, 0.13572, 0.1744],
  ["black men", { sex: 1, race: 3 }, 10.2, 0.102078, 0.013548, 477, 1.012, 13, 0.07387, 0.1365],
  ["black women", { sex: 2, race: 3 }, 10.3, 0.102541, 0.018954, 493, 1.9728, 14, 0.065, 0.15178],
];

describe("NHANES 2009–2010, age-adjusted prevalence of high total cholesterol", () => {
  const nhanes = load(
    "nhanes.csv",
    { weight: "WTMEC2YR", strata: "SDMVSTRA", psu: "SDMVPSU" },
    { outcome: { variable: "HI_CHOL", affected: 1 }, by: ["RIAGENDR", "race", "agecat"] },
  );
  const thousands = standard("us-2000-adults-3").bands.map(({ weight }) => weight);
  const bandsOf = ({ sex, race }: { sex?: number; race?: number }) =>
    [2, 3, 4].map((age) => ({
      cells: nhanes.keys.flatMap((key, cell) =>
        key[2] === age && (sex ?? key[0]) === key[0] && (race ?? key[1]) === key[1] ? [cell] : [],
      ),
    }));
  const groups = AGE_ADJUSTED.map(([, among]) => bandsOf(among));
  const result = standardise(nhanes.sample, nhanes.assignment, groups, thousands, [{ of: 2, from: 1 }], options);

  it.each(AGE_ADJUSTED.map((row, index) => ({ row, index, name: row[0] })))("$name", ({ row, index }) => {
    const [, , published, p, se, n, deff, df, low, high] = row;
    const actual = result.groups[index]!;
    expect((100 * actual.estimate!).toFixed(1)).toBe(published.toFixed(1));
    // One of the printed shares is cut, not rounded, and one error has five places.
    expect(Math.abs(actual.estimate! - p)).toBeLessThan(1e-6);
    expect(actual.se).toBeCloseTo(se, 5);
    expect(actual).toMatchObject({ respondents: n, df });
    expect(actual.deff).toBeCloseTo(deff, 4);
    expect(actual.low).toBeCloseTo(low, 5);
    expect(actual.high).toBeCloseTo(high, 5);
    const evidence = { ...actual, affectedRespondents: null };
    expect(reliabilityOfShare(evidence).verdict).toBe("reliable");
  });

  it("differs between women and men, which without their covariance it would not", () => {
    const [women, men] = [result.groups[2]!, result.groups[1]!];
    const contrast = result.contrasts[0]!;
    expect(contrast.difference).toBeCloseTo(0.021628, 6);
    expect(contrast.se).toBeCloseTo(0.008536, 6);
    expect(contrast.low).toBeCloseTo(0.003532, 6);
    expect(contrast.high).toBeCloseTo(0.039724, 6);
    expect(contrast.p).toBeCloseTo(0.0221, 4);
    // As though independent: .011698, an interval around 0.
    const independent = Math.hypot(women.se!, men.se!);
    expect(independent).toBeCloseTo(0.011698, 6);
    expect(contrast.difference! - 2.12 * independent).toBeLessThan(0);
  });

  it("names the bands without anybody, and gives no figure then", () => {
    const nobody = { cells: nhanes.keys.flatMap((_, cell) => (cell < 0 ? [cell] : [])) };
    const [band] = bandsOf({ sex: 1 });
    const { groups: answer, contrasts } = standardise(
      nhanes.sample,
      nhanes.assignment,
      [[band!, nobody, nobody], bandsOf({})],
      [1, 2, 0],
      [{ of: 0, from: 1 }],
      options,
    );
    expect(answer[0]).toMatchObject({ emptyBands: [1], estimate: null, se: null, low: null, high: null, deff: null });
    expect(contrasts[0]).toMatchObject({ difference: null, se: null });
    // A band of weight 0 is not in use.
    expect(answer[1]).toMatchObject({ emptyBands: [], respondents: 1905 + 1911 });
  });
});
