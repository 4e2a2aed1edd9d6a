import { describe, expect, it } from "vitest";
import { adjustPValues } from "../../server/statistics/adjustments.ts";
import { type ContrastRequest, estimateTargets, intervalFor, type Target } from "../../server/statistics/estimate.ts";
import type { IntervalMethod, Level } from "../../server/statistics/intervals.ts";
import { expectClose } from "./support/close.ts";
import { loadCase, type LoadedCase, readCases, type ReferenceCase } from "./support/referenceCases.ts";

/** Estimates and standard errors; STATISTICS section 10. */
const EXACT = 1e-9;
const DERIVED = 1e-6;
/** Standard errors that are 0 in theory come out at this share of their scale. */
const ZERO = 1e-12;

interface ExpectedCell {
  key: (string | number)[];
  respondents: number;
  affectedRespondents?: number;
  people: number;
  peopleSe?: number;
  affectedPeople: number;
  affectedPeopleSe?: number;
  estimate: number;
  se: number;
  df: number;
  deff?: number;
  kish: number;
  intervals: Record<string, Record<string, [number | null, number | null] | number | null>>;
}

type ExpectedComparison = Record<string, number> & { key: (string | number)[] };

const options = { level: 95 as Level, interval: "korn-graubard" as const, difference: "linear" as const };

const INTERVALS: Record<string, IntervalMethod> = {
  linear: "linear",
  logit: "logit",
  wilson: "wilson",
  kornGraubard: "korn-graubard",
};

function indexOfKey(loaded: LoadedCase, key: unknown): number {
  return loaded.keys.findIndex((candidate) => JSON.stringify(candidate) === JSON.stringify(key));
}

function checkCells(reference: ReferenceCase, cells: ExpectedCell[], designDf?: number | null): void {
  const loaded = loadCase(reference);
  const isBinary = loaded.assignment.isBinary;
  const targets = cells.map(({ key }): Target => ({ cells: [indexOfKey(loaded, key)] }));
  for (const level of [90, 95, 99] as const) {
    const result = estimateTargets(loaded.sample, loaded.assignment, targets, [], { ...options, level, isBinary });
    if (typeof designDf === "number") expect(result.designDf).toBe(designDf);
    cells.forEach((cell, index) => {
      const actual = result.targets[index]!;
      const label = `${reference.id} ${JSON.stringify(cell.key)}`;
      expect(actual.respondents, label).toBe(cell.respondents);
      if (cell.affectedRespondents !== undefined) expect(actual.affectedRespondents, label).toBe(cell.affectedRespondents);
      expect(actual.df, label).toBe(cell.df);
      expectClose(actual.people, cell.people, EXACT, `${label} people`);
      expectClose(actual.affectedPeople, cell.affectedPeople, EXACT, `${label} affectedPeople`);
      if (cell.peopleSe !== undefined)
        expectClose(actual.peopleSe, cell.peopleSe, EXACT, `${label} peopleSe`, (ZERO / EXACT) * cell.people);
      if (cell.affectedPeopleSe !== undefined) {
        expectClose(
          actual.affectedPeopleSe,
          cell.affectedPeopleSe,
          EXACT,
          `${label} affectedPeopleSe`,
          (ZERO / EXACT) * cell.people,
        );
      }
      expectClose(actual.estimate, cell.estimate, EXACT, `${label} estimate`);
      expectClose(actual.se, cell.se, EXACT, `${label} se`);
      if (cell.deff !== undefined) expectClose(actual.deff, cell.deff, DERIVED, `${label} deff`);
      expectClose(actual.kish, cell.kish, EXACT, `${label} kish`);
      checkIntervals(label, cell, level, isBinary);
      const size = cell.intervals[level]?.["effectiveN"];
      if (typeof size === "number") expectClose(actual.effectiveRespondents, size, DERIVED, `${label} effectiveN`);
    });
  }
}

