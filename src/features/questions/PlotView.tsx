import type { Table } from "../../../shared/contracts/tables.ts";
import type { View } from "./address.ts";
import type { CellId } from "./pivot.ts";

export interface PlotViewProps {
  table: Table;
  view: View;
  selected: CellId;
  onSelect: (id: CellId) => void;
}

export function PlotView({ table }: PlotViewProps) {
  return <p>{table.caption}</p>;
}
