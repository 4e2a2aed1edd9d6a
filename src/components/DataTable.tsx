import { useTable, type RowData, type SortingState } from "@tanstack/react-table";
import { ArrowDown, ArrowUp } from "lucide-react";
import { features, type Columns } from "./tableFeatures.ts";

export interface DataTableProps<Row extends RowData> {
  /** What the table holds; read out, and the name of the region that scrolls. */
  caption: string;
  columns: Columns<Row>;
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  initialSort?: SortingState;
  /** Columns whose values stand at the right, such as numbers. */
  alignRight?: readonly string[];
}

/** Rows under sortable headers; scrolls sideways in itself where the window is narrow. */
export function DataTable<Row extends RowData>({
  caption,
  columns,
  rows,
  rowKey,
  initialSort = [],
  alignRight = [],
}: DataTableProps<Row>) {
  const table = useTable({
    features,
    columns,
    data: rows,
    getRowId: rowKey,
    initialState: { sorting: initialSort },
  });
  const side = (columnId: string) => (alignRight.includes(columnId) ? "text-right" : "text-left");
  return (
    <div role="region" aria-label={caption} tabIndex={0} className="relative -mx-4 overflow-x-auto px-4 sm:mx-0 sm:px-0">
      <table className="w-full border-collapse text-table">
        <caption className="sr-only">{caption}</caption>
        <thead>
          {table.getHeaderGroups().map((group) => (
            <tr key={group.id} className="border-b border-ink">
              {group.headers.map((header) => {
                const sorted = header.column.getIsSorted();
                const Arrow = sorted === "desc" ? ArrowDown : ArrowUp;
                return (
                  <th
                    key={header.id}
                    scope="col"
                    aria-sort={sorted === "asc" ? "ascending" : sorted === "desc" ? "descending" : undefined}
                    className={`py-2 pr-6 align-bottom font-semibold last:pr-0 ${side(header.column.id)}`}
                  >
                    {header.column.getCanSort() ? (
                      <button
                        type="button"
                        onClick={header.column.getToggleSortingHandler()}
                        className={`group inline-flex min-h-6 items-center gap-1 text-left font-semibold hover:text-action ${alignRight.includes(header.column.id) ? "flex-row-reverse" : ""}`}
                      >
                        <table.FlexRender header={header} />
                        <Arrow
                          aria-hidden="true"
                          className={`size-3.5 ${sorted ? "" : "opacity-0 group-hover:opacity-50 group-focus:opacity-50"}`}
                        />
                      </button>
                    ) : (
                      <table.FlexRender header={header} />
                    )}
                  </th>
                );
              })}
            </tr>
          ))}
        </thead>
        <tbody>
          {table.getRowModel().rows.map((row) => (
            <tr key={row.id} className="border-b border-line">
              {row.getAllCells().map((cell) => (
                <td key={cell.id} className={`py-2 pr-6 align-baseline last:pr-0 ${side(cell.column.id)}`}>
                  <table.FlexRender cell={cell} />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
