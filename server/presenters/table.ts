import type { Question } from "../../shared/contracts/questions.ts";
import type { Cell, ComparisonResult, Reliability, Table } from "../../shared/contracts/tables.ts";
import type { CompiledBreakdown } from "../questions/compile.ts";
import type { AnsweredNode, Answer } from "../questions/work.ts";
import { adjustPValues } from "../statistics/adjustments.ts";
import { studentCritical } from "../statistics/distributions.ts";
import type { ContrastEstimate } from "../statistics/estimate.ts";
import { reliabilityOfMean, reliabilityOfShare } from "../statistics/reliability.ts";

/** Everything about a table but its figures. */
export interface TableFrame {
  question: Question;
  release: Table["release"];
  compared: Table["compared"];
  engine: string;
  measure: Table["measure"];
  breakdowns: CompiledBreakdown[];
  caption: string;
  /** Notes that name the size of the family of comparisons. */
  notes: (familySize: number) => string[];
  /** Planners aren't shown figures that can't be relied on. */
  hidesUnreliable: boolean;
}

const isComparable = (node: AnsweredNode) => node.withheld === null && node.contrast !== null;

/** Adjusted p-values by node, over one family. */
function adjusted(nodes: readonly AnsweredNode[], method: Question["adjustment"]): Map<AnsweredNode, number | null> {
  const family = nodes.filter(isComparable);
  const values = adjustPValues(
    family.map((node) => node.contrast?.p ?? null),
    method,
  );
  return new Map(family.map((node, i) => [node, values[i] ?? null]));
}

/** Of a quantile there is no standard error to judge by: its interval says what is known. */
function reliabilityOf({ estimate }: AnsweredNode, { outcome, standardise, adjustFor }: Question): Reliability {
  if ("rule" in outcome) {
    const isCrude = standardise === undefined && adjustFor.length === 0;
    return reliabilityOfShare(isCrude ? estimate : { ...estimate, affectedRespondents: null });
  }
  if (outcome.quantile === undefined) return reliabilityOfMean(estimate);
  const hasInterval = estimate.low !== null && estimate.high !== null;
  return hasInterval
    ? { verdict: "reliable", reasons: [] }
    : { verdict: "caution", reasons: ["a limit lies beyond the values seen"] };
}

const NO_LIMITS = { low: null, high: null };

/** Linear limits of a total of people, which is never below 0. */
function totalLimits(total: number, se: number | null, df: number, level: number): { low: number | null; high: number | null } {
  if (se === null || df < 1) return NO_LIMITS;
  const reach = studentCritical(level, df) * se;
  return { low: Math.max(0, total - reach), high: total + reach };
}

function presentComparison(
  contrast: ContrastEstimate,
  pAdjusted: number | null,
  level: number,
  isShare: boolean,
): ComparisonResult {
  const isShown = pAdjusted !== null && pAdjusted < 1 - level / 100 && contrast.difference !== null && contrast.difference !== 0;
  return {
    reference: contrast.reference,
    difference: contrast.difference,
    se: contrast.se,
    low: contrast.low,
    high: contrast.high,
    df: contrast.df,
    p: contrast.p,
    pAdjusted,
    ratio: contrast.ratio,
    ratioLow: contrast.ratioLow,
    ratioHigh: contrast.ratioHigh,
    oddsRatio: isShare ? contrast.oddsRatio : null,
    oddsRatioLow: isShare ? contrast.oddsRatioLow : null,
    oddsRatioHigh: isShare ? contrast.oddsRatioHigh : null,
    detectable: contrast.detectable,
    direction: isShown ? (contrast.difference! > 0 ? "higher" : "lower") : "none",
  };
}

/** Builds the table that leaves the server: withheld figures have a key and a reason, nothing else. */
export function presentTable(frame: TableFrame, answer: Answer): Table {
  const { question, measure } = frame;
  const cells = answer.nodes.filter((node) => node.kind === "cell");
  const margins = answer.nodes.filter((node) => node.kind !== "cell");
  const pAdjusted = new Map([...adjusted(cells, question.adjustment), ...adjusted(margins, question.adjustment)]);
  const present = (node: AnsweredNode): Cell => {
    const key = node.key.map((value, axis) => (value === null ? null : frame.breakdowns[axis]!.values[value]!.code));
    if (node.withheld !== null) return { key, shown: false, reason: node.withheld };
    const reliability = reliabilityOf(node, question);
    if (frame.hidesUnreliable && reliability.verdict === "unreliable") return { key, shown: false, reason: "unreliable" };
    const { estimate } = node;
    const people = totalLimits(estimate.people, estimate.peopleSe, estimate.df, question.level);
    const affectedPeople =
      measure === "share"
        ? totalLimits(estimate.affectedPeople, estimate.affectedPeopleSe, estimate.df, question.level)
        : NO_LIMITS;
    return {
      key,
      shown: true,
      respondents: estimate.respondents,
      affectedRespondents: measure === "share" ? estimate.affectedRespondents : null,
      people: estimate.people,
      peopleSe: estimate.peopleSe,
      peopleLow: people.low,
      peopleHigh: people.high,
      affectedPeople: measure === "share" ? estimate.affectedPeople : null,
      affectedPeopleSe: measure === "share" ? estimate.affectedPeopleSe : null,
      affectedPeopleLow: affectedPeople.low,
      affectedPeopleHigh: affectedPeople.high,
      estimate: estimate.estimate,
      se: estimate.se,
      low: estimate.low,
      high: estimate.high,
      df: estimate.df,
      deff: estimate.deff,
      effectiveRespondents: estimate.effectiveRespondents,
      cv: estimate.cv,
      clipped: estimate.clipped,
      reliability,
      ...(node.contrast
        ? { comparison: presentComparison(node.contrast, pAdjusted.get(node) ?? null, question.level, measure === "share") }
        : {}),
    };
  };
  const whole = present(answer.nodes[0]!);
  const familySize = cells.filter(isComparable).length;
  return {
    question,
    release: { ...frame.release, designDf: answer.designDf },
    compared: frame.compared,
    engine: frame.engine,
    measure,
    breakdowns: frame.breakdowns,
    whole,
    cells: cells.map(present),
    margins: margins.filter((node) => node.kind === "margin").map(present),
    overall: answer.overall,
    familySize,
    caption: frame.caption,
    notes: frame.notes(familySize),
  };
}
