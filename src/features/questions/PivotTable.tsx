import { useTable, type ExpandedState, type Row, type SortingState } from "@tanstack/react-table";
import { ArrowDown, ArrowUp, ChevronDown, ChevronRight } from "lucide-react";
import { useMemo, useState } from "react";
import type { Table } from "../../../shared/contracts/tables.ts";
import { cellIdOf, FigureCells } from "./FigureCells.tsx";
import { moveInGrid } from "./gridKeys.ts";
import type { Measure } from "./measures.ts";
import { buildPivot, groupName, sharedExtent, type CellId, type PivotRow } from "./pivot.ts";
import { GROUP_COLUMN, pivotColumns, pivotFeatures } from "./pivotColumns.ts";
import type { SortMeasure } from "./sorting.ts";

export interface PivotTableProps {
  table: Table;
  measures: readonly Measure[];
  sortMeasure: SortMeasure;
  selected: CellId;
  onSelect: (id: CellId) => void;
}

const STICKY = "sticky left-0 z-1 bg-paper pr-3 pl-4 sm:pr-4 sm:pl-0 print:bg-transparent";

/** Groups down the side, groups across the top, totals at the edges; a cell that is chosen is read out beside the table. */
export function PivotTable({ table, measures, sortMeasure, selected, onSelect }: PivotTableProps) {
  const pivot = useMemo(() => buildPivot(table), [table]);
  const extent = useMemo(() => sharedExtent(table), [table]);
  const down = table.breakdowns.filter(({ axis }) => axis === "down");
  const heading = down.map(({ label, name }) => label || name).join(" › ") || "Group";
  const columns = useMemo(() => pivotColumns(pivot, heading, sortMeasure), [pivot, heading, sortMeasure]);
  const [sorting, setSorting] = useState<SortingState>([]);
  const [expanded, setExpanded] = useState<ExpandedState>(true);
  const grid = useTable({
    features: pivotFeatures,
    columns,
    data: pivot.rows,
    getRowId: (row) => row.id,
    getSubRows: (row) => row.rows,
    state: { sorting, expanded },
    onSortingChange: setSorting,
    onExpandedChange: setExpanded,
  });

  const figures = (row: PivotRow, isTotalRow: boolean) => (
    <FigureCells
      row={row}
      leaves={pivot.leaves}
      isTotalRow={isTotalRow}
      kind={table.measure}
      measures={measures}
      extent={extent}
      selected={pivot.leaves.some((leaf) => cellIdOf(row, leaf) === selected) ? selected : null}
      onSelect={onSelect}
    />
  );

  return (
    <div className="relative -mx-4 overflow-x-auto sm:mx-0">
      <table
        role="grid"
        onKeyDown={moveInGrid}
        className="w-full border-collapse text-table"
        style={{ maxWidth: `${14 + pivot.leaves.length * 17}rem` }}
      >
        <caption className="sr-only">{table.caption}</caption>
        <thead>
          {grid.getHeaderGroups().map((group) => (
            <tr key={group.id} className="last:border-b last:border-ink">
              {group.headers.map((header) => {
                const isGroup = header.column.id === GROUP_COLUMN;
                if (header.isPlaceholder)
                  return <td key={header.id} colSpan={header.colSpan} className={isGroup ? STICKY : undefined} />;
                const sorted = header.column.getIsSorted();
                const Arrow = sorted === "asc" ? ArrowUp : ArrowDown;
                return (
                  <th
                    key={header.id}
                    scope={header.subHeaders.length > 0 ? "colgroup" : "col"}
                    colSpan={header.colSpan}
                    aria-sort={sorted === "asc" ? "ascending" : sorted === "desc" ? "descending" : undefined}
                    className={`py-2 text-left align-bottom font-semibold ${isGroup ? STICKY : "px-3"} ${header.subHeaders.length > 0 ? "border-b border-line" : ""}`}
                  >
                    {header.column.getCanSort() ? (
                      <button
                        type="button"
                        onClick={header.column.getToggleSortingHandler()}
                        className="group inline-flex min-h-6 items-center gap-1 text-left font-semibold hover:text-action"
                      >
                        <grid.FlexRender header={header} />
                        <Arrow
                          aria-hidden="true"
                          className={`size-3.5 shrink-0 ${sorted ? "" : "opacity-0 group-hover:opacity-50 group-focus:opacity-50"}`}
                        />
                      </button>
                    ) : (
                      <span className={header.subHeaders.length > 0 ? "sticky left-28 sm:left-44" : undefined}>
                        <grid.FlexRender header={header} />
                      </span>
                    )}
                  </th>
                );
              })}
            </tr>
          ))}
        </thead>
        <tbody>
          {grid.getRowModel().rows.map((row) => (
            <tr key={row.id} className="border-b border-line">
              <RowHeading row={row} name={groupName(table, row.original.codes)} />
              {figures(row.original, false)}
            </tr>
          ))}
        </tbody>
        {pivot.total && (
          <tfoot>
            <tr className="border-b border-line">
              <th scope="row" className={`${STICKY} py-3 text-left align-top font-semibold`}>
                {pivot.total.label}
              </th>
              {figures(pivot.total, true)}
            </tr>
          </tfoot>
        )}
      </table>
    </div>
  );
}

/** A row's group; one that holds others opens and closes. */
function RowHeading({ row, name }: { row: Row<typeof pivotFeatures, PivotRow>; name: string }) {
  const { label, depth } = row.original;
  const Arrow = row.getIsExpanded() ? ChevronDown : ChevronRight;
  return (
    <th
      scope="row"
      className={`${STICKY} min-w-20 py-3 text-left align-top ${row.getCanExpand() ? "font-semibold" : "font-medium"}`}
    >
      <span className="block" style={{ paddingLeft: `${depth}rem` }}>
        {row.getCanExpand() ? (
          <button
            type="button"
            aria-expanded={row.getIsExpanded()}
            aria-label={`${name}, its groups`}
            onClick={row.getToggleExpandedHandler()}
            className="inline-flex min-h-6 items-start gap-1 text-left hover:text-action"
          >
            <Arrow aria-hidden="true" className="mt-0.5 -ml-1 size-4 shrink-0" />
            {label}
          </button>
        ) : (
          label
        )}
      </span>
    </th>
  );
}
