import type { DisclosureMinimums } from "../../shared/contracts/design.ts";
import type { Question } from "../../shared/contracts/questions.ts";
import type { OverallResult } from "../../shared/contracts/tables.ts";
import {
  estimateTargets,
  type ContrastEstimate,
  type ContrastRequest,
  type Target,
  type TargetEstimate,
} from "../statistics/estimate.ts";
import type { Assignment, Sample } from "../statistics/types.ts";
import { assign, codesOf, type Columns } from "./assign.ts";
import { isTooFew, type Counts } from "./disclosure/counts.ts";
import { suppress, type Withholding } from "./disclosure/suppress.ts";
import { figuresOf } from "./figures.ts";
import { overallOf, type OverallInput } from "./overall.ts";
import { comparisonsOf, tableShape, type TableNode } from "./nodes.ts";
import type { Plan } from "./plan.ts";
import { besideEachOther, type OtherWave } from "./waves.ts";

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
  /** What is asked of the table as a whole, and the score of each of its groups, for a single breakdown. */
  overall: Question["overall"];
  scores: number[];
  /** Another release to compare with. */
  other: OtherWave | null;
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
  /** Empty too where a cell is withheld: what is said of all groups together could give it away. */
  overall: OverallResult[];
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
  const tableCells = work.plan.axes.reduce((product, axis) => product * (axis.values + 1), 1);
  let everyone: number | null = null;
  const against = comparisonsOf(shape, work.options.comparison, work.groupAxis, work.groupValue);
  against.forEach((reference, node) => {
    if (reference === null) return;
    requestOf.set(node, requests.length);
    if (reference === "rest") {
      requests.push({ of: node, from: targets.length });
      targets.push({ cells: complement(shape.nodes[node]!.cells, grouped) });
    } else if (reference === "other") {
      requests.push({ of: node, from: targets.length });
      targets.push({ cells: shape.nodes[node]!.cells.map((cell) => cell + tableCells) });
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
  const rows = work.sample.weight.length;
  const covariates = work.plan.covariates.map((axis) => ({ codes: codesOf(axis, work.columns, rows), levels: axis.values }));
  const both = work.other ? besideEachOther(work.sample, assignment, work.other) : { sample: work.sample, assignment };
  const result = figuresOf({
    ...both,
    targets,
    contrasts: requests,
    options: { level, interval, difference, isBinary },
    standard: work.plan.standard?.weights ?? null,
    covariates,
    levels: levelsOf(shape.nodes),
    quantile: work.plan.quantile,
  });
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
  const ofOther = work.other ? result.targets.slice(shape.nodes.length).map(countsOf) : [];
  const withheldInOther = work.other?.minimums
    ? await suppress({ counts: ofOther, lines: shape.lines }, work.other.minimums)
    : null;
  /** Whether what a figure is set against may not be shown: a withheld cell, or others too few by themselves. */
  const isHidden = (from: ContrastRequest["from"]) => {
    if (typeof from !== "number" || work.minimums === null) return false;
    if (from < shape.nodes.length) return withheld[from] !== null;
    if (withheldInOther) return withheldInOther[from - shape.nodes.length] !== null;
    return isTooFew(countsOf(result.targets[from]!), work.minimums);
  };
  const nodes = shape.nodes.map(({ key, kind }, node): AnsweredNode => {
    const request = requestOf.get(node);
    const contrast = request === undefined || isHidden(requests[request]!.from) ? null : result.contrasts[request]!;
    return { key, kind, estimate: estimates[node]!, withheld: withheld[node]!, contrast };
  });
  const isAnyHidden = nodes.some(({ withheld: reason }) => reason === "too-few" || reason === "protects-another");
  const overall = isAnyHidden || work.overall.length === 0 ? [] : overallOf(overallInput(work, shape.nodes, assignment));
  const designDf = work.other
    ? estimateTargets(work.sample, assignment, [], [], { level, interval, difference, isBinary }).designDf
    : result.designDf;
  return { designDf, nodes, overall };
}

/** Figures that together split everyone into groups: those with values on the same axes. */
function levelsOf(nodes: readonly TableNode[]): number[][] {
  const levels = new Map<string, number[]>();
  nodes.forEach(({ key }, node) => {
    const pattern = key.map((value) => (value === null ? "*" : "x")).join("");
    levels.set(pattern, [...(levels.get(pattern) ?? []), node]);
  });
  return [...levels.values()];
}

/** The table's groups as cells of their own, whatever else splits the base cells. */
function overallInput(work: Work, nodes: readonly TableNode[], assignment: Assignment): OverallInput {
  const groups = nodes.filter(({ kind }) => kind === "cell");
  const slots = work.plan.standard ? work.plan.standard.weights.length + 1 : 1;
  const groupOf = new Int32Array(assignment.cells).fill(-1);
  groups.forEach(({ cells }, group) => {
    for (const cell of cells) groupOf.fill(group, cell * slots, (cell + 1) * slots);
  });
  return {
    sample: work.sample,
    assignment: { ...assignment, cells: groups.length, cell: assignment.cell.map((cell) => (cell < 0 ? -1 : groupOf[cell]!)) },
    kinds: work.overall,
    level: work.options.level,
    scores: work.scores,
    reference: work.groupValue,
  };
}

/** Failures that tell the reader something. An error loses its name on the way between threads, so they travel as answers. */
const HONEST = new Set(["DesignError", "SparseTableError", "SeparationError", "SingularFitError"]);

/** What a worker sends back: the answer, or why there can be none. */
export type Outcome = { answer: Answer } | { refusal: string };

/** The worker's entry. */
export default async function run(work: Work): Promise<Outcome> {
  try {
    return { answer: await answer(work) };
  } catch (error) {
    if (error instanceof Error && HONEST.has(error.name)) return { refusal: error.message };
    throw error;
  }
}
