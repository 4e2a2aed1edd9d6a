import { z } from "zod";
import type { QuestionInput } from "../../../shared/contracts/questions.ts";
import type { CompiledQuestion } from "../../questions/compile.ts";
import type { AnsweredNode, Answer } from "../../questions/work.ts";
import { adjustPValues } from "../../statistics/adjustments.ts";
import { bringIn, type CaseRelease } from "./ask.ts";
import { asList, type ReferenceCase } from "./cases.ts";
import { Comparison, EXACT, INTERVAL } from "./compare.ts";

const Fields = z.record(z.string(), z.unknown());
type Fields = z.infer<typeof Fields>;
const Keyed = z.looseObject({ key: z.array(z.union([z.string(), z.number()])) });
type Level = 90 | 95 | 99;
type Input = Omit<QuestionInput, "releaseId">;

/** Intervals of an expected cell by the product's names for them. */
const INTERVALS = { "korn-graubard": "kornGraubard", logit: "logit", wilson: "wilson", linear: "linear" } as const;
type Interval = keyof typeof INTERVALS;

/** A case's question without what varies from check to check. */
export function baseQuestion({ query }: ReferenceCase): Input {
  const { variable, affected } = query.outcome;
  const by = asList(query.by).map((name) => ({ variable: name }));
  const { comparison } = query;
  return {
    outcome: affected === undefined ? { variable } : { rule: { variable, in: [String(affected)] } },
    ...(query.among ? { among: query.among } : {}),
    down: by.slice(0, 3),
    across: by.slice(3),
    comparison:
      comparison?.kind === "group"
        ? { kind: "group", breakdown: comparison.variable ?? "", value: String(comparison.value) }
        : comparison?.kind === "rest" || comparison?.kind === "all"
          ? { kind: comparison.kind }
          : { kind: "none" },
  };
}

/** The figure with the given codes; the whole for none. */
export function nodeOf(answer: Answer, compiled: CompiledQuestion, key: readonly (string | number)[]): AnsweredNode | undefined {
  const indexes = key.map((code, axis) => compiled.breakdowns[axis]?.values.findIndex((value) => value.code === String(code)));
  return answer.nodes.find(
    (node) => node.key.length === indexes.length && node.key.every((value, axis) => value === indexes[axis]),
  );
}

function checkCell(comparison: Comparison, what: string, node: AnsweredNode, expected: Fields): void {
  const { estimate } = node;
  comparison.number(`${what} respondents`, estimate.respondents, expected.respondents, 0);
  comparison.number(`${what} affected respondents`, estimate.affectedRespondents, expected.affectedRespondents, 0);
  comparison.number(`${what} people`, estimate.people, expected.people, EXACT);
  comparison.number(`${what} SE of people`, estimate.peopleSe, expected.peopleSe, EXACT, estimate.people * 1e-3);
  comparison.number(`${what} affected people`, estimate.affectedPeople, expected.affectedPeople, EXACT);
  comparison.number(
    `${what} SE of affected people`,
    estimate.affectedPeopleSe,
    expected.affectedPeopleSe,
    EXACT,
    estimate.affectedPeople * 1e-3,
  );
  comparison.number(`${what} estimate`, estimate.estimate, expected.estimate, EXACT);
  comparison.number(`${what} SE`, estimate.se, expected.se, EXACT);
  comparison.number(`${what} df`, estimate.df, expected.df, 0);
  comparison.number(`${what} design effect`, estimate.deff, expected.deff, EXACT);
  comparison.number(`${what} Kish effect`, estimate.kish, expected.kish, EXACT);
  comparison.leave(expected, [
    "key",
    "respondents",
    "affectedRespondents",
    "people",
    "peopleSe",
    "affectedPeople",
    "affectedPeopleSe",
    "estimate",
    "se",
    "df",
    "deff",
    "kish",
    "intervals",
  ]);
}

/** The expected linear interval isn't cut off; ours is, and says so. */
const cut = (value: unknown, isShare: boolean) =>
  typeof value === "number" && isShare ? Math.min(1, Math.max(0, value)) : value;

function checkInterval(
  comparison: Comparison,
  what: string,
  node: AnsweredNode,
  expected: Fields,
  interval: Interval,
  isShare: boolean,
): void {
  const limits = expected[INTERVALS[interval]];
  if (!Array.isArray(limits)) return;
  const scale = interval === "linear" ? 1e-6 : 0;
  comparison.number(`${what} ${interval} low`, node.estimate.low, cut(limits[0], isShare), INTERVAL, scale);
  comparison.number(`${what} ${interval} high`, node.estimate.high, cut(limits[1], isShare), INTERVAL, scale);
  if (interval === "korn-graubard")
    comparison.number(`${what} effective n`, node.estimate.effectiveRespondents, expected.effectiveN, INTERVAL);
}

