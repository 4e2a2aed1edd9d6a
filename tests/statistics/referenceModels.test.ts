import { describe, expect, it } from "vitest";
import { adjust, type Covariate } from "../../server/statistics/adjusted.ts";
import { association } from "../../server/statistics/association.ts";
import { attributable } from "../../server/statistics/attributable.ts";
import { inequality } from "../../server/statistics/inequality.ts";
import type { Level } from "../../server/statistics/intervals.ts";
import { estimateQuantiles } from "../../server/statistics/quantiles.ts";
import { standardise } from "../../server/statistics/standardise.ts";
import { trend } from "../../server/statistics/trend.ts";
import { expectClose } from "./support/close.ts";
import { loadCase, readCases, type LoadedCase, type ReferenceCase } from "./support/referenceCases.ts";

/** STATISTICS section 10: estimates and errors, derived figures, fits. */
const EXACT = 1e-9;
const DERIVED = 1e-6;
const FIT = 1e-7;

const options = (reference: ReferenceCase) =>
  ({ level: levelOf(reference), interval: "linear", difference: "linear", isBinary: true }) as const;

function levelOf({ query }: ReferenceCase): Level {
  const level = query.level ?? 95;
  if (level !== 90 && level !== 95 && level !== 99) throw new Error(`No such level: ${level}`);
  return level;
}

function expectFigures(
  actual: Record<string, unknown>,
  expected: Record<string, number>,
  tolerances: Record<string, number>,
  label: string,
  scale = 0,
): void {
  for (const [field, tolerance] of Object.entries(tolerances)) {
    const value = expected[field];
    expect(value, `${label} expects ${field}`).toBeTypeOf("number");
    const found = actual[field];
    expectClose(typeof found === "number" ? found : null, value!, tolerance, `${label} ${field}`, scale);
  }
}

/** A case's cases of one kind, so that none goes unchecked. */
const cases = readCases();
const ofKind = (kind: string) => cases.filter((one) => one.kind === kind);
const rowsOf = (loaded: LoadedCase, name: string) => loaded.column(name);
const cellOf = (loaded: LoadedCase, ...key: (string | number)[]) =>
  loaded.keys.findIndex((candidate) => candidate.every((part, axis) => part === key[axis]));

interface ExpectedDifference extends Record<string, number> {
  of: number;
  from: number;
}

describe("associations", () => {
  it.each(ofKind("association"))("$id", (reference) => {
    const { sample, assignment } = loadCase(reference);
    const actual = association(sample, assignment);
    const { F, ndf, ddf, p } = reference.expected as Record<string, number>;
    expectClose(actual?.f, F!, DERIVED, "F");
    expectClose(actual?.numeratorDf, ndf!, DERIVED, "numerator");
    expectClose(actual?.denominatorDf, ddf!, DERIVED, "denominator");
    expectClose(actual?.p, p!, DERIVED, "p");
  });
});

describe("standardised shares", () => {
  it.each(ofKind("standardised"))("$id", (reference) => {
    const { variable, codes, weights } = reference.query.standardise!;
    const loaded = loadCase(reference, [reference.query.by as string, variable]);
    const keys = (reference.expected["cells"] as { key: [number] }[]).map(({ key }) => key[0]);
    const groups = keys.map((key) => codes.map((code) => ({ cells: [cellOf(loaded, key, code)] })));
    const difference = reference.expected["difference"] as ExpectedDifference;
    const request = { of: keys.indexOf(difference.of), from: keys.indexOf(difference.from) };
    const actual = standardise(loaded.sample, loaded.assignment, groups, weights, [request], options(reference));
    const limits = { low: DERIVED, high: DERIVED };
    (reference.expected["cells"] as Record<string, number>[]).forEach((expected, index) => {
      const cell = { ...actual.groups[index]! };
      expectFigures(cell, expected, { estimate: EXACT, se: EXACT, ...limits }, `group ${index}`);
      expect(cell.df).toBe(expected["df"]);
    });
    const contrast = { ...actual.contrasts[0]! };
    expectFigures(contrast, difference, { difference: EXACT, se: EXACT, ...limits, p: DERIVED }, "difference");
    expect(contrast.df).toBe(difference["df"]);
  });
});

describe("trends", () => {
  it.each(ofKind("trend"))("$id", (reference) => {
    const loaded = loadCase(reference, [reference.query.scores!]);
    const groups = loaded.keys.map((_, cell) => ({ cells: [cell] }));
    const link = reference.query.model!;
    const actual = trend(
      loaded.sample,
      loaded.assignment,
      groups,
      loaded.keys.map(([score]) => Number(score)),
      { link, level: levelOf(reference) },
    );
    const expected = reference.expected as Record<string, number>;
    const tolerance = link === "linear" ? EXACT : FIT;
    const tolerances = { intercept: tolerance, slope: tolerance, slopeSe: tolerance, designDf: 0, pAtDesignDf: DERIVED };
    expectFigures({ ...actual, designDf: actual.df, pAtDesignDf: actual.p }, expected, tolerances, reference.id);
  });
});

