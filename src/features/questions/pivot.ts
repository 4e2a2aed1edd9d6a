import type { Cell, ShownCell, Table } from "../../../shared/contracts/tables.ts";

/** Codes of a place in the table, null for everyone; as text, so that it can name a place. */
export type CellId = string;
export const cellId = (key: readonly (string | null)[]): CellId => JSON.stringify(key);

export interface PivotColumn {
  id: string;
  /** Codes of the across breakdowns, null where it is a total. */
  codes: (string | null)[];
  label: string;
  isTotal: boolean;
  /** Narrower columns under it; empty for a column of figures. */
  columns: PivotColumn[];
}

export interface PivotRow {
  id: string;
  codes: (string | null)[];
  label: string;
  depth: number;
  /** Cells by column id. */
  cells: Map<string, Cell>;
  rows: PivotRow[];
}

export interface Pivot {
  columns: PivotColumn[];
  /** Columns that hold figures, from left to right. */
  leaves: PivotColumn[];
  rows: PivotRow[];
  /** Everyone, by column; null where nothing splits the table down. */
  total: PivotRow | null;
}

type BreakdownValues = Table["breakdowns"][number];

const padded = (codes: readonly (string | null)[], length: number) => [
  ...codes,
  ...Array<null>(length - codes.length).fill(null),
];

const known = new WeakMap<Table, Map<CellId, Cell>>();

/** Every cell of a table by its place, margins and the whole among them; built once for each table. */
export function cellsById(table: Table): Map<CellId, Cell> {
  const built = known.get(table) ?? indexCells(table);
  known.set(table, built);
  return built;
}

function indexCells(table: Table): Map<CellId, Cell> {
  const whole = { ...table.whole, key: table.breakdowns.map(() => null) };
  return new Map([whole, ...table.margins, ...table.cells].map((cell) => [cellId(cell.key), cell]));
}

function buildColumns(across: readonly BreakdownValues[], prefix: string[] = []): PivotColumn[] {
  const [breakdown] = across.slice(prefix.length);
  const isLast = prefix.length + 1 >= across.length;
  const total: PivotColumn = {
    id: `column ${cellId(padded(prefix, across.length))}`,
    codes: padded(prefix, across.length),
    label: prefix.length === 0 ? "Everyone" : "All",
    isTotal: across.length > 0,
    columns: [],
  };
  if (!breakdown) return [total];
  const parts = breakdown.values.map(({ code, label }): PivotColumn => {
    const codes = [...prefix, code];
    return {
      id: `${isLast ? "column" : "group"} ${cellId(padded(codes, across.length))}`,
      codes: padded(codes, across.length),
      label,
      isTotal: false,
      columns: isLast ? [] : buildColumns(across, codes),
    };
  });
  return [...parts, total];
}

const leavesOf = (columns: readonly PivotColumn[]): PivotColumn[] =>
  columns.flatMap((column) => (column.columns.length > 0 ? leavesOf(column.columns) : [column]));

/** Lays a table out: rows as a tree with subtotals on the upper rows, columns nested, totals at the right and below. */
export function buildPivot(table: Table): Pivot {
  const down = table.breakdowns.filter(({ axis }) => axis === "down");
  const across = table.breakdowns.filter(({ axis }) => axis === "across");
  const byId = cellsById(table);
  const columns = buildColumns(across);
  const leaves = leavesOf(columns);
  const rowOf = (prefix: string[], label: string): PivotRow => {
    const codes = padded(prefix, down.length);
    const cells = leaves.flatMap((leaf): [string, Cell][] => {
      const cell = byId.get(cellId([...codes, ...leaf.codes]));
      return cell ? [[leaf.id, cell]] : [];
    });
    return { id: cellId(codes), codes, label, depth: Math.max(0, prefix.length - 1), cells: new Map(cells), rows: [] };
  };
  const rowsUnder = (prefix: string[]): PivotRow[] =>
    (down[prefix.length]?.values ?? []).map(({ code, label }) => ({
      ...rowOf([...prefix, code], label),
      rows: rowsUnder([...prefix, code]),
    }));
  const everyone = rowOf([], "Everyone");
  return down.length === 0
    ? { columns, leaves, rows: [everyone], total: null }
    : { columns, leaves, rows: rowsUnder([]), total: everyone };
}

/** The values that make a group, such as “Men” and “35–44”, each with its breakdown; empty for everyone. */
export function groupParts(table: Table, key: readonly (string | null)[]): { breakdown: string; value: string }[] {
  return table.breakdowns.flatMap(({ label, name, values }, index) => {
    const code = key[index] ?? null;
    if (code === null) return [];
    return [{ breakdown: label || name, value: values.find((value) => value.code === code)?.label ?? code }];
  });
}

/** A group's name for headings and marks: “35–44, Men”. */
export const groupName = (table: Table, key: readonly (string | null)[]): string =>
  groupParts(table, key)
    .map(({ value }) => value)
    .join(", ") || "Everyone";

/** Ends of the one scale that all drawn intervals share. A share's begins at nothing; both are null where nothing is shown. */
export function sharedExtent(table: Table): [number, number] | null {
  const shown = [table.whole, ...table.cells, ...table.margins].filter((cell): cell is ShownCell => cell.shown);
  const ends = shown
    .flatMap((cell) => [cell.estimate, cell.low, cell.high, cell.comparison?.reference ?? null])
    .filter((value) => value !== null);
  if (ends.length === 0) return null;
  const [lowest, highest] = [Math.min(...ends), Math.max(...ends)];
  const from = table.measure === "share" ? 0 : lowest;
  return highest > from ? [from, highest] : [from, from + 1];
}
