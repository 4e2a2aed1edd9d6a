import type { KeyboardEvent } from "react";

const STEPS: Record<string, (row: number, column: number) => [number, number]> = {
  ArrowUp: (row, column) => [row - 1, column],
  ArrowDown: (row, column) => [row + 1, column],
  ArrowLeft: (row, column) => [row, column - 1],
  ArrowRight: (row, column) => [row, column + 1],
  Home: (row) => [row, 0],
  End: (row) => [row, Infinity],
};

const clamp = (value: number, most: number) => Math.min(Math.max(value, 0), most);

/** Arrows, Home and End move the focus from cell to cell of a grid (WAI-ARIA); the first and last rows with Control. */
export function moveInGrid(event: KeyboardEvent<HTMLTableElement>): void {
  const step = STEPS[event.key];
  if (!step || !(event.target instanceof HTMLElement) || event.target.getAttribute("role") !== "gridcell") return;
  const rows = [...event.currentTarget.querySelectorAll("tr")]
    .map((row) => [...row.querySelectorAll<HTMLElement>("[role=gridcell]")])
    .filter((cells) => cells.length > 0);
  const row = rows.findIndex((cells) => cells.some((cell) => cell === event.target));
  const column = rows[row]?.findIndex((cell) => cell === event.target) ?? 0;
  const [toRow, toColumn] = step(row, column);
  const edge = event.ctrlKey && event.key === "Home" ? 0 : event.ctrlKey && event.key === "End" ? rows.length - 1 : toRow;
  const cells = rows[clamp(edge, rows.length - 1)] ?? [];
  const next = cells[clamp(toColumn, cells.length - 1)];
  event.preventDefault();
  next?.focus();
  next?.scrollIntoView({ block: "nearest", inline: "nearest" });
}