describe("adjusted shares", () => {
  it.each(ofKind("adjusted"))("$id", (reference) => {
    const loaded = loadCase(reference);
    const covariates = reference.query.adjustFor!.map((name): Covariate => {
      const column = rowsOf(loaded, name);
      const codes = [...new Set(column.filter((value) => value !== null))].sort((a, b) => a - b);
      return { codes: Int32Array.from(column, (value) => (value === null ? -1 : codes.indexOf(value))), levels: codes.length };
    });
    const margins = reference.expected["margins"] as ({ key: [number] } & Record<string, number>)[];
    const request = [{ of: 1, from: 0 }];
    const actual = adjust(loaded.sample, loaded.assignment, covariates, request, options(reference));
    margins.forEach((expected, index) => {
      const group = actual.groups[cellOf(loaded, expected.key[0])]!;
      expectClose(group.estimate, expected["estimate"]!, FIT, `margin ${index}`);
      expectClose(group.se, expected["seFull"]!, FIT, `standard error of margin ${index}`);
    });
    const difference = reference.expected["difference"] as Record<string, number>;
    const contrast = actual.contrasts[0]!;
    expectClose(contrast.difference, difference["difference"]!, FIT, "difference");
    expectClose(contrast.se, difference["seFull"]!, FIT, "standard error of the difference");
    expect(contrast.df).toBe(difference["designDf"]);
    const coefficients = Object.values(reference.expected["coefficients"] as Record<string, number>);
    const errors = reference.expected["coefficientSe"] as number[];
    expect(actual.coefficients.length).toBe(coefficients.length);
    coefficients.forEach((value, term) => {
      expectClose(actual.coefficients[term]!.estimate, value, FIT, `coefficient ${term}`);
      expectClose(actual.coefficients[term]!.se, errors[term]!, FIT, `its error ${term}`);
    });
  });
});

describe("attributable risks", () => {
  it.each(ofKind("attributable"))("$id", (reference) => {
    const loaded = loadCase(reference);
    const cell = cellOf(loaded, reference.query.reference!);
    const actual = attributable(loaded.sample, loaded.assignment, cell, levelOf(reference));
    const figures = {
      overall: actual.overall,
      reference: actual.reference,
      par: actual.risk.estimate,
      parSe: actual.risk.se,
      paf: actual.fraction.estimate,
      pafSe: actual.fraction.se,
      df: actual.df,
    };
    const tolerances = { overall: EXACT, reference: EXACT, par: EXACT, parSe: EXACT, paf: EXACT, pafSe: EXACT, df: 0 };
    expectFigures(figures, reference.expected as Record<string, number>, tolerances, reference.id);
  });
});

describe("inequality indexes", () => {
  it.each(ofKind("inequality"))("$id", (reference) => {
    const loaded = loadCase(reference, [reference.query.ordered!]);
    const ordered = loaded.keys.map((_, cell) => cell);
    const { slopeIndex, relativeIndex } = inequality(loaded.sample, loaded.assignment, ordered, 95);
    const figures = {
      slopeIndex: slopeIndex.estimate,
      slopeIndexSe: slopeIndex.se,
      relativeIndex: relativeIndex.estimate,
      relativeIndexSe: relativeIndex.se,
    };
    const tolerances = { slopeIndex: EXACT, slopeIndexSe: EXACT, relativeIndex: EXACT, relativeIndexSe: EXACT };
    expectFigures(figures, reference.expected as Record<string, number>, tolerances, reference.id);
  });
});

describe("quantiles", () => {
  it.each(ofKind("quantile"))("$id", (reference) => {
    const loaded = loadCase(reference, []);
    const asked = reference.query.quantiles!;
    const [actual] = estimateQuantiles(loaded.sample, loaded.assignment, [{ cells: [0] }], asked, levelOf(reference));
    const expected = reference.expected["quantiles"] as Record<string, number>[];
    expect(actual!.map(({ q, estimate, low, high }) => ({ q, estimate, low, high }))).toEqual(expected);
  });
});

it("every kind of case in the file is checked here or beside the estimates", () => {
  const here = ["association", "standardised", "trend", "adjusted", "attributable", "inequality", "quantile"];
  const beside = ["prevalence", "mean", "comparison", "two-group-mean"];
  expect(cases.filter(({ kind }) => ![...here, ...beside].includes(kind)).map(({ id }) => id)).toEqual([]);
});
