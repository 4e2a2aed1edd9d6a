import type { Cell } from "../../../shared/contracts/tables.ts";

/** What rows can be put in order by; the clicked column says of which group. */
export const SORT_MEASURES = ["estimate", "low", "high", "difference", "p", "respondents", "people", "affected", "deff"] as const;
export type SortMeasure = (typeof SORT_MEASURES)[number];

export const sortLabels: Record<SortMeasure, string> = {
  estimate: "Estimate",
  low: "Low end of the interval",
  high: "High end of the interval",
  difference: "Difference",
  p: "p of the difference",
  respondents: "Respondents",
  people: "People in the group",
  affected: "People affected",
  deff: "Design effect",
};

/** The number a cell is put in order by; undefined, and so last, where it is withheld or has none. */
export function sortValue(cell: Cell | undefined, measure: SortMeasure): number | undefined {
  if (!cell?.shown) return undefined;
  const { comparison } = cell;
  const value = {
    estimate: cell.estimate,
    low: cell.low,
    high: cell.high,
    difference: comparison?.difference,
    p: comparison?.pAdjusted,
    respondents: cell.respondents,
    people: cell.people,
    affected: cell.affectedPeople,
    deff: cell.deff,
  }[measure];
  return value ?? undefined;
}
