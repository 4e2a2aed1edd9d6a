import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { adjust, type Covariate } from "../../server/statistics/adjusted.ts";
import { DesignError, SeparationError, SingularFitError } from "../../server/statistics/errors.ts";
import { estimateTargets } from "../../server/statistics/estimate.ts";
import { estimateQuantiles } from "../../server/statistics/quantiles.ts";
import { standardise } from "../../server/statistics/standardise.ts";
import { trend } from "../../server/statistics/trend.ts";
import type { Assignment, Sample } from "../../server/statistics/types.ts";
import { buildSample, type Row } from "./support/buildSample.ts";
import { expectClose } from "./support/close.ts";
import { load, options } from "./support/published.ts";
import type { ReferenceCase } from "./support/referenceCases.ts";

const LINEAR = { ...options, interval: "linear" } as const;
const twoCells = [{ cells: [0] }, { cells: [1] }];

/** An irregular sample: 3 strata of 3 PSUs, two groups in each, unequal weights. */
const anyRows = fc
  .array(fc.record({ y: fc.integer({ min: -40, max: 40 }), weight: fc.integer({ min: 1, max: 900 }), size: fc.nat(1) }), {
    minLength: 36,
    maxLength: 60,
  })
  .map((draws) =>
    draws.map(({ y, weight }, index): Row => ({
      y,
      weight,
      stratum: index % 3,
      psu: Math.floor(index / 3) % 3,
      cell: Math.floor(index / 9) % 2,
    })),
  );

const asShares = (rows: readonly Row[]) => rows.map((row): Row => ({ ...row, y: row.y! > 5 ? 1 : 0 }));

describe("a trend", () => {
  it("over 0 and 1 is the difference of the two means, with its error, and starts from the first", () => {
    fc.assert(
      fc.property(anyRows, (rows) => {
        const { sample, assignment } = buildSample(rows, { isBinary: false });
        const line = trend(sample, assignment, twoCells, [0, 1], { link: "linear", level: 95 });
        const { targets, contrasts } = estimateTargets(sample, assignment, twoCells, [{ of: 1, from: 0 }], {
          ...LINEAR,
          isBinary: false,
        });
        expectClose(line.intercept, targets[0]!.estimate!, 1e-11, "intercept", 1);
        expectClose(line.slope, contrasts[0]!.difference!, 1e-11, "slope", 1);
        expectClose(line.slopeSe, contrasts[0]!.se!, 1e-10, "its error");
        expectClose(line.low, contrasts[0]!.low!, 1e-9, "limit", 1);
        expect(line.df).toBe(contrasts[0]!.df);
      }),
      { seed: 11 },
    );
  });

  it("on log odds over 0 and 1 is the log odds ratio, with its error", () => {
    const rows = asShares(fc.sample(anyRows, { numRuns: 1, seed: 7 })[0]!);
    const { sample, assignment } = buildSample(rows);
    const line = trend(sample, assignment, twoCells, [0, 1], { link: "logistic", level: 95 });
    const [contrast] = estimateTargets(sample, assignment, twoCells, [{ of: 1, from: 0 }], LINEAR).contrasts;
    expectClose(Math.exp(line.slope), contrast!.oddsRatio!, 1e-9, "odds ratio");
    expectClose(line.slopeSe, contrast!.logOddsRatioSe!, 1e-9, "its error");
  });

  it("over years is the same line counted from another year", () => {
    const rows = fc.sample(anyRows, { numRuns: 1, seed: 3 })[0]!;
    const { sample, assignment } = buildSample(rows, { isBinary: false });
    const near = trend(sample, assignment, twoCells, [0, 2], { link: "linear", level: 95 });
    const far = trend(sample, assignment, twoCells, [2021, 2023], { link: "linear", level: 95 });
    expectClose(far.slope, near.slope, 1e-11, "slope");
    expectClose(far.slopeSe, near.slopeSe!, 1e-11, "error");
    expectClose(far.intercept + 2021 * far.slope, near.intercept, 1e-8, "level in 2021", 1);
  });

  it("of a single group does not exist, nor one that the scores predict perfectly", () => {
    const rows = [0, 0, 1, 1].map((y, index): Row => ({ y, cell: y, psu: index }));
    const { sample, assignment } = buildSample(rows);
    expect(() => trend(sample, assignment, [{ cells: [0] }], [1], { link: "linear", level: 95 })).toThrow(SingularFitError);
    expect(() => trend(sample, assignment, twoCells, [0, 1], { link: "logistic", level: 95 })).toThrow(SeparationError);
  });
});

