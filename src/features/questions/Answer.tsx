import type { UseQueryResult } from "@tanstack/react-query";
import { useState } from "react";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Table } from "../../../shared/contracts/tables.ts";
import { formatCounted } from "../../../shared/format.ts";
import type { NamedVariable } from "../../../shared/wording.ts";
import type { Ask, View } from "./address.ts";
import { CorrectionTool } from "./CorrectionTool.tsx";
import type { Draft } from "./draft.ts";
import type { Measure } from "./measures.ts";
import { DifferenceTool, IntervalTool, MeasuresTool, OrderTool } from "./MethodTools.tsx";
import { OverallResults } from "./OverallResults.tsx";
import { OverallTool } from "./OverallTool.tsx";
import { cellsById, groupName, type CellId } from "./pivot.ts";
import { PivotTable } from "./PivotTable.tsx";
import { PlotView } from "./PlotView.tsx";
import { Refusal } from "./Refusal.tsx";
import type { SortMeasure } from "./sorting.ts";
import { TableFoot } from "./TableFoot.tsx";
import { TakeAway } from "./TakeAway.tsx";
import { ViewChoice } from "./ViewChoice.tsx";

export interface AnswerProps {
  query: UseQueryResult<Table>;
  draft: Draft;
  view: View;
  measures: readonly Measure[];
  variables: readonly NamedVariable[];
  /** Those that may be asked of. */
  askableVariables: readonly VariableView[];
  selected: CellId;
  onSelect: (id: CellId) => void;
  onChange: (changes: Partial<Draft>) => void;
  onLook: (changes: Partial<Omit<Ask, "draft">>) => void;
}

/** On a narrow screen the reading stands under the table: a strip says what it is about and leads there. */
function ReadingStrip({ table, selected }: { table: Table; selected: CellId }) {
  const cell = cellsById(table).get(selected);
  if (!cell) return null;
  return (
    <a
      href="#reading"
      className="sticky bottom-0 z-2 -mx-4 mt-6 flex min-h-11 items-center justify-between gap-4 border-t border-line bg-raised px-4 text-[0.9375rem] text-action sm:-mx-8 sm:px-8 lg:hidden no-print"
    >
      <span className="min-w-0 truncate">Reading: {groupName(table, cell.key)}</span>
      <span aria-hidden="true">↓</span>
    </a>
  );
}

/** How the answer stands: being worked out, refused, or there in one of its views. */
export function Answer({
  query,
  draft,
  view,
  measures,
  variables,
  askableVariables,
  selected,
  onSelect,
  onChange,
  onLook,
}: AnswerProps) {
  const [sortMeasure, setSortMeasure] = useState<SortMeasure>("estimate");
  const table = query.data;
  const isStale = query.isPlaceholderData;
  const status =
    query.isPending || isStale
      ? "Working out the answer…"
      : table
        ? `Answer: ${formatCounted(table.cells.length, "group")}.`
        : "";
  return (
    <div>
      <div className="flex flex-wrap items-center justify-between gap-x-6 border-t border-line pt-2 pb-3 no-print">
        <div className="flex flex-wrap items-center gap-x-4">
          <ViewChoice view={view} hasComparison={draft.comparison.kind !== "none"} onChange={(view) => onLook({ view })} />
          <IntervalTool draft={draft} onChange={onChange} />
          <DifferenceTool draft={draft} onChange={onChange} />
          <CorrectionTool draft={draft} variables={askableVariables} onChange={onChange} />
          <OverallTool draft={draft} onChange={onChange} />
          {view === "table" && <MeasuresTool measures={measures} onChange={(measures) => onLook({ measures })} />}
          {view === "table" && <OrderTool measure={sortMeasure} onChange={setSortMeasure} />}
        </div>
        {table && view === "table" && <TakeAway key={query.dataUpdatedAt} table={table} measures={measures} />}
      </div>
      <p role="status" className={query.isPending ? "py-6 text-muted" : "sr-only"}>
        {status}
      </p>
      {query.isError && <Refusal error={query.error} onRetry={query.refetch} />}
      {table && (
        <div aria-busy={isStale} className={`transition-opacity duration-200 ${isStale ? "opacity-45" : ""}`}>
          {view === "table" ? (
            <PivotTable table={table} measures={measures} sortMeasure={sortMeasure} selected={selected} onSelect={onSelect} />
          ) : (
            <PlotView table={table} view={view} variables={variables} selected={selected} onSelect={onSelect} />
          )}
          <OverallResults table={table} />
          <TableFoot table={table} />
          <ReadingStrip table={table} selected={selected} />
        </div>
      )}
    </div>
  );
}
