import type { Breakdown, Question } from "../../shared/contracts/questions.ts";
import { ruleVariables, type Rule } from "../../shared/rules.ts";
import { AppError } from "../errors.ts";
import type { CodebookVariable } from "../microdata/codebook.ts";
import { STANDARDS } from "../../shared/standards.ts";
import { weightsForBands } from "../statistics/standards.ts";
import { FALSE, TRUE, UNKNOWN, type AxisPlan, type NumberSource, type OutcomePlan, type Plan, type Test } from "./plan.ts";

/** A table of more base cells than this (missing values count as one more of each breakdown) isn't readable, nor quick. */
export const CELL_LIMIT = 20_000;

type Codebook = ReadonlyMap<string, CodebookVariable>;

/** A breakdown as readers see it. */
export interface CompiledBreakdown {
  name: string;
  label: string;
  axis: "down" | "across";
  values: { code: string; label: string }[];
}

export interface CompiledQuestion {
  plan: Plan;
  breakdowns: CompiledBreakdown[];
}

const refuse = (path: string, message: string) =>
  new AppError("invalid", `${message} Change the question and put it again.`, { [path]: message });

function lookUp(codebook: Codebook, name: string, path: string): CodebookVariable {
  const variable = codebook.get(name);
  if (!variable) throw refuse(path, `There is no variable “${name}” in this release.`);
  if (variable.kind === "text") throw refuse(path, `“${name}” holds text, which can't be counted.`);
  return variable;
}

const numberOf = (code: string) => (code.trim() === "" ? Number.NaN : Number(code));

/** The missing codes of a variable stored as numbers. */
function missingNumbers(variable: CodebookVariable): number[] {
  return variable.categories
    .filter((category) => category.isMissing)
    .map((category) => numberOf(category.code))
    .filter((value) => !Number.isNaN(value));
}

/** Truth by category position. Positions are not assumed to run without gaps. */
function codeTruth(variable: CodebookVariable, isTrue: (code: string) => boolean | null): Uint8Array {
  const size = Math.max(0, ...variable.categories.map((category) => category.position + 1));
  const truth = new Uint8Array(size).fill(UNKNOWN);
  for (const category of variable.categories) {
    if (category.isMissing) continue;
    const answer = isTrue(category.code);
    truth[category.position] = answer === null ? UNKNOWN : answer ? TRUE : FALSE;
  }
  return truth;
}

function compileRule(codebook: Codebook, rule: Rule, path: string): Test {
  if ("all" in rule) return { kind: "all", tests: rule.all.map((part, i) => compileRule(codebook, part, `${path}.all.${i}`)) };
  if ("any" in rule) return { kind: "any", tests: rule.any.map((part, i) => compileRule(codebook, part, `${path}.any.${i}`)) };
  if ("not" in rule) return { kind: "not", test: compileRule(codebook, rule.not, `${path}.not`) };
  const variable = lookUp(codebook, rule.variable, path);
  if ("in" in rule) {
    const codes = new Set(rule.in);
    if (variable.storage === "code") {
      const known = new Set(variable.categories.map((category) => category.code));
      const stranger = rule.in.find((code) => !known.has(code));
      if (stranger !== undefined) throw refuse(path, `“${variable.name}” has no code “${stranger}”.`);
      return { kind: "codes", column: variable.name, truth: codeTruth(variable, (code) => codes.has(code)) };
    }
    const values = rule.in.map(numberOf);
    if (values.some(Number.isNaN))
      throw refuse(path, `“${variable.name}” holds numbers; “${rule.in.find((code) => Number.isNaN(numberOf(code)))}” is none.`);
    return { kind: "numbers", column: variable.name, values, missing: missingNumbers(variable) };
  }
  const [low, high] = [rule.between[0] ?? -Infinity, rule.between[1] ?? Infinity];
  if (variable.storage === "number")
    return { kind: "range", column: variable.name, low, high, missing: missingNumbers(variable) };
  const inRange = (code: string) => {
    const value = numberOf(code);
    return Number.isNaN(value) ? null : value >= low && value <= high;
  };
  return { kind: "codes", column: variable.name, truth: codeTruth(variable, inRange) };
}

function numberSource(variable: CodebookVariable, path: string): NumberSource {
  if (variable.storage === "number") return { kind: "number", column: variable.name, missing: missingNumbers(variable) };
  const size = Math.max(0, ...variable.categories.map((category) => category.position + 1));
  const values = new Float64Array(size).fill(Number.NaN);
  for (const category of variable.categories) {
    if (category.isMissing) continue;
    const value = numberOf(category.code);
    if (Number.isNaN(value)) throw refuse(path, `“${variable.name}” has the code “${category.code}”, which is no number.`);
    values[category.position] = value;
  }
  return { kind: "codes", column: variable.name, values };
}

function compileOutcome(codebook: Codebook, question: Question): OutcomePlan {
  if ("rule" in question.outcome) return { measure: "share", test: compileRule(codebook, question.outcome.rule, "outcome.rule") };
  return {
    measure: "mean",
    source: numberSource(lookUp(codebook, question.outcome.variable, "outcome.variable"), "outcome.variable"),
  };
}

function compileBands(variable: CodebookVariable, bands: NonNullable<Breakdown["bands"]>, path: string) {
  const labels = bands.map(([, , label]) => label);
  if (new Set(labels).size < labels.length) throw refuse(path, "Two bands have the same label.");
  const plan: AxisPlan = {
    kind: "bands",
    values: bands.length,
    source: numberSource(variable, path),
    bands: bands.map(([from, to]) => [from ?? -Infinity, to ?? Infinity]),
  };
  return { plan, values: labels.map((label, i) => ({ code: String(i + 1), label })) };
}

