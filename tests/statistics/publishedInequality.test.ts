import { describe, expect, it } from "vitest";
import { association } from "../../server/statistics/association.ts";
import { attributable } from "../../server/statistics/attributable.ts";
import { inequality } from "../../server/statistics/inequality.ts";
import { buildSample, type Row } from "./support/buildSample.ts";
import { expectClose } from "./support/close.ts";
import { load } from "./support/published.ts";
import { readCases } from "./support/referenceCases.ts";

/** Groups from lowest to highest as one row each. */
function groupsOf(people: number[], outcome: number[]) {
  return buildSample(
    people.map((weight, cell): Row => ({ weight, y: outcome[cell]!, cell })),
    { isBinary: false },
  );
}
const FIVE = [0, 1, 2, 3, 4];

describe("slope and relative index of inequality", () => {
  it("fit the under-five deaths of India's wealth groups", () => {
    // O'Donnell, van Doorslaer, Wagstaff & Lindelow. Analyzing Health Equity Using Household Survey Data. World Bank,
    // 2008, Table 8.1 (inputs quoted from memory; the line through them recomputed).
    const { sample, assignment } = groupsOf([29939, 28776, 26528, 24689, 19739], [154.7, 152.9, 119.5, 86.9, 54.3]);
    const { slopeIndex, relativeIndex, relativeConcentration } = inequality(sample, assignment, FIVE, 95);
    expect(slopeIndex.estimate).toBeCloseTo(-126.19833, 5);
    expect(relativeIndex.estimate).toBeCloseTo(0.30662673, 8);
    expect(relativeConcentration.estimate).toBeCloseTo(-0.16941677, 8);
  });

  it("fit five equal groups", () => {
    const { sample, assignment } = groupsOf([1, 1, 1, 1, 1], [0.31, 0.43, 0.5, 0.61, 0.8]);
    const indexes = inequality(sample, { ...assignment, isBinary: true }, FIVE, 95);
    expect(indexes.slopeIndex.estimate).toBeCloseTo(0.58, 12);
    expect(indexes.relativeIndex.estimate).toBeCloseTo(3.416667, 6);
    expect(indexes.logisticSlopeIndex.estimate).toBeCloseTo(0.550813, 6);
    expect(indexes.logisticRelativeIndex.estimate).toBeCloseTo(3.221087, 6);
    expect(indexes.absoluteConcentration.estimate).toBeCloseTo(0.0928, 12);
    expect(indexes.relativeConcentration.estimate).toBeCloseTo(0.1750943, 7);
    // Handbook on health inequality monitoring (WHO 2013): 27 points and 50.9 % to the best group; here as excess, not lack.
    const { risk, fraction, overall } = attributable(sample, assignment, 4, 95);
    expect(overall).toBeCloseTo(0.53, 12);
    expect(risk.estimate).toBeCloseTo(-0.27, 12);
    expect(fraction.estimate).toBeCloseTo(-0.509434, 6);
  });

  it("has errors by linearisation close to those by replicates, ridits counted in both", () => {
    const query = { outcome: { variable: "smoker", affected: 1 }, by: "education" };
    const design = { weight: "weight", strata: "stratum", psu: "psu" };
    const linear = load("coast.csv", design, query);
    const replicated = load(
      "coast_replicates.csv",
      { weight: "weight", replicates: { pattern: "^jk[0-9]+$", method: "JKn", scale: 1, rscales: jackknifeScales(), mse: true } },
      query,
    );
    const order = linear.keys.map((_, cell) => cell);
    const left = inequality(linear.sample, linear.assignment, order, 95);
    const right = inequality(replicated.sample, replicated.assignment, order, 95);
    expectClose(left.slopeIndex.se, right.slopeIndex.se!, 0.02, "slope index");
    expectClose(left.relativeIndex.se, right.relativeIndex.se!, 0.02, "relative index");
    expect(left.slopeIndex.estimate).not.toBeNull();
  });

  it("has no ratio to a line's end at or below 0, and no slope of one group", () => {
    const { sample, assignment } = groupsOf([1, 1], [0, 1]);
    expect(inequality(sample, assignment, [0, 1], 95).relativeIndex.estimate).toBeNull();
    const one = groupsOf([1], [0.4]);
    expect(inequality(one.sample, one.assignment, [0], 95).slopeIndex).toEqual({
      estimate: null,
      se: null,
      low: null,
      high: null,
    });
  });
});

