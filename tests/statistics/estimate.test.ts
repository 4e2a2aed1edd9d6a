import { describe, expect, it } from "vitest";
import { DesignError } from "../../server/statistics/errors.ts";
import { estimateTargets } from "../../server/statistics/estimate.ts";
import { buildSample, type BuildOptions, type Row } from "./support/buildSample.ts";

/** "A1:110 A2:10": stratum, PSU, outcomes; every weight 1. */
function rowsOf(text: string): Row[] {
  return text.split(" ").flatMap((part) => {
    const [place, outcomes] = part.split(":");
    return outcomes!.split("").map((y): Row => ({ stratum: place![0]!, psu: place![1]!, y: Number(y), cell: 0 }));
  });
}

function estimateRows(rows: readonly Row[], build: BuildOptions = {}) {
  const { sample, assignment } = buildSample(rows, { cells: 2, ...build });
  const targets = [{ cells: [0] }, { cells: [1] }];
  const { isBinary } = assignment;
  return estimateTargets(sample, assignment, targets, [{ of: 0, from: 1 }], {
    level: 95,
    interval: "korn-graubard",
    difference: "linear",
    isBinary,
  });
}
const first = (rows: readonly Row[], build?: BuildOptions) => estimateRows(rows, build).targets[0]!;

describe("a cell by hand", () => {
  it("equals the calculation for two strata of two PSUs", () => {
    // Scores: A1 1/8 · 2 · ½, A2 0, B1 −1/8, B2 0, so each stratum adds 2 · 2 · (1/16)² = 1/64.
    const actual = first(rowsOf("A1:11 A2:10 B1:00 B2:01"));
    expect(actual).toMatchObject({ estimate: 0.5, respondents: 8, affectedRespondents: 4, psus: 4, strata: 2, df: 2, people: 8 });
    expect(actual.se).toBeCloseTo(Math.sqrt(1 / 32), 15);
  });

  it("counts PSUs of the whole design in the variance, and those with respondents in the degrees of freedom", () => {
    const rows = [...rowsOf("A1:10 A2:11 B1:0 B2:1"), ...rowsOf("A3:11 C1:1 C2:0").map((row) => ({ ...row, cell: 1 }))];
    const actual = first(rows);
    expect(actual).toMatchObject({ psus: 4, strata: 2, df: 2, respondents: 6 });
    // p = 4/6; scores A: −1/18, 1/9, 0 (A3 without respondents), mean 1/54; B: −1/9, 1/18, mean −1/36.
    const a = (3 / 2) * ((-1 / 18 - 1 / 54) ** 2 + (1 / 9 - 1 / 54) ** 2 + (1 / 54) ** 2);
    const b = 2 * 2 * (1 / 12) ** 2;
    expect(actual.se).toBeCloseTo(Math.sqrt(a + b), 15);
  });

  it("respondents of weight 0 keep their PSU in the design and are in no cell", () => {
    const rows = [...rowsOf("A1:10 A2:11 B1:0 B2:1"), { stratum: "A", psu: "3", y: 1, cell: 0, weight: 0 }];
    expect(first(rows)).toMatchObject({ respondents: 6, psus: 4, df: 2 });
    expect(first(rows).se).not.toBeCloseTo(first(rowsOf("A1:10 A2:11 B1:0 B2:1")).se!, 6);
  });
});