/** Numbers that carry labels (0 "no", 1 "yes") split a table as categories do. */
function compileLabelledNumbers(variable: CodebookVariable, path: string) {
  const named = variable.categories.filter((category) => !category.isMissing);
  if (named.length === 0) throw refuse(path, `“${variable.name}” holds numbers: give bands to split by it.`);
  const plan: AxisPlan = {
    kind: "bands",
    values: named.length,
    source: numberSource(variable, path),
    bands: named.map((category) => [numberOf(category.code), numberOf(category.code)]),
  };
  return { plan, values: named.map(({ code, label }) => ({ code, label: label || code })) };
}

function compileAxis(variable: CodebookVariable, breakdown: Breakdown, path: string) {
  if (breakdown.bands) return compileBands(variable, breakdown.bands, path);
  if (variable.storage === "number") return compileLabelledNumbers(variable, path);
  const named = variable.categories.filter((category) => !category.isMissing);
  if (named.length === 0) throw refuse(path, `“${variable.name}” has no category to split by.`);
  const group = new Int32Array(Math.max(...variable.categories.map((category) => category.position + 1))).fill(-1);
  named.forEach((category, i) => (group[category.position] = i));
  const plan: AxisPlan = { kind: "codes", values: named.length, column: variable.name, group };
  return { plan, values: named.map(({ code, label }) => ({ code, label: label || code })) };
}

/** The axis that figures are standardised for, with its weights. */
function compileStandard(codebook: Codebook, question: Question): Plan["standard"] {
  const { standardise } = question;
  if (!standardise) return null;
  const path = "standardise.variable";
  const { plan: axis } = compileAxis(lookUp(codebook, standardise.variable, path), standardise, path);
  if ("own" in standardise.weights) {
    const { own } = standardise.weights;
    if (own.length !== axis.values)
      throw refuse("standardise.weights.own", `There are ${axis.values} groups to standardise by and ${own.length} weights.`);
    if (!own.some((weight) => weight > 0)) throw refuse("standardise.weights.own", "At least one weight must be above 0.");
    return { axis, weights: own };
  }
  const { standard: id } = standardise.weights;
  const standard = STANDARDS.find((known) => known.id === id);
  if (!standard) throw refuse("standardise.weights.standard", "There is no standard population of this name.");
  if (!standardise.bands) throw refuse("standardise.weights.standard", "A published standard needs bands of whole years of age.");
  const weights = weightsForBands(
    standard,
    standardise.bands.map(([from, to]) => ({ from: from ?? 0, to })),
  );
  if (!weights)
    throw refuse(
      "standardise.bands",
      `These bands cut through those of the standard (${standard.label}). Let them begin and end where its bands do.`,
    );
  return { axis, weights: weights.weights };
}

/** Names of every variable a question reads, each once. */
export function questionVariables(question: Question): string[] {
  const outcome = "rule" in question.outcome ? ruleVariables(question.outcome.rule) : [question.outcome.variable];
  const among = question.among ? ruleVariables(question.among) : [];
  const breakdowns = [...question.down, ...question.across].map((breakdown) => breakdown.variable);
  const further = [
    ...(question.standardise ? [question.standardise.variable] : []),
    ...question.adjustFor.map(({ variable }) => variable),
  ];
  return [...new Set([...outcome, ...among, ...breakdowns, ...further])];
}

/**
 * Turns a question into columns, tests and groupings over a release's codebook.
 * @throws {AppError} `invalid`, naming the part of the question that doesn't fit the codebook.
 */
export function compileQuestion(question: Question, variables: readonly CodebookVariable[]): CompiledQuestion {
  const codebook: Codebook = new Map(variables.map((variable) => [variable.name, variable]));
  const breakdowns: CompiledBreakdown[] = [];
  const axes: AxisPlan[] = [];
  for (const axis of ["down", "across"] as const) {
    question[axis].forEach((breakdown, i) => {
      const path = `${axis}.${i}`;
      const variable = lookUp(codebook, breakdown.variable, path);
      const { plan, values } = compileAxis(variable, breakdown, path);
      axes.push(plan);
      breakdowns.push({ name: variable.name, label: variable.label || variable.name, axis, values });
    });
  }
  const standard = compileStandard(codebook, question);
  const covariates = question.adjustFor.map((breakdown, i) => {
    const path = `adjustFor.${i}`;
    return compileAxis(lookUp(codebook, breakdown.variable, path), breakdown, path).plan;
  });
  const cells = [...axes, ...(standard ? [standard.axis] : []), ...covariates].reduce(
    (product, axis) => product * (axis.values + 1),
    1,
  );
  if (cells > CELL_LIMIT)
    throw refuse(
      "down",
      `That makes ${cells.toLocaleString("en-GB")} cells; at most ${CELL_LIMIT.toLocaleString("en-GB")} fit a table.`,
    );
  checkReferenceGroup(question, breakdowns);
  const outcome = compileOutcome(codebook, question);
  const among = question.among ? compileRule(codebook, question.among, "among") : null;
  const quantile = "variable" in question.outcome ? (question.outcome.quantile ?? null) : null;
  return { plan: { columns: questionVariables(question), among, outcome, axes, standard, covariates, quantile }, breakdowns };
}

function checkReferenceGroup(question: Question, breakdowns: readonly CompiledBreakdown[]): void {
  const { comparison } = question;
  if (comparison.kind !== "group") return;
  const breakdown = breakdowns.find(({ name }) => name === comparison.breakdown);
  if (!breakdown?.values.some(({ code }) => code === comparison.value)) {
    throw refuse("comparison.value", `“${comparison.breakdown}” has no group “${comparison.value}” to compare with.`);
  }
}
