import { z } from "zod";
import type { Question } from "../../../shared/contracts/questions.ts";
import type { OverallResult } from "../../../shared/contracts/tables.ts";
import { bringIn, type CaseRelease } from "./ask.ts";
import { asList, type ReferenceCase } from "./cases.ts";
import { Comparison, EXACT, FIT, INTERVAL } from "./compare.ts";
import { baseQuestion, nodeOf } from "./tables.ts";

const Keyed = z.looseObject({ key: z.array(z.union([z.string(), z.number()])) });
const Fields = z.record(z.string(), z.unknown());
const Difference = z.looseObject({ of: z.union([z.string(), z.number()]), from: z.union([z.string(), z.number()]) });

type Check = (comparison: Comparison, release: CaseRelease, reference: ReferenceCase) => Promise<void>;

/** Brings the case's file in, checks it, and gathers what differs. */
const checkBy = (check: Check) => async (reference: ReferenceCase, folder: string) => {
  const comparison = new Comparison();
  await check(comparison, await bringIn(reference, folder), reference);
  return comparison;
};

/** A case's question with something asked of the table as a whole, over one grouping. */
async function overallOf(
  release: CaseRelease,
  reference: ReferenceCase,
  kind: Question["overall"][number],
  variable: string,
): Promise<OverallResult> {
  const { level, reference: group } = reference.query;
  const { answer } = await release.ask({
    ...baseQuestion(reference),
    down: [{ variable }],
    across: [],
    ...(kind === "attributable" ? { comparison: { kind: "group", breakdown: variable, value: String(group) } } : {}),
    ...(level ? { level } : {}),
    overall: [kind],
  });
  const [result] = answer.overall;
  if (!result) throw new Error("Nothing was said of the table as a whole.");
  return result;
}

const figureOf = (result: OverallResult, name: string) => result.figures.find((figure) => figure.name === name);

/** Rao–Scott tests. */
export const checkAssociation = checkBy(async (comparison, release, reference) => {
  const result = await overallOf(release, reference, "association", asList(reference.query.by)[0] ?? "");
  const { expected } = reference;
  comparison.number("F", figureOf(result, "F")?.estimate ?? null, expected.F, EXACT);
  comparison.number("numerator df", figureOf(result, "Numerator degrees of freedom")?.estimate ?? null, expected.ndf, EXACT);
  comparison.number("denominator df", result.df, expected.ddf, EXACT);
  comparison.number("p", result.p, expected.p, INTERVAL);
  comparison.leave(expected, ["F", "ndf", "ddf", "p"]);
});

/** Slopes over ordered groups. */
export const checkTrend = checkBy(async (comparison, release, reference) => {
  const { scores = "", model } = reference.query;
  const result = await overallOf(release, reference, "trend", scores);
  const isLinear = model !== "logistic";
  const slope = figureOf(result, isLinear ? "Slope for one step" : "Slope of the log odds");
  const intercept = figureOf(result, isLinear ? "Value at score 0" : "Log odds at score 0");
  const { expected } = reference;
  comparison.number("slope", slope?.estimate ?? null, expected.slope, FIT);
  comparison.number("SE of the slope", slope?.se ?? null, expected.slopeSe, FIT);
  comparison.number("intercept", intercept?.estimate ?? null, expected.intercept, FIT);
  comparison.number("df", result.df, expected.designDf, 0);
  if (isLinear) comparison.number("p", result.p, expected.pAtDesignDf, INTERVAL);
  comparison.leave(expected, ["slope", "slopeSe", "intercept", "designDf", ...(isLinear ? ["pAtDesignDf"] : [])]);
});

/** Slope and relative index of inequality. */
export const checkInequality = checkBy(async (comparison, release, reference) => {
  const result = await overallOf(release, reference, "inequality", reference.query.ordered ?? "");
  const [slope, relative] = [figureOf(result, "Slope index"), figureOf(result, "Relative index")];
  const { expected } = reference;
  comparison.number("slope index", slope?.estimate ?? null, expected.slopeIndex, FIT);
  comparison.number("SE of the slope index", slope?.se ?? null, expected.slopeIndexSe, FIT);
  comparison.number("relative index", relative?.estimate ?? null, expected.relativeIndex, FIT);
  comparison.number("SE of the relative index", relative?.se ?? null, expected.relativeIndexSe, FIT);
  comparison.leave(expected, ["slopeIndex", "slopeIndexSe", "relativeIndex", "relativeIndexSe"]);
});

/** Population attributable risk and fraction. */
export const checkAttributable = checkBy(async (comparison, release, reference) => {
  const result = await overallOf(release, reference, "attributable", asList(reference.query.by)[0] ?? "");
  const [risk, fraction] = [
    figureOf(result, "Population attributable risk"),
    figureOf(result, "Population attributable fraction"),
  ];
  const { expected } = reference;
  comparison.number("overall", figureOf(result, "Overall")?.estimate ?? null, expected.overall, EXACT);
  comparison.number("reference", figureOf(result, "Reference group")?.estimate ?? null, expected.reference, EXACT);
  comparison.number("risk", risk?.estimate ?? null, expected.par, EXACT);
  comparison.number("SE of the risk", risk?.se ?? null, expected.parSe, EXACT);
  comparison.number("fraction", fraction?.estimate ?? null, expected.paf, EXACT);
  comparison.number("SE of the fraction", fraction?.se ?? null, expected.pafSe, EXACT);
  comparison.number("df", result.df, expected.df, 0);
  comparison.leave(expected, ["overall", "reference", "par", "parSe", "paf", "pafSe", "df"]);
});