describe("adjusted shares", () => {
  const rows = asShares(fc.sample(anyRows, { numRuns: 1, seed: 21 })[0]!);
  const { sample, assignment } = buildSample(rows);
  const constant: Covariate = { codes: new Int32Array(rows.length), levels: 1 };

  it("without anything to adjust for are the crude ones, errors too", () => {
    const crude = estimateTargets(sample, assignment, twoCells, [{ of: 1, from: 0 }], LINEAR);
    const model = adjust(sample, assignment, [constant], [{ of: 1, from: 0 }], LINEAR);
    crude.targets.forEach((target, group) => {
      expectClose(model.groups[group]!.estimate, target.estimate!, 1e-9, "share");
      expectClose(model.groups[group]!.se, target.se!, 1e-9, "error");
    });
    expectClose(model.contrasts[0]!.difference, crude.contrasts[0]!.difference!, 1e-8, "difference");
    expectClose(model.contrasts[0]!.se, crude.contrasts[0]!.se!, 1e-9, "its error");
    expectClose(model.contrasts[0]!.oddsRatio, crude.contrasts[0]!.oddsRatio!, 1e-8, "odds ratio");
  });

  it("of a number use a linear model, in which a balanced covariate changes no difference", () => {
    const balanced = [0, 1].flatMap((cell) =>
      [0, 1].flatMap((level) =>
        [1, 2, 4].map((value, psu) => ({
          row: { cell, psu: `${cell}${level}${psu}`, y: value * (1 + cell) + 10 * level },
          level,
        })),
      ),
    );
    const built = buildSample(
      balanced.map(({ row }): Row => row),
      { isBinary: false },
    );
    const codes = Int32Array.from(built.order, (index) => balanced[index]!.level);
    const model = adjust(built.sample, built.assignment, [{ codes, levels: 2 }], [{ of: 1, from: 0 }], {
      ...LINEAR,
      isBinary: false,
    });
    expectClose(model.contrasts[0]!.difference, 7 / 3, 1e-10, "difference");
    expectClose(model.groups[0]!.estimate, 7 / 3 + 5, 1e-10, "margin");
  });

  it("leave out those with a covariate missing, but not their PSUs", () => {
    const codes = Int32Array.from(rows, (_, row) => (row % 5 === 0 ? -1 : row % 2));
    const model = adjust(sample, assignment, [{ codes, levels: 2 }], [], LINEAR);
    expect(model.respondents).toBe(rows.length - Math.ceil(rows.length / 5));
    expect(model.groups.every(({ se }) => se !== null && se > 0)).toBe(true);
  });

  it("are refused by name where a level has only one outcome", () => {
    const codes = Int32Array.from(assignment.outcome, (y, row) => (y === 1 && row % 2 === 0 ? 1 : 0));
    expect(() => adjust(sample, assignment, [{ codes, levels: 2 }], [], LINEAR)).toThrow(SeparationError);
  });

  it("are refused by name where a covariate repeats the groups, or nobody is left", () => {
    const same: Covariate = { codes: assignment.cell.slice(), levels: 2 };
    expect(() => adjust(sample, assignment, [same], [], LINEAR)).toThrow(SingularFitError);
    const missing: Covariate = { codes: new Int32Array(rows.length).fill(-1), levels: 2 };
    expect(() => adjust(sample, assignment, [missing], [], LINEAR)).toThrow(SingularFitError);
  });

  it("have no figure for a group that nobody with known covariates is in", () => {
    const wider: Assignment = { ...assignment, cells: 3 };
    const model = adjust(sample, wider, [constant], [{ of: 2, from: 0 }], LINEAR);
    expect(model.groups[2]).toMatchObject({ respondents: 0, estimate: null, se: null });
    expect(model.contrasts[0]).toMatchObject({ difference: null, se: null });
  });

  it("have errors by replicates close to the linearised ones", () => {
    const query = { outcome: { variable: "smoker", affected: 1 }, by: "sex" };
    const linear = load("coast.csv", { weight: "weight", strata: "stratum", psu: "psu" }, query);
    const jackknife = load(
      "coast_replicates.csv",
      { weight: "weight", replicates: { pattern: "^jk[0-9]+$", method: "JKn", scale: 1, rscales: 0.7, mse: true } },
      query,
    );
    const education = (loaded: typeof linear): Covariate => ({
      codes: Int32Array.from(loaded.column("education"), (code) => (code === null ? -1 : code - 1)),
      levels: 4,
    });
    const left = adjust(linear.sample, linear.assignment, [education(linear)], [{ of: 1, from: 0 }], LINEAR);
    const right = adjust(jackknife.sample, jackknife.assignment, [education(jackknife)], [{ of: 1, from: 0 }], LINEAR);
    expectClose(right.groups[0]!.estimate, left.groups[0]!.estimate!, 1e-9, "margin");
    expectClose(right.contrasts[0]!.se, left.contrasts[0]!.se!, 0.05, "error of the difference");
  });
});

