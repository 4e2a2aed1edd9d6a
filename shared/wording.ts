import type { Breakdown, Comparison, Outcome, Question } from "./contracts/questions.ts";
import type { Rule } from "./rules.ts";

/** What wording needs to know of a variable; codebooks of both sides fit. */
export interface NamedVariable {
  name: string;
  label: string;
  categories: readonly { code: string; label: string }[];
}

/** Where a question is put, and the words for its variables. */
export interface WordingContext {
  surveyTitle: string;
  wave: string;
  variables: readonly NamedVariable[];
  /** Waves of other releases of the survey by id, for comparisons with them. */
  waves?: ReadonlyMap<string, string>;
}

type Variables = WordingContext["variables"];

const find = (variables: Variables, name: string) => variables.find((variable) => variable.name === name);

/** A variable's label, or its name where it has none. */
export function variableLabel(variables: Variables, name: string): string {
  return find(variables, name)?.label || name;
}

/** A code's label, or the code itself where it has none. */
export function codeLabel(variables: Variables, name: string, code: string): string {
  return find(variables, name)?.categories.find((category) => category.code === code)?.label || code;
}

/** Words joined with commas and a last word, such as “a, b or c”. */
export function joinWords(words: readonly string[], last: "and" | "or"): string {
  if (words.length < 2) return words.join("");
  return `${words.slice(0, -1).join(", ")} ${last} ${words.at(-1) ?? ""}`;
}

function rangeWords([low, high]: readonly [number | null, number | null]): string {
  if (low === null) return `at most ${high ?? ""}`;
  if (high === null) return `at least ${low}`;
  return low === high ? String(low) : `${low} to ${high}`;
}

/** A rule in words: “Smoking now: Daily”, “Age in years: 18 to 44”, parts joined by “and”, “or”, “not”. */
export function ruleWords(rule: Rule, variables: Variables): string {
  if ("in" in rule) {
    const codes = rule.in.map((code) => codeLabel(variables, rule.variable, code));
    return `${variableLabel(variables, rule.variable)}: ${joinWords(codes, "or")}`;
  }
  if ("between" in rule) return `${variableLabel(variables, rule.variable)}: ${rangeWords(rule.between)}`;
  if ("not" in rule) return `not (${ruleWords(rule.not, variables)})`;
  const parts = "all" in rule ? rule.all : rule.any;
  const words = parts.map((part) =>
    "all" in part || "any" in part ? `(${ruleWords(part, variables)})` : ruleWords(part, variables),
  );
  return words.join("all" in rule ? " and " : " or ");
}

/** Whom a question is about. */
export function populationWords(among: Rule | undefined, variables: Variables): string {
  return among ? `people with ${ruleWords(among, variables)}` : "people";
}

const ORDINALS: Record<number, string> = { 0.25: "lower quartile", 0.5: "median", 0.75: "upper quartile" };

/** What is worked out of a numeric outcome: “mean”, “median”, “90th percentile”. */
export function averageWords(outcome: Outcome): string {
  if ("rule" in outcome || outcome.quantile === undefined) return "mean";
  return ORDINALS[outcome.quantile] ?? `${Number((100 * outcome.quantile).toPrecision(6))}th percentile`;
}

/** What figures are standardised or adjusted for; null where they are crude. */
export function correctionWords(
  { standardise, adjustFor }: Pick<Question, "standardise" | "adjustFor">,
  variables: Variables,
): string | null {
  if (standardise) return `Standardised for ${breakdownWords([standardise], variables)}.`;
  return adjustFor.length > 0 ? `Adjusted for ${breakdownWords(adjustFor, variables)}.` : null;
}

/** What is counted, or what is averaged. */
export function outcomeWords(outcome: Outcome, variables: Variables): string {
  return "rule" in outcome ? ruleWords(outcome.rule, variables) : variableLabel(variables, outcome.variable);
}

/** What a table is split by along one side; empty where it isn't. */
export function breakdownWords(breakdowns: readonly Pick<Breakdown, "variable" | "bands">[], variables: Variables): string {
  return joinWords(
    breakdowns.map(({ variable, bands }) => `${variableLabel(variables, variable)}${bands ? " in bands" : ""}`),
    "and",
  );
}

/** What each group is compared with; null where nothing is. */
export function comparisonWords(
  comparison: Comparison,
  variables: Variables,
  breakdowns: readonly Breakdown[],
  isMean: boolean,
  waves: ReadonlyMap<string, string> = new Map(),
): string | null {
  if (comparison.kind === "none") return null;
  if (comparison.kind === "rest") return "the rest";
  if (comparison.kind === "all") return "everyone";
  if (comparison.kind === "release") return `the same in ${waves.get(comparison.releaseId) ?? "another wave"}`;
  if (comparison.kind === "target")
    return isMean ? `the value ${comparison.value}` : `${Number((100 * comparison.value).toPrecision(10))} of every 100`;
  const bands = breakdowns.find(({ variable }) => variable === comparison.breakdown)?.bands;
  const group = bands
    ? (bands[Number(comparison.value) - 1]?.[2] ?? comparison.value)
    : codeLabel(variables, comparison.breakdown, comparison.value);
  return `${variableLabel(variables, comparison.breakdown)}: ${group}`;
}

/** A question as the sentences of the question line, as they stand in titles, captions, exports and the ledger. */
export function questionSentence(question: Question, { surveyTitle, wave, variables, waves }: WordingContext): string {
  const isMean = "variable" in question.outcome;
  const population = populationWords(question.among, variables);
  const outcome = outcomeWords(question.outcome, variables);
  const asked = isMean
    ? `In ${surveyTitle}, ${wave}, among ${population}, what is the ${averageWords(question.outcome)} of ${outcome}?`
    : `In ${surveyTitle}, ${wave}, of every 100 ${population}, how many have ${outcome}?`;
  const down = breakdownWords(question.down, variables);
  const across = breakdownWords(question.across, variables);
  const sides = [down && `${down} down`, across && `${across} across`].filter((side) => side !== "");
  const split = sides.length > 0 ? ` Split by ${sides.join(" and ")}.` : "";
  const reference = comparisonWords(question.comparison, variables, [...question.down, ...question.across], isMean, waves);
  const corrected = correctionWords(question, variables);
  return [`${asked}${split}`, reference && `Compared with ${reference}.`, corrected].filter((part) => part !== null).join(" ");
}