/** Quantiles of everyone, each asked by itself. */
export const checkQuantiles = checkBy(async (comparison, release, reference) => {
  const { variable } = reference.query.outcome;
  for (const { q, ...expected } of z.array(z.looseObject({ q: z.number() })).parse(reference.expected.quantiles)) {
    const { answer } = await release.ask({
      ...baseQuestion(reference),
      outcome: { variable, quantile: q },
      comparison: { kind: "none" },
      level: reference.query.level ?? 95,
    });
    const { estimate } = answer.nodes[0]!;
    comparison.number(`${q} estimate`, estimate.estimate, expected.estimate, EXACT);
    comparison.number(`${q} low`, estimate.low, expected.low, EXACT);
    comparison.number(`${q} high`, estimate.high, expected.high, EXACT);
    comparison.leave(expected, ["estimate", "low", "high"]);
  }
});

/** The two groups of an expected difference, asked as a comparison with the second. */
async function checkDifference(
  comparison: Comparison,
  release: CaseRelease,
  reference: ReferenceCase,
  question: Parameters<CaseRelease["ask"]>[0],
  tolerances: { exact: number; interval: number },
): Promise<void> {
  const margins = z.array(Keyed).safeParse(reference.expected.margins);
  const [first, second] = margins.success ? margins.data : [];
  // Where a difference names no groups it is the second one's from the first.
  const unnamed = first && second ? { of: second.key[0], from: first.key[0] } : {};
  const expected = Difference.safeParse({ ...unnamed, ...Fields.parse(reference.expected.difference ?? {}) });
  if (!expected.success || reference.expected.difference === undefined) return;
  const { of, from } = expected.data;
  const breakdown = asList(reference.query.by)[0] ?? "";
  const { answer, compiled } = await release.ask({ ...question, comparison: { kind: "group", breakdown, value: String(from) } });
  const contrast = nodeOf(answer, compiled, [of])?.contrast;
  if (!contrast) {
    comparison.differences.push("no comparison");
    return;
  }
  const { exact, interval } = tolerances;
  comparison.number("difference", contrast.difference, expected.data.difference, exact);
  comparison.number("SE of the difference", contrast.se, expected.data.se ?? expected.data.seFull, exact);
  comparison.number("df of the difference", contrast.df, expected.data.df ?? expected.data.designDf, 0);
  comparison.number("low of the difference", contrast.low, expected.data.low, interval);
  comparison.number("high of the difference", contrast.high, expected.data.high, interval);
  comparison.number("p of the difference", contrast.p, expected.data.p, interval);
  comparison.leave(expected.data, ["of", "from", "difference", "se", "seFull", "df", "designDf", "low", "high", "p"]);
}

/** Directly standardised shares, and the difference of two groups. */
export const checkStandardised = checkBy(async (comparison, release, reference) => {
  const { standardise, level } = reference.query;
  if (!standardise) throw new Error("The case names nothing to standardise for.");
  // The case's weights go with its codes, ours with the codebook's order.
  const order = release.variables.find(({ name }) => name === standardise.variable)?.categories ?? [];
  const own = order.map(({ code }) => standardise.weights[standardise.codes.map(String).indexOf(code)] ?? 0);
  const question = {
    ...baseQuestion(reference),
    standardise: { variable: standardise.variable, weights: { own } },
    interval: "linear",
    level: level ?? 95,
  } as const;
  const { answer, compiled } = await release.ask(question);
  for (const cell of z.array(Keyed).parse(reference.expected.cells ?? [])) {
    const what = `[${cell.key.join(", ")}]`;
    const node = nodeOf(answer, compiled, cell.key);
    if (!node) {
      comparison.differences.push(`${what}: no such cell`);
      continue;
    }
    const { estimate } = node;
    comparison.number(`${what} estimate`, estimate.estimate, cell.estimate, EXACT);
    comparison.number(`${what} SE`, estimate.se, cell.se, EXACT);
    comparison.number(`${what} df`, estimate.df, cell.df, 0);
    comparison.number(`${what} low`, estimate.low, cell.low, INTERVAL);
    comparison.number(`${what} high`, estimate.high, cell.high, INTERVAL);
    comparison.leave(cell, ["key", "estimate", "se", "df", "low", "high"]);
  }
  await checkDifference(comparison, release, reference, question, { exact: EXACT, interval: INTERVAL });
  comparison.leave(reference.expected, ["cells", "difference"]);
});

/** Predictive margins, and the difference of two groups. */
export const checkAdjusted = checkBy(async (comparison, release, reference) => {
  const { adjustFor = [], level } = reference.query;
  const question = {
    ...baseQuestion(reference),
    adjustFor: adjustFor.map((variable) => ({ variable })),
    interval: "linear",
    level: level ?? 95,
  } as const;
  const { answer, compiled } = await release.ask(question);
  for (const margin of z.array(Keyed).parse(reference.expected.margins ?? [])) {
    const what = `[${margin.key.join(", ")}]`;
    const node = nodeOf(answer, compiled, margin.key);
    if (!node) {
      comparison.differences.push(`${what}: no such cell`);
      continue;
    }
    comparison.number(`${what} margin`, node.estimate.estimate, margin.estimate, FIT);
    comparison.number(`${what} SE`, node.estimate.se, margin.seFull, FIT);
    comparison.leave(margin, ["key", "estimate", "seFull"]);
  }
  await checkDifference(comparison, release, reference, question, { exact: FIT, interval: INTERVAL });
  comparison.leave(reference.expected, ["margins", "difference"]);
});
