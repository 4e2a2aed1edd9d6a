import type { Cell, ShownCell, Table } from "../../../shared/contracts/tables.ts";
import { guardTextCell } from "../../../shared/csv.ts";
import { figureDecimals, readable } from "../../../shared/figures.ts";
import { withheldWords } from "../../../shared/reading.ts";
import type { Measure } from "./measures.ts";
import { buildPivot, type PivotColumn, type PivotRow } from "./pivot.ts";

const COLUMNS: Record<Measure | "estimate", readonly string[]> = {
  estimate: ["estimate"],
  interval: ["low", "high"],
  picture: [],
  difference: ["difference"],
  differenceInterval: ["difference low", "difference high"],
  p: ["p"],
  respondents: ["n"],
  people: ["people"],
  affected: ["affected"],
  deff: ["design effect"],
};

const rounded = (value: number | null | undefined, decimals: number) => (value == null ? "" : value.toFixed(decimals));

/** Figures as they stand in the cell, but as plain numbers that a spreadsheet reads. */
function values(cell: ShownCell, kind: Table["measure"], measure: Measure | "estimate"): string[] {
  const { comparison } = cell;
  const figure = (value: number | null | undefined, low: number | null, high: number | null) =>
    value == null ? "" : rounded(readable(kind, value), figureDecimals(kind, low, high));
  const ends = [cell.low, cell.high] as const;
  const differenceEnds = [comparison?.low ?? null, comparison?.high ?? null] as const;
  switch (measure) {
    case "estimate":
      return [figure(cell.estimate, ...ends)];
    case "interval":
      return ends.map((end) => figure(end, ...ends));
    case "picture":
      return [];
    case "difference":
      return [figure(comparison?.difference, ...differenceEnds)];
    case "differenceInterval":
      return differenceEnds.map((end) => figure(end, ...differenceEnds));
    case "p":
      return [rounded(comparison?.pAdjusted, 4)];
    case "respondents":
      return [String(cell.respondents)];
    case "people":
      return [rounded(cell.people, 0)];
    case "affected":
      return [rounded(cell.affectedPeople, 0)];
    case "deff":
      return [rounded(cell.deff, 2)];
  }
}

function columnNames(columns: readonly PivotColumn[], above: readonly string[] = []): string[] {
  return columns.flatMap((column) => {
    const path = [...above, column.label];
    return column.columns.length > 0 ? columnNames(column.columns, path) : [path.join(", ")];
  });
}

const flatten = (rows: readonly PivotRow[], above: readonly string[] = []): [string, PivotRow][] =>
  rows.flatMap((row): [string, PivotRow][] => {
    const path = [...above, row.label];
    return [[path.join(", "), row], ...flatten(row.rows, path)];
  });

/** The table as lines of tab-separated text with headers, the question above and what marks mean below. */
export function tableText(table: Table, measures: readonly Measure[]): string {
  const pivot = buildPivot(table);
  const wanted = (["estimate", ...measures] as const).filter(
    (measure) => table.question.comparison.kind !== "none" || !["difference", "differenceInterval", "p"].includes(measure),
  );
  const columns = wanted.flatMap((measure) => COLUMNS[measure]);
  const unit = table.measure === "share" ? "of every 100" : "mean";
  const names = columnNames(pivot.columns);
  const header = [
    "Group",
    ...names.flatMap((name) => columns.map((column) => `${name}: ${column === "estimate" ? unit : column}`)),
  ];
  const cellValues = (cell: Cell | undefined) => {
    if (!cell) return columns.map(() => "");
    if (!cell.shown) return columns.map((_, index) => (index === 0 ? `withheld: ${withheldWords[cell.reason]}` : ""));
    return wanted.flatMap((measure) => values(cell, table.measure, measure));
  };
  const lines = flatten([...pivot.rows, ...(pivot.total ? [pivot.total] : [])]).map(([name, row]) => [
    guardTextCell(name),
    ...pivot.leaves.flatMap((leaf) => cellValues(row.cells.get(leaf.id))),
  ]);
  return [[guardTextCell(table.caption)], header.map(guardTextCell), ...lines]
    .map((line) => line.map((text) => text.replaceAll(/[\t\r\n]+/gu, " ")).join("\t"))
    .join("\n");
}