function checkIntervals(label: string, cell: ExpectedCell, level: Level, isBinary: boolean): void {
  for (const [name, method] of Object.entries(INTERVALS)) {
    const limits = cell.intervals[level]?.[name];
    if (!Array.isArray(limits)) continue;
    const { estimate, se, respondents, df } = cell;
    const actual = intervalFor(method, { estimate, se, n: respondents, df, level, isBinary });
    limits.forEach((limit, end) => {
      const found = end === 0 ? actual.low : actual.high;
      if (limit === null) expect(found, `${label} ${name}`).toBeNull();
      else expectClose(found, isBinary ? Math.min(1, Math.max(0, limit)) : limit, DERIVED, `${label} ${name} ${level}`);
    });
  }
}

function comparisonTargets(reference: ReferenceCase, loaded: LoadedCase, comparisons: ExpectedComparison[]) {
  const { kind, variable, value } = reference.query.comparison!;
  const by = typeof reference.query.by === "string" ? [reference.query.by] : reference.query.by!;
  const every = loaded.keys.map((_, cell) => cell);
  const targets: Target[] = [];
  const requests = comparisons.map(({ key }): ContrastRequest => {
    const cell = indexOfKey(loaded, key);
    const referenceKey = key.map((part, axis) => (by[axis] === variable ? value! : part));
    const other =
      kind === "all" ? every : kind === "rest" ? every.filter((one) => one !== cell) : [indexOfKey(loaded, referenceKey)];
    const of = targets.push({ cells: [cell] }) - 1;
    return { of, from: targets.push({ cells: other }) - 1 };
  });
  return { targets, requests };
}

function checkComparisons(reference: ReferenceCase, comparisons: ExpectedComparison[]): void {
  const loaded = loadCase(reference);
  const { targets, requests } = comparisonTargets(reference, loaded, comparisons);
  const isBinary = loaded.assignment.isBinary;
  const level = (reference.query.level ?? 95) as Level;
  const { contrasts, targets: estimates } = estimateTargets(loaded.sample, loaded.assignment, targets, requests, {
    ...options,
    level,
    isBinary,
  });
  const holm = adjustPValues(
    contrasts.map(({ p }) => p),
    "holm",
  );
  const hochberg = adjustPValues(
    contrasts.map(({ p }) => p),
    "benjamini-hochberg",
  );
  comparisons.forEach((expected, index) => {
    const actual = {
      ...contrasts[index]!,
      estimate: estimates[requests[index]!.of]!.estimate,
      pHolm: holm[index]!,
      pBenjaminiHochberg: hochberg[index]!,
    };
    for (const [field, value] of Object.entries(expected)) {
      if (typeof value !== "number") continue;
      // Not offered: a mean has no odds. The one such case is of a count of visits that happens to average below 1.
      const label = `${reference.id} ${JSON.stringify(expected.key)} ${field}`;
      const found = actual[field as keyof typeof actual];
      const isExact = [
        "estimate",
        "reference",
        "difference",
        "se",
        "ratio",
        "oddsRatio",
        "logRatioSe",
        "logOddsRatioSe",
      ].includes(field);
      if (field === "df") expect(found, label).toBe(value);
      else if (field === "correlation") expectClose(found, value, EXACT, label, 1);
      else if (field === "covariance") expectClose(found, value, EXACT, label, expected["se"]! ** 2);
      else
        expectClose(
          found,
          value,
          isExact ? EXACT : DERIVED,
          label,
          ["low", "high", "moverLow", "moverHigh"].includes(field) ? expected["se"]! : 0,
        );
    }
  });
}

describe("cells and comparisons of the reference cases", () => {
  const cases = readCases();
  it.each(cases.filter(({ kind }) => kind === "prevalence" || kind === "mean"))("$id", (reference) => {
    checkCells(reference, reference.expected["cells"] as ExpectedCell[], reference.expected["designDf"] as number | null);
  });
  it.each(cases.filter(({ kind }) => kind === "comparison"))("$id", (reference) => {
    checkComparisons(reference, reference.expected["comparisons"] as ExpectedComparison[]);
  });
  it.each(cases.filter(({ kind }) => kind === "two-group-mean"))("$id", (reference) => {
    checkCells(reference, reference.expected["cells"] as ExpectedCell[]);
    checkComparisons(reference, [reference.expected["comparison"] as ExpectedComparison]);
  });
});