describe("standardised shares", () => {
  it("of one band are the crude ones; of groups as unions of cells too", () => {
    const rows = asShares(fc.sample(anyRows, { numRuns: 1, seed: 5 })[0]!);
    const { sample, assignment } = buildSample(rows);
    const both = { cells: [0, 1] };
    const crude = estimateTargets(sample, assignment, [both, ...twoCells], [{ of: 0, from: 1 }], LINEAR);
    const groups = [[both], [twoCells[0]!], [twoCells[1]!]];
    const result = standardise(
      sample,
      assignment,
      groups,
      [3],
      [
        { of: 0, from: 1 },
        { of: 2, from: { fixed: 0.5 } },
      ],
      LINEAR,
    );
    crude.targets.forEach((target, group) => {
      const actual = result.groups[group]!;
      expectClose(actual.estimate, target.estimate!, 1e-12, "share");
      expectClose(actual.se, target.se!, 1e-11, "error");
      expectClose(actual.deff, target.deff!, 1e-10, "design effect");
      expectClose(actual.effectiveBeforeAdjustment, target.effectiveBeforeAdjustment!, 1e-10, "effective size");
    });
    expectClose(result.contrasts[0]!.se, crude.contrasts[0]!.se!, 1e-10, "error of the difference");
    expectClose(result.contrasts[0]!.moverLow, crude.contrasts[0]!.moverLow!, 1e-9, "other limit");
    expect(result.contrasts[1]!.se).toBe(result.groups[2]!.se);
  });
});

