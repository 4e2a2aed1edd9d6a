import { describe, expect, it } from "vitest";
import { estimateTargets } from "../../server/statistics/estimate.ts";
import { buildSample, type Row } from "./support/buildSample.ts";
import { estimateAll, load, options } from "./support/published.ts";
import { readTable, type ReferenceCase } from "./support/referenceCases.ts";

// The two-strata example of a general statistics package's survey manual: eight rows, sizes 15 and 12.
describe("two strata with and without population sizes", () => {
  const values: [number, number, number][] = [
    [1, 15, 2.8],
    [1, 15, 4.1],
    [1, 15, 6.8],
    [1, 15, 6.8],
    [1, 15, 9.2],
    [2, 12, 3.7],
    [2, 12, 6.6],
    [2, 12, 4.2],
  ];
  const build = (hasPopulation: boolean) =>
    buildSample(
      values.map(([stratum, size, y]): Row => ({
        stratum,
        weight: stratum === 1 ? 3 : 4,
        y,
        ...(hasPopulation ? { stratumPopulation: size } : {}),
      })),
      { isBinary: false },
    );
  it("gives .74127 without, .61604 with, and the total's error", () => {
    const without = estimateAll(build(false));
    expect(without.estimate).toBeCloseTo(5.448148, 6);
    expect(without.se).toBeCloseTo(0.74127, 5);
    const withSizes = estimateAll(build(true));
    expect(withSizes.se).toBeCloseTo(0.61604, 5);
    expect(without.affectedPeople).toBeCloseTo(147.1, 6);
    expect(without.affectedPeopleSe).toBeCloseTo(20.01424, 5);
  });
});

// Californian schools that met their growth target, and the mean performance index (R survey's api data).
describe("samples of schools", () => {
  const met = { variable: "metTarget", affected: 1 };
  const designs: [string, ReferenceCase["design"], number, [number, number], [number, number], [number, number]][] = [
    [
      "apistrat.csv",
      { weight: "pw", strata: "stype", fpc: "fpc" },
      197,
      [0.827948, 0.02434478],
      [0.7745397, 0.8708149],
      [662.287363, 9.408941],
    ],
    [
      "apiclus1.csv",
      { weight: "pw", psu: "dnum", fpc: "fpc" },
      14,
      [0.874317, 0.02035948],
      [0.8237989, 0.9119001],
      [644.1694, 23.54224],
    ],
    [
      "apiclus2.csv",
      { weight: "pw", psu: ["dnum", "snum"], fpc: ["fpc1", "fpc2"] },
      39,
      [0.751292, 0.06639499],
      [0.5955079, 0.8610744],
      [670.81181, 30.09903],
    ],
  ];
  it.each(designs)("%s", (data, design, df, [p, pSe], [low, high], [mean, meanSe]) => {
    const share = load(data, design, { outcome: met, by: [] });
    const logit = estimateTargets(share.sample, share.assignment, [{ cells: [0] }], [], { ...options, interval: "logit" });
    expect(logit.targets[0]!.df).toBe(df);
    expect(logit.targets[0]!.estimate).toBeCloseTo(p, 6);
    expect(logit.targets[0]!.se).toBeCloseTo(pSe, 8);
    expect(logit.targets[0]!.low).toBeCloseTo(low, 6);
    expect(logit.targets[0]!.high).toBeCloseTo(high, 6);
    const index = estimateAll(load(data, design, { outcome: { variable: "api00" }, by: [] }));
    expect(index.estimate).toBeCloseTo(mean, 5);
    expect(index.se).toBeCloseTo(meanSe, 5);
  });

  it("by type of school: high less elementary", () => {
    const loaded = load("apistrat.csv", designs[0]![1], { outcome: met, by: "stype" });
    const at = (name: string) => loaded.keys.findIndex(([key]) => key === name);
    const targets = ["E", "H", "M"].map((name) => ({ cells: [at(name)] }));
    const result = estimateTargets(loaded.sample, loaded.assignment, targets, [{ of: 1, from: 0 }], options);
    expect(result.targets.map(({ se }) => se!.toFixed(8))).toEqual(["0.02843520", "0.06896763", "0.06383743"]);
    expect(result.contrasts[0]!.difference).toBeCloseTo(-0.39, 10);
    expect(result.contrasts[0]!.se).toBeCloseTo(0.07459956, 8);
  });
});

// Levy PS, Lemeshow S. Sampling of Populations: survival of cardiac arrest, three strata of two ambulance units.
describe("cardiac-arrest survival as a ratio of two counts", () => {
  const table = readTable("scd.csv");
  const rows = (population?: number) =>
    table.map((row): Row => ({
      stratum: row["ESA"]!,
      weight: Number(row["arrests"]),
      y: Number(row["alive"]) / Number(row["arrests"]),
      ...(population === undefined ? {} : { stratumPopulation: population }),
    }));
  it("has the book's linearised errors, without and with five units a stratum", () => {
    const plain = estimateAll(buildSample(rows(), { isBinary: false }));
    expect(plain.estimate).toBeCloseTo(0.15350635, 8);
    expect(plain.se).toBeCloseTo(0.0098073036, 10);
    expect(estimateAll(buildSample(rows(5), { isBinary: false })).se).toBeCloseTo(0.0075967047, 10);
  });
  it("has the book's error by four half-samples", () => {
    const halves = table.map((row, index): Row => ({
      ...rows()[index]!,
      replicates: [1, 2, 3, 4].map((r) => Number(row["arrests"]) * Number(row[`brr${r}`])),
    }));
    const replicates = { scale: 0.25, replicateScales: new Float64Array(4).fill(1), mse: false, degreesOfFreedom: 3 };
    expect(estimateAll(buildSample(halves, { isBinary: false, replicates })).se).toBeCloseTo(0.0094184007, 9);
  });
});
