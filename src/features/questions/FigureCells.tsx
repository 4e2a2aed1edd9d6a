import { memo } from "react";
import type { FigureKind } from "../../../shared/figures.ts";
import type { Measure } from "./measures.ts";
import { cellId, type CellId, type PivotColumn, type PivotRow } from "./pivot.ts";
import { PivotCell } from "./PivotCell.tsx";

export interface FigureCellsProps {
  row: PivotRow;
  leaves: readonly PivotColumn[];
  isTotalRow: boolean;
  kind: FigureKind;
  measures: readonly Measure[];
  extent: readonly [number, number] | null;
  /** The chosen cell where it is in this row, so that choosing another draws two rows anew and no more. */
  selected: CellId | null;
  onSelect: (id: CellId) => void;
}

export const cellIdOf = (row: PivotRow, leaf: PivotColumn): CellId => cellId([...row.codes, ...leaf.codes]);

/** The figures of one row, as cells of the grid. */
export const FigureCells = memo(function FigureCells({
  row,
  leaves,
  isTotalRow,
  kind,
  measures,
  extent,
  selected,
  onSelect,
}: FigureCellsProps) {
  return leaves.map((leaf) => {
    const cell = row.cells.get(leaf.id);
    if (!cell) return <td key={leaf.id} />;
    const id = cellIdOf(row, leaf);
    const isSelected = id === selected;
    const total = leaf.isTotal || isTotalRow ? "bg-sunken" : "";
    return (
      <td
        key={leaf.id}
        role="gridcell"
        tabIndex={isSelected ? 0 : -1}
        aria-selected={isSelected}
        onFocus={() => onSelect(id)}
        onClick={(event) => event.currentTarget.focus()}
        className={`cursor-pointer px-3 py-2.5 align-top hover:bg-action-soft/60 focus-visible:-outline-offset-2 ${
          isSelected ? "bg-action-soft shadow-[inset_3px_0_0_var(--color-action)]" : total
        }`}
      >
        <PivotCell cell={cell} kind={kind} measures={measures} extent={extent} />
      </td>
    );
  });
});
