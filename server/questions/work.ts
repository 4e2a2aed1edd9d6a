import type { DisclosureMinimums } from "../../shared/contracts/design.ts";
import type { Question } from "../../shared/contracts/questions.ts";
import {
  estimateTargets,
  type ContrastEstimate,
  type ContrastRequest,
  type Target,
  type TargetEstimate,
} from "../statistics/estimate.ts";
import type { Sample } from "../statistics/types.ts";
import { assign, type Columns } from "./assign.ts";
import { isTooFew, type Counts } from "./disclosure/counts.ts";
import { suppress, type Withholding } from "./disclosure/suppress.ts";
import { comparisonsOf, tableShape, type TableNode } from "./nodes.ts";
import type { Plan } from "./plan.ts";

/** What a worker needs to answer a question; all of it can be posted, columns and sample over shared memory. */
export interface Work {
  plan: Plan;
  /** Number of values of each breakdown. */
  down: number[];
  across: number[];
  columns: Columns;
  sample: Sample;
  options: Pick<Question, "level" | "interval" | "difference" | "comparison">;
  /** Axis and value index of a `group` comparison; −1 otherwise. */
  groupAxis: number;
  groupValue: number;
  /** Null: nothing is withheld (checks against reference results only). */
  minimums: DisclosureMinimums | null;
}

/** One figure with its estimate, why it is withheld, and its comparison. */
export interface AnsweredNode {
  key: TableNode["key"];
  kind: TableNode["kind"];
  estimate: TargetEstimate;
  withheld: Withholding;
  /** Null without a comparison, or where what it is compared with is withheld. */
  contrast: ContrastEstimate | null;
}

export interface Answer {
  designDf: number;
  nodes: AnsweredNode[];
}

/** Complements cost a list of base cells for each figure; past this many entries a table is refused. */
const COMPLEMENT_LIMIT = 20_000_000;

/** Base cells of everyone in the table's groups, those without a value on some axis left out. */
function groupedCells(nodes: readonly TableNode[]): Int32Array {
  return Int32Array.from(new Set(nodes.filter(({ kind }) => kind === "cell").flatMap(({ cells }) => [...cells]))).sort();
}

function complement(cells: Int32Array, grouped: Int32Array): Int32Array {
  const own = new Set(cells);
  return grouped.filter((cell) => !own.has(cell));
}

/** Whether a question's complements fit; checked before the work is sent. */
export function fitsComplements(figures: number, baseCells: number): boolean {
  return figures * baseCells <= COMPLEMENT_LIMIT;
}

/** Answers a question from columns in memory: assigns respondents to cells, estimates every figure and comparison, decides what may be shown. */
export async function answer(work: Work): Promise<Answer> {
  const shape = tableShape(work.down, work.across);
  const assignment = assign(work.plan, work.columns, work.sample.weight);
  const targets: Target[] = shape.nodes.map(({ cells }) => ({ cells }));
  const requests: ContrastRequest[] = [];
  const requestOf = new Map<number, number>();
  const grouped = groupedCells(shape.nodes);
  let everyone: number | null = null;
  const against = comparisonsOf(shape, work.options.comparison, work.groupAxis, work.groupValue);
  against.forEach((reference, node) => {
    if (reference === null) return;
    requestOf.set(node, requests.length);
    if (reference === "rest") {
      requests.push({ of: node, from: targets.length });
      targets.push({ cells: complement(shape.nodes[node]!.cells, grouped) });
    } else if (reference === "all") {
      if (everyone === null) {
        everyone = targets.length;
        targets.push({ cells: grouped });
      }
      requests.push({ of: node, from: everyone });
    } else {
      requests.push({ of: node, from: "node" in reference ? reference.node : { fixed: reference.fixedValue } });
    }
  });
  const isBinary = assignment.isBinary;
  const { level, interval, difference } = work.options;
  const result = estimateTargets(work.sample, assignment, targets, requests, { level, interval, difference, isBinary });
  const estimates = result.targets.slice(0, shape.nodes.length);
  const countsOf = ({ respondents, affectedRespondents }: TargetEstimate): Counts => ({
    respondents,
    affected: isBinary ? affectedRespondents : null,
  });
  const counts = estimates.map(countsOf);
  const withheld: Withholding[] =
    work.minimums === null
      ? counts.map(({ respondents }) => (respondents === 0 ? "empty" : null))
      : await suppress({ counts, lines: shape.lines }, work.minimums);
  /** Whether what a figure is set against may not be shown: a withheld cell, or others too few by themselves. */
  const isHidden = (from: ContrastRequest["from"]) => {
    if (typeof from !== "number" || work.minimums === null) return false;
    if (from < shape.nodes.length) return withheld[from] !== null;
    return isTooFew(countsOf(result.targets[from]!), work.minimums);
  };
  const nodes = shape.nodes.map(({ key, kind }, node): AnsweredNode => {
    const request = requestOf.get(node);
    const contrast = request === undefined || isHidden(requests[request]!.from) ? null : result.contrasts[request]!;
    return { key, kind, estimate: estimates[node]!, withheld: withheld[node]!, contrast };
  });
  return { designDf: result.designDf, nodes };
}

/** The worker's entry. */
export default (work: Work): Promise<Answer> => answer(work);
