import type { Cell, Table } from "../../../shared/contracts/tables.ts";
import {
  figureDecimals,
  formatDifference,
  formatDifferenceInterval,
  formatFigure,
  formatInterval,
  readable,
} from "../../../shared/figures.ts";
import { directionMarks, withheldWords } from "../../../shared/reading.ts";
import type { ForestRow } from "../../charts/forestLayout.ts";
import { cellId, cellsById, groupName } from "./pivot.ts";
import { reliabilityWords } from "./reliabilityWords.ts";

const withInterval = (value: string, interval: string | null) => (interval ? `${value} (${interval})` : value);

/** The groups of a plot: every cell of the table, everyone last. A group's last value is its label, those before its heading. */
function placed(table: Table): { cell: Cell; id: string; heading: string | null; label: string }[] {
  const byId = cellsById(table);
  const cells = table.cells.map((cell) => {
    const names = table.breakdowns.map(({ values }, index) => {
      const code = cell.key[index] ?? null;
      return values.find((value) => value.code === code)?.label ?? code ?? "";
    });
    const label = names.at(-1) ?? "Everyone";
    return { cell, id: cellId(cell.key), heading: names.length > 1 ? names.slice(0, -1).join(", ") : null, label };
  });
  const wholeId = cellId(table.breakdowns.map(() => null));
  const whole = byId.get(wholeId) ?? table.whole;
  const everyone = { cell: whole, id: wholeId, heading: table.breakdowns.length > 1 ? "Everyone" : null, label: "Everyone" };
  return [...cells, { ...everyone, label: table.breakdowns.length > 1 ? "All together" : "Everyone" }];
}

const nothing = (cell: Cell): Pick<ForestRow, "value" | "low" | "high" | "reference" | "tone" | "figures"> => ({
  value: null,
  low: null,
  high: null,
  reference: null,
  tone: "plain",
  figures: cell.shown
    ? "can't be worked out"
    : cell.reason === "empty"
      ? withheldWords.empty
      : `withheld: ${withheldWords[cell.reason]}`,
});

/** Rows of the interval plot: estimates, and what each is compared with as its dashed line. */
export function intervalRows(table: Table): ForestRow[] {
  const kind = table.measure;
  const scaled = (value: number | null) => (value === null ? null : readable(kind, value));
  return placed(table).map(({ cell, id, heading, label }) => {
    if (!cell.shown || cell.estimate === null) return { id, heading, label, ...nothing(cell) };
    const { estimate, low, high, comparison } = cell;
    const figures = withInterval(formatFigure(kind, estimate, figureDecimals(kind, low, high)), formatInterval(kind, low, high));
    return {
      id,
      heading,
      label: `${label}${reliabilityWords(cell)}`,
      value: scaled(estimate),
      low: scaled(low),
      high: scaled(high),
      reference: scaled(comparison?.reference ?? null),
      tone: comparison?.direction ?? "plain",
      figures,
    };
  });
}

/** Rows of the difference plot: differences around nothing, for groups that have one. */
export function differenceRows(table: Table): ForestRow[] {
  const kind = table.measure;
  const scaled = (value: number | null) => (value === null ? null : readable(kind, value));
  return placed(table)
    .filter(({ cell }) => !cell.shown || cell.comparison !== undefined)
    .map(({ cell, id, heading, label }) => {
      const comparison = cell.shown ? cell.comparison : undefined;
      if (!cell.shown || !comparison || comparison.difference === null) return { id, heading, label, ...nothing(cell) };
      const { difference, low, high, direction } = comparison;
      const size = formatDifference(kind, difference, figureDecimals(kind, low, high));
      return {
        id,
        heading,
        label: `${label}${reliabilityWords(cell)}`,
        value: scaled(difference),
        low: scaled(low),
        high: scaled(high),
        reference: null,
        tone: direction,
        figures: `${directionMarks[direction].mark} ${withInterval(size, formatDifferenceInterval(kind, low, high))}`,
      };
    });
}

/** The same groups for the table beside a plot. */
export function figureTable(table: Table, rows: readonly ForestRow[]): string[][] {
  const byId = cellsById(table);
  return rows.map(({ id, figures }) => {
    const cell = byId.get(id);
    const name = cell ? groupName(table, cell.key) : "";
    return [name, figures, cell?.shown ? String(cell.respondents) : "", cell?.shown ? cell.reliability.verdict : ""];
  });
}