describe("cells at the edge", () => {
  it("an empty cell has no figures, and nothing is compared with it", () => {
    const { targets, contrasts } = estimateRows(rowsOf("A1:11 A2:10"));
    expect(targets[1]).toMatchObject({ respondents: 0, people: 0, estimate: null, se: null, low: null, high: null, deff: null });
    expect(contrasts[0]).toMatchObject({ difference: null, se: null, p: null, ratio: null });
  });

  it("one respondent has an estimate but no interval", () => {
    expect(first([{ y: 3.5, cell: 0 }], { isBinary: false })).toMatchObject({ estimate: 3.5, df: 0, low: null, high: null });
  });

  it("nobody or everybody affected: no error, and the one-sided exact limit", () => {
    const none = first(rowsOf("A1:00000 A2:00000 B1:00000 B2:00000"));
    expect(none).toMatchObject({ estimate: 0, se: 0, low: 0, effectiveRespondents: 20, deff: null });
    // Clopper–Pearson at 0 of 20: 1 − 0.025^(1/20).
    expect(none.high).toBeCloseTo(1 - 0.025 ** (1 / 20), 12);
    const all = first(rowsOf("A1:11111 A2:11111 B1:11111 B2:11111"));
    expect(all).toMatchObject({ estimate: 1, se: 0, high: 1, low: expect.closeTo(0.025 ** (1 / 20), 12) as number });
  });

  it("a ratio to 0 does not exist, the difference does", () => {
    const zero = rowsOf("A1:000 A2:000").map((row) => ({ ...row, cell: 1 }));
    const [contrast] = estimateRows([...rowsOf("A1:11 A2:10"), ...zero]).contrasts;
    expect(contrast).toMatchObject({ difference: 0.75, reference: 0, ratio: null, ratioLow: null, oddsRatio: null });
    expect(contrast!.se).toBeGreaterThan(0);
  });

  it("everyone compared with themselves differs by nothing", () => {
    const { sample, assignment } = buildSample(rowsOf("A1:11 A2:10 B1:00 B2:01"));
    const options = { level: 95, interval: "linear", difference: "linear", isBinary: true } as const;
    const [contrast] = estimateTargets(
      sample,
      assignment,
      [{ cells: [0] }, { cells: [0] }],
      [{ of: 0, from: 1 }],
      options,
    ).contrasts;
    expect(contrast).toMatchObject({ difference: 0, se: 0, p: null });
  });

  it("a fixed value is compared with, without an error of its own", () => {
    const { sample, assignment } = buildSample(rowsOf("A1:11 A2:10 B1:00 B2:01"));
    const options = { level: 95, interval: "linear", difference: "linear", isBinary: true } as const;
    const result = estimateTargets(sample, assignment, [{ cells: [0] }], [{ of: 0, from: { fixed: 0.2 } }], options);
    expect(result.contrasts[0]).toMatchObject({ reference: 0.2, covariance: 0, df: 2 });
    expect(result.contrasts[0]!.difference).toBeCloseTo(0.3, 15);
    expect(result.contrasts[0]!.se).toBe(result.targets[0]!.se);
  });
});

describe("strata with one PSU", () => {
  const lone = rowsOf("A1:11 A2:10 B1:01 B2:00 C1:111");
  it("are refused where the design says so, rather than understate the error", () => {
    expect(() => first(lone, { lonely: "refuse" })).toThrow(DesignError);
    expect(() => first(lone, { lonely: "refuse" })).toThrow("Stratum number 3");
  });

  it("add nothing as certainties, their distance from the centre when centred, the others' average when averaged", () => {
    // p = 7/11. Scores: A 4/11·2, 1 − 14/11 → by hand in elevenths of 1/11.
    const score = (affected: number, n: number) => (affected - (7 / 11) * n) / 11;
    const pair = (left: number, right: number) => (left - right) ** 2;
    const others = pair(score(2, 2), score(1, 2)) + pair(score(1, 2), score(0, 2));
    expect(first(lone, { lonely: "certainty" }).se).toBeCloseTo(Math.sqrt(others), 14);
    expect(first(lone, { lonely: "centred" }).se).toBeCloseTo(Math.sqrt(others + score(3, 3) ** 2), 14);
    expect(first(lone, { lonely: "average" }).se).toBeCloseTo(Math.sqrt((others * 3) / 2), 14);
  });
});

describe("bad numbers", () => {
  it.each([-1, NaN, Infinity])("a weight of %d is refused", (weight) => {
    expect(() => first([...rowsOf("A1:11 A2:10"), { stratum: "A", psu: "1", y: 1, cell: 0, weight }])).toThrow(DesignError);
  });

  it("a population smaller than its sample is refused", () => {
    const rows = rowsOf("A1:11 A2:10").map((row) => ({ ...row, stratumPopulation: 1 }));
    expect(() => first(rows)).toThrow("has 2 units in the sample but 1 in its population");
  });
});
