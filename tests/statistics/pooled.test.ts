import { describe, expect, it } from "vitest";
import { DesignError } from "../../server/statistics/errors.ts";
import { estimateTargets } from "../../server/statistics/estimate.ts";
import { poolWaves, shiftCells } from "../../server/statistics/pooled.ts";
import { trend } from "../../server/statistics/trend.ts";
import { buildSample, type BuildOptions, type Row } from "./support/buildSample.ts";
import { expectClose } from "./support/close.ts";
import { estimateAll, load, options } from "./support/published.ts";

/** A wave of 2 strata of 3 PSUs of 4, its outcomes and weights made from a number. */
function waveOf(seed: number, build: BuildOptions = {}) {
  const rows = Array.from({ length: 24 }, (_, index): Row => ({
    stratum: Math.floor(index / 12),
    psu: Math.floor(index / 4) % 3,
    weight: 1 + ((index * 7 + seed * 3) % 11),
    y: (index * index + seed) % 3 === 0 ? 1 : 0,
    cell: 0,
  }));
  return buildSample(rows, build);
}

describe("waves pooled as one sample", () => {
  const waves = [waveOf(1), waveOf(2), waveOf(5)];

  it("with weights divided by their number describe the average wave", () => {
    const pooled = poolWaves(waves.map((wave) => ({ ...wave, factor: 1 / 3 })));
    const people = waves.map((wave) => estimateAll(wave).people);
    const actual = estimateAll(pooled);
    expectClose(actual.people, people.reduce((sum, value) => sum + value, 0) / 3, 1e-12, "people");
    expect(actual).toMatchObject({ respondents: 72, psus: 18, strata: 6, df: 12 });
    const squares = waves.map((wave) => estimateAll(wave).affectedPeopleSe! ** 2);
    expectClose(
      actual.affectedPeopleSe,
      Math.sqrt(squares.reduce((sum, value) => sum + value, 0)) / 3,
      1e-12,
      "error of a total",
    );
  });

  it("side by side are independent: errors of differences add in squares, degrees of freedom too", () => {
    const apart = waves.map(({ sample, assignment }, index) => ({
      sample,
      assignment: shiftCells(assignment, index),
      factor: 1,
    }));
    const { sample, assignment } = poolWaves(apart);
    expect(assignment.cells).toBe(3);
    const targets = [0, 1, 2].map((cell) => ({ cells: [cell] }));
    const result = estimateTargets(sample, assignment, targets, [{ of: 2, from: 0 }], options);
    const [first, , last] = waves.map((wave) => estimateAll(wave));
    expectClose(result.targets[2]!.se, last!.se!, 1e-12, "a wave's own error");
    expectClose(result.contrasts[0]!.se, Math.hypot(first!.se!, last!.se!), 1e-10, "error of the difference");
    expectClose(result.contrasts[0]!.covariance, 0, 1e-12, "covariance", last!.se! ** 2);
    expect(result.contrasts[0]!.df).toBe(first!.df + last!.df);
  });

  it("give a trend over their years", () => {
    const apart = waves.map(({ sample, assignment }, index) => ({
      sample,
      assignment: shiftCells(assignment, index),
      factor: 1,
    }));
    const { sample, assignment } = poolWaves([apart[0]!, apart[2]!]);
    const line = trend(sample, assignment, [{ cells: [0] }, { cells: [2] }], [2021, 2025], { link: "linear", level: 95 });
    const [first, , last] = waves.map((wave) => estimateAll(wave));
    expectClose(line.slope, (last!.estimate! - first!.estimate!) / 4, 1e-10, "slope");
    expectClose(line.slopeSe, Math.hypot(first!.se!, last!.se!) / 4, 1e-10, "its error");
    expect(line.df).toBe(8);
  });

  it("with sizes of the population keep them, and their second stage", () => {
    const schools = load(
      "apiclus2.csv",
      { weight: "pw", psu: ["dnum", "snum"], fpc: ["fpc1", "fpc2"] },
      { outcome: { variable: "metTarget", affected: 1 }, by: [] },
    );
    const pooled = poolWaves([schools, schools].map((wave) => ({ ...wave, factor: 0.5 })));
    expectClose(estimateAll(pooled).se, estimateAll(schools).se! / Math.SQRT2, 1e-10, "two waves alike");
    expectClose(estimateAll(pooled).people, estimateAll(schools).people, 1e-12, "people");
  });
});

describe("waves with replicate weights", () => {
  const replicate = (mse: boolean) => {
    const plain = waveOf(3);
    const weights = [0.5, 1.5].map((factor) =>
      plain.sample.weight.map((weight, row) => weight * (row % 2 === 0 ? factor : 2 - factor)),
    );
    const replicates = { weights, scale: 0.5, replicateScales: new Float64Array(2).fill(1), mse, degreesOfFreedom: 1 };
    return { ...plain, sample: { ...plain.sample, replicates } };
  };
  it("vary one after another", () => {
    const wave = replicate(true);
    const pooled = poolWaves([wave, wave].map((one) => ({ ...one, factor: 1 })));
    expect(pooled.sample.replicates).toMatchObject({ degreesOfFreedom: 2, scale: 1 });
    expectClose(
      estimateAll(pooled).affectedPeopleSe,
      estimateAll(wave).affectedPeopleSe! * Math.SQRT2,
      1e-12,
      "error of a total",
    );
  });
  it("cannot be pooled with others, nor about their own mean, nor where lonely strata count differently", () => {
    const both = (left: ReturnType<typeof waveOf>, right: ReturnType<typeof waveOf>) => () =>
      poolWaves([left, right].map((one) => ({ ...one, factor: 1 })));
    expect(both({ ...replicate(true), order: [] }, waveOf(1))).toThrow(DesignError);
    expect(both({ ...replicate(false), order: [] }, { ...replicate(false), order: [] })).toThrow("cannot be pooled");
    expect(both(waveOf(1), waveOf(2, { lonely: "certainty" }))).toThrow("differently");
  });
});
