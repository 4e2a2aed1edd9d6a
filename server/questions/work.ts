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

function complement(cells: Int32Array, total: number): Int32Array {
  const isIn = new Uint8Array(total);
  for (const cell of cells) isIn[cell] = 1;
  const rest = new Int32Array(total - cells.length);
  let filled = 0;
  for (let cell = 0; cell < total; cell++) if (isIn[cell] === 0) rest[filled++] = cell;
  return rest;
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
  const against = comparisonsOf(shape, work.options.comparison, work.groupAxis, work.groupValue);
  against.forEach((reference, node) => {
    if (reference === null) return;
    requestOf.set(node, requests.length);
    if (reference === "rest") {
      requests.push({ of: node, from: targets.length });
      targets.push({ cells: complement(shape.nodes[node]!.cells, assignment.cells) });
    } else {
      requests.push({ of: node, from: "node" in reference ? reference.node : { fixed: reference.fixedValue } });
    }
  });
  const isBinary = assignment.isBinary;
  const { level, interval, difference } = work.options;
  const result = estimateTargets(work.sample, assignment, targets, requests, { level, interval, difference, isBinary });
  const estimates = result.targets.slice(0, shape.nodes.length);
  const counts = estimates.map(({ respondents, affectedRespondents }) => ({
    respondents,
    affected: isBinary ? affectedRespondents : null,
  }));
  const withheld: Withholding[] =
    work.minimums === null
      ? counts.map(({ respondents }) => (respondents === 0 ? "empty" : null))
      : await suppress({ counts, lines: shape.lines }, work.minimums);
  const nodes = shape.nodes.map(({ key, kind }, node): AnsweredNode => {
    const reference = against[node];
    const isReferenceHidden =
      typeof reference === "object" && reference !== null && "node" in reference && withheld[reference.node] !== null;
    const request = requestOf.get(node);
    const contrast = request === undefined || isReferenceHidden ? null : result.contrasts[request]!;
    return { key, kind, estimate: estimates[node]!, withheld: withheld[node]!, contrast };
  });
  return { designDf: result.designDf, nodes };
}

/** The worker's entry. */
export default answer;