describe("a function of cells", () => {
  const smoker = { variable: "smoker", affected: 1 };
  const met = { variable: "metTarget", affected: 1 };
  const lonely = { weight: "weight", strata: "stratum", psu: "psu" };
  const designs: [string, string, ReferenceCase["design"], ReferenceCase["query"]][] = [
    ["lonely strata centred", "coast_lonely.csv", { ...lonely, lonely: "centred" }, { outcome: smoker, by: "sex" }],
    ["lonely strata certain", "coast_lonely.csv", { ...lonely, lonely: "certainty" }, { outcome: smoker, by: "sex" }],
    ["lonely strata averaged", "coast_lonely.csv", { ...lonely, lonely: "average" }, { outcome: smoker, by: "sex" }],
    ["two stages", "apiclus2.csv", { weight: "pw", psu: ["dnum", "snum"], fpc: ["fpc1", "fpc2"] }, { outcome: met, by: "stype" }],
    [
      "replicates about their mean",
      "coast_replicates.csv",
      { weight: "weight", replicates: { pattern: "^jk[0-9]+$", method: "JKn", scale: 1, rscales: 0.7, mse: false } },
      { outcome: smoker, by: "sex" },
    ],
  ];
  it.each(designs)("varies as estimates do under every design: %s", (_, data, design, query) => {
    const { sample, assignment } = load(data, design, query);
    const targets = [{ cells: [0] }, { cells: [1] }, { cells: [0, 1] }];
    const request = [{ of: 0, from: 2 }];
    const crude = estimateTargets(sample, assignment, targets, request, LINEAR);
    const result = standardise(
      sample,
      assignment,
      targets.map((target) => [target]),
      [1],
      request,
      LINEAR,
    );
    crude.targets.forEach((target, index) => {
      expectClose(result.groups[index]!.se, target.se!, 1e-10, `error ${index}`);
      expect(result.groups[index]!.df).toBe(target.df);
    });
    const [expected] = crude.contrasts;
    const [contrast] = result.contrasts;
    expectClose(contrast!.se, expected!.se!, 1e-9, "error of the difference");
    expectClose(contrast!.covariance, expected!.covariance!, 1e-9, "covariance");
    expectClose(contrast!.logRatioSe, expected!.logRatioSe!, 1e-9, "error of the log ratio");
    expectClose(contrast!.logOddsRatioSe, expected!.logOddsRatioSe!, 1e-9, "error of the log odds ratio");
    expect(contrast!.df).toBe(expected!.df);
  });
});

describe("quantiles", () => {
  const quantilesOf = (values: number[], weights: number[], q: number[], lonely: Sample["lonely"] = "centred") => {
    const { sample, assignment } = buildSample(
      values.map((y, index): Row => ({ y, weight: weights[index]!, cell: 0 })),
      { isBinary: false, lonely },
    );
    return estimateQuantiles(sample, assignment, [{ cells: [0] }], q, 95)[0]!;
  };
  it("are the smallest value whose weighted share reaches them", () => {
    const found = quantilesOf([5, 1, 3, 2], [1, 1, 1, 1], [0.25, 0.26, 0.5, 0.99]);
    expect(found.map(({ estimate }) => estimate)).toEqual([1, 2, 2, 5]);
    expect(quantilesOf([1, 2, 3], [1, 1, 8], [0.5])[0]!.estimate).toBe(3);
  });
  it("of overlapping domains are those each has alone", () => {
    const rows = fc.sample(anyRows, { numRuns: 1, seed: 9 })[0]!;
    const { sample, assignment } = buildSample(rows, { isBinary: false });
    const targets = [{ cells: [0] }, { cells: [0, 1] }, { cells: [1] }];
    const together = estimateQuantiles(sample, assignment, targets, [0.3, 0.5], 95);
    targets.forEach((target, index) => {
      expect(together[index]).toEqual(estimateQuantiles(sample, assignment, [target], [0.3, 0.5], 95)[0]);
    });
  });
  it("have no limit beyond the values, and no figure of nobody", () => {
    expect(quantilesOf([1, 2, 3], [1, 1, 1], [0.5])[0]).toMatchObject({ estimate: 2, low: null, high: null });
    const { sample, assignment } = buildSample([{ y: 1, cell: 0 }], { cells: 2, isBinary: false });
    expect(estimateQuantiles(sample, assignment, [{ cells: [1] }], [0.5], 95)).toEqual([
      [{ q: 0.5, estimate: null, low: null, high: null, df: 0 }],
    ]);
  });
});

it("a design that refuses lonely strata refuses models too", () => {
  const rows = [0, 1, 0, 1].map((y, index): Row => ({ y, cell: index % 2, stratum: index < 3 ? "A" : "B", psu: index }));
  const { sample, assignment } = buildSample(rows, { lonely: "refuse" });
  expect(() => standardise(sample, assignment, [[twoCells[0]!]], [1], [], LINEAR)).toThrow(DesignError);
});