/** (n_h − 1)/n_h of each jackknife replicate's stratum, as the reference case that uses them lists them. */
function jackknifeScales(): number[] {
  const reference = readCases().find(({ id }) => id === "inequality-education-jkn")!;
  return reference.design.replicates!.rscales as number[];
}

describe("Rao and Scott's test of a whole table", () => {
  const met = { variable: "metTarget", affected: 1 };
  it("is the printed one for NHANES adults by sex and by ethnic group", () => {
    const examination = { weight: "WTMEC2YR", strata: "SDMVSTRA", psu: "SDMVPSU" };
    const query = {
      outcome: { variable: "HI_CHOL", affected: 1 },
      among: { variable: "agecat", between: [2, null] as [number, null] },
    };
    const sexes = load("nhanes.csv", examination, { ...query, by: "RIAGENDR" });
    expect(association(sexes.sample, sexes.assignment)).toMatchObject({
      f: expect.closeTo(6.98575, 5) as number,
      numeratorDf: expect.closeTo(1, 10) as number,
      denominatorDf: expect.closeTo(16, 8) as number,
      p: expect.closeTo(0.01772, 5) as number,
    });
    const races = load("nhanes.csv", examination, { ...query, by: "race" });
    expect(association(races.sample, races.assignment)).toMatchObject({
      f: expect.closeTo(1.56272, 5) as number,
      numeratorDf: expect.closeTo(1.70799, 5) as number,
      denominatorDf: expect.closeTo(27.32787, 4) as number,
      p: expect.closeTo(0.22836, 5) as number,
    });
  });

  it.each([
    ["apistrat.csv", { weight: "pw", strata: "stype", fpc: "fpc" }, 17.24744, 1.828672, 360.248286],
    ["apiclus1.csv", { weight: "pw", psu: "dnum", fpc: "fpc" }, 5.19337, 1.49464, 20.92496],
    ["apiclus2.csv", { weight: "pw", psu: ["dnum", "snum"], fpc: ["fpc1", "fpc2"] }, 11.87275, 1.382499, 53.917454],
  ])("is the printed one for schools by type: %s", (data, design, f, numeratorDf, denominatorDf) => {
    const loaded = load(data, design, { outcome: met, by: "stype" });
    const actual = association(loaded.sample, loaded.assignment)!;
    expect(actual.f).toBeCloseTo(f, 5);
    expect(actual.numeratorDf).toBeCloseTo(numeratorDf, 5);
    expect(actual.denominatorDf).toBeCloseTo(denominatorDf, 5);
  });

  it("has nothing to say of one group, or of an outcome that everyone or nobody has", () => {
    const rows = (y: (index: number) => number, cell: (index: number) => number) =>
      Array.from({ length: 12 }, (_, index): Row => ({ y: y(index), cell: cell(index) }));
    const one = buildSample(
      rows(
        (index) => index % 2,
        () => 0,
      ),
    );
    expect(association(one.sample, one.assignment)).toBeNull();
    const none = buildSample(
      rows(
        () => 0,
        (index) => index % 3,
      ),
    );
    expect(association(none.sample, none.assignment)).toBeNull();
  });

  it("stands when a group has only one outcome", () => {
    const rows = Array.from({ length: 30 }, (_, index): Row => ({ y: index % 3 === 0 ? 0 : index % 2, cell: index % 3 }));
    const { sample, assignment } = buildSample(rows);
    const actual = association(sample, assignment)!;
    expect(actual.f).toBeGreaterThan(0);
    expect(actual.p).toBeLessThan(0.05);
  });
});
