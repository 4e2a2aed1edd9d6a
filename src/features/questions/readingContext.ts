import type { Table } from "../../../shared/contracts/tables.ts";
import type { ReadingContext } from "../../../shared/reading.ts";
import {
  averageWords,
  comparisonWords,
  correctionWords,
  joinWords,
  outcomeWords,
  ruleWords,
  type NamedVariable,
} from "../../../shared/wording.ts";
import { groupParts } from "./pivot.ts";

/** Whom a cell is about: what the question asks of people, and what the cell's own row and column add. */
function groupWords(table: Table, key: readonly (string | null)[], variables: readonly NamedVariable[]): string {
  const { among } = table.question;
  const conditions = among ? ("all" in among ? among.all : [among]).map((rule) => ruleWords(rule, variables)) : [];
  const parts = groupParts(table, key).map(({ breakdown, value }) => `${breakdown}: ${value}`);
  const all = [...conditions, ...parts];
  return all.length > 0 ? `people with ${joinWords(all, "and")}` : "people";
}

/** The wave that groups are compared with, for the words of the comparison. */
export const comparedWaves = ({ compared }: Pick<Table, "compared">): ReadonlyMap<string, string> =>
  new Map(compared ? [[compared.id, compared.wave]] : []);

/** What the sentences about a cell need to know. */
export function readingContext(
  table: Table,
  key: readonly (string | null)[],
  variables: readonly NamedVariable[],
): ReadingContext {
  const { outcome, comparison, down, across } = table.question;
  return {
    kind: table.measure,
    group: groupWords(table, key, variables),
    outcome: outcomeWords(outcome, variables),
    average: averageWords(outcome),
    correction: correctionWords(table.question, variables),
    comparison,
    isAdjusted: table.question.adjustment !== "none",
    reference: comparisonWords(comparison, variables, [...down, ...across], table.measure === "mean", comparedWaves(table)),
  };
}