async function checkCells(comparison: Comparison, release: CaseRelease, reference: ReferenceCase): Promise<void> {
  const cells = z.array(Keyed).parse(reference.expected.cells ?? []);
  if (cells.length === 0) return;
  const question = baseQuestion(reference);
  const isShare = reference.query.outcome.affected !== undefined;
  const intervals: Interval[] = isShare ? ["korn-graubard", "logit", "wilson", "linear"] : ["linear"];
  const levels = asList<Level>(reference.query.levels ?? reference.query.level ?? 95);
  for (const level of levels) {
    for (const interval of intervals) {
      const { answer, compiled } = await release.ask({ ...question, level, interval });
      comparison.number("design's df", answer.designDf, reference.expected.designDf, 0);
      for (const cell of cells) {
        const what = `[${cell.key.join(", ")}]`;
        const node = nodeOf(answer, compiled, cell.key);
        if (!node) {
          comparison.differences.push(`${what}: no such cell`);
          continue;
        }
        checkCell(comparison, what, node, cell);
        const byLevel = Fields.safeParse(cell.intervals);
        const expected = Fields.safeParse(byLevel.success ? byLevel.data[String(level)] : undefined);
        if (!expected.success) continue;
        checkInterval(comparison, `${what} ${level} %`, node, expected.data, interval, isShare);
        comparison.leave(expected.data, [...Object.values(INTERVALS), "effectiveN"]);
      }
    }
  }
}

const CONTRAST_FIELDS = [
  ["reference", EXACT],
  ["difference", EXACT],
  ["se", EXACT],
  ["df", 0],
  ["covariance", EXACT],
  ["correlation", EXACT],
  ["low", INTERVAL],
  ["high", INTERVAL],
  ["p", INTERVAL],
  ["ratio", EXACT],
  ["logRatioSe", EXACT],
  ["ratioLow", INTERVAL],
  ["ratioHigh", INTERVAL],
  ["oddsRatio", EXACT],
  ["logOddsRatioSe", EXACT],
  ["oddsRatioLow", INTERVAL],
  ["oddsRatioHigh", INTERVAL],
  ["moverLow", INTERVAL],
  ["moverHigh", INTERVAL],
  ["detectable", INTERVAL],
] as const;

async function checkComparisons(comparison: Comparison, release: CaseRelease, reference: ReferenceCase): Promise<void> {
  const single = Keyed.safeParse(reference.expected.comparison);
  const expected = single.success ? [single.data] : z.array(Keyed).parse(reference.expected.comparisons ?? []);
  if (expected.length === 0) return;
  const { answer, compiled } = await release.ask({ ...baseQuestion(reference), level: reference.query.level ?? 95 });
  const family = answer.nodes.filter((node) => node.kind === "cell" && node.contrast !== null);
  comparison.number("family size", family.length, reference.expected.familySize, 0);
  const p = family.map((node) => node.contrast!.p);
  const adjusted = { pHolm: adjustPValues(p, "holm"), pBenjaminiHochberg: adjustPValues(p, "benjamini-hochberg") };
  for (const fields of expected) {
    const what = `[${fields.key.join(", ")}] against`;
    const node = nodeOf(answer, compiled, fields.key);
    if (!node?.contrast) {
      comparison.differences.push(`${what}: no comparison`);
      continue;
    }
    const contrast = node.contrast;
    comparison.number(`${what} estimate`, node.estimate.estimate, fields.estimate, EXACT);
    // A covariance of independent groups is 0 in theory and rounding in practice.
    const scale = (contrast.se ?? 0) ** 2 * 1e-3;
    for (const [field, tolerance] of CONTRAST_FIELDS) {
      comparison.number(
        `${what} ${field}`,
        contrast[field],
        fields[field],
        tolerance,
        field === "covariance" ? scale : field === "correlation" ? 1e-3 : 0,
      );
    }
    const index = family.indexOf(node);
    comparison.number(`${what} pHolm`, adjusted.pHolm[index], fields.pHolm, INTERVAL);
    comparison.number(`${what} pBenjaminiHochberg`, adjusted.pBenjaminiHochberg[index], fields.pBenjaminiHochberg, INTERVAL);
    comparison.leave(fields, ["key", "estimate", ...CONTRAST_FIELDS.map(([field]) => field), "pHolm", "pBenjaminiHochberg"]);
  }
}

/** Prevalences, means and their comparisons, at every level and by every interval that the case gives. */
export async function checkTable(reference: ReferenceCase, folder: string): Promise<Comparison> {
  const comparison = new Comparison();
  const release = await bringIn(reference, folder);
  await checkCells(comparison, release, reference);
  await checkComparisons(comparison, release, reference);
  comparison.leave(reference.expected, ["designDf", "cells", "comparison", "comparisons", "familySize"]);
  return comparison;
}
