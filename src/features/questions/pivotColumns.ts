import {
  createExpandedRowModel,
  createSortedRowModel,
  rowExpandingFeature,
  rowSortingFeature,
  sortFn_basic,
  tableFeatures,
  type ColumnDef,
} from "@tanstack/react-table";
import type { Pivot, PivotColumn, PivotRow } from "./pivot.ts";
import { sortValue, type SortMeasure } from "./sorting.ts";

export const pivotFeatures = tableFeatures({
  rowSortingFeature,
  sortedRowModel: createSortedRowModel(),
  sortFns: { basic: sortFn_basic },
  rowExpandingFeature,
  expandedRowModel: createExpandedRowModel(),
});
type Column = ColumnDef<typeof pivotFeatures, PivotRow>;

export const GROUP_COLUMN = "group";

/** The table's columns: the groups, then figures in order by the chosen measure. */
export function pivotColumns({ columns }: Pivot, rowHeading: string, measure: SortMeasure): Column[] {
  const figures = (column: PivotColumn): Column =>
    column.columns.length > 0
      ? { id: column.id, header: column.label, columns: column.columns.map(figures) }
      : {
          id: column.id,
          header: column.label,
          accessorFn: (row) => sortValue(row.cells.get(column.id), measure),
          sortFn: "basic",
          sortUndefined: "last",
          sortDescFirst: true,
        };
  const groups: Column = { id: GROUP_COLUMN, header: rowHeading, accessorFn: ({ label }) => label, enableSorting: false };
  return [groups, ...columns.map(figures)];
}
