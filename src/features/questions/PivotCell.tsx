import { TriangleAlert } from "lucide-react";
import type { Cell, ShownCell } from "../../../shared/contracts/tables.ts";
import {
  figureDecimals,
  formatDifference,
  formatDifferenceInterval,
  formatFigure,
  formatInterval,
} from "../../../shared/figures.ts";
import type { FigureKind } from "../../../shared/figures.ts";
import { formatCount, formatP, formatPeople, formatSignificant } from "../../../shared/format.ts";
import { directionMarks, withheldWords } from "../../../shared/reading.ts";
import { CellInterval } from "./CellInterval.tsx";
import type { Measure } from "./measures.ts";

const DIRECTION_TEXT = { higher: "text-higher-text", lower: "text-lower-text", none: "text-none" } as const;

function Difference({ cell, kind }: { cell: ShownCell; kind: FigureKind }) {
  const { comparison } = cell;
  if (!comparison || comparison.difference === null) return null;
  const { mark, word } = directionMarks[comparison.direction];
  return (
    <span className={`text-[0.8125rem] font-medium whitespace-nowrap ${DIRECTION_TEXT[comparison.direction]}`}>
      <span aria-hidden="true">{mark} </span>
      <span className="sr-only">{word}, </span>
      {formatDifference(kind, comparison.difference, figureDecimals(kind, comparison.low, comparison.high))}
    </span>
  );
}

/** Further measures, one to a line under the cell. */
function furtherLines(cell: ShownCell, kind: FigureKind, measures: readonly Measure[]): [string, string][] {
  const { comparison } = cell;
  const interval = comparison ? formatDifferenceInterval(kind, comparison.low, comparison.high) : null;
  const lines: [Measure, string, string | null][] = [
    ["differenceInterval", "diff.", interval],
    ["p", "p", comparison?.pAdjusted == null ? null : formatP(comparison.pAdjusted)],
    ["people", "people", formatPeople(cell.people)],
    ["affected", "affected", cell.affectedPeople === null ? null : formatPeople(cell.affectedPeople)],
    ["deff", "deff", cell.deff === null ? null : formatSignificant(cell.deff)],
  ];
  return lines.flatMap(([measure, label, value]): [string, string][] =>
    value !== null && measures.includes(measure) ? [[label, value]] : [],
  );
}

/** Word and mark of a figure that isn't to be shown. */
export function WithheldMark() {
  return (
    <svg aria-hidden="true" viewBox="0 0 15 15" className="size-[0.95rem] shrink-0 stroke-none" fill="none">
      <rect x="0.5" y="0.5" width="14" height="14" />
      <path d="M0.5 5 5 0.5M0.5 10 10 0.5M0.5 14.5l14-14M5 14.5 14.5 5M10 14.5l4.5-4.5" />
    </svg>
  );
}

/** Word and mark of a figure that can't simply be relied on. */
export function ReliabilityMark({ cell }: { cell: ShownCell }) {
  const { verdict } = cell.reliability;
  if (verdict === "reliable") return null;
  return (
    <span className="inline-flex items-center gap-1 text-[0.8125rem] font-medium text-wrong">
      <TriangleAlert aria-hidden="true" className="size-3.5" />
      {verdict === "caution" ? "with caution" : "unreliable"}
    </span>
  );
}

export interface PivotCellProps {
  cell: Cell;
  kind: FigureKind;
  measures: readonly Measure[];
  extent: readonly [number, number] | null;
}

/** What stands in a cell: the estimate large, everything else small. */
export function PivotCell({ cell, kind, measures, extent }: PivotCellProps) {
  if (!cell.shown)
    return (
      <div className="text-muted">
        <span className="flex items-center gap-2 pt-1 font-medium">
          <WithheldMark /> {cell.reason === "empty" ? "no one" : "withheld"}
        </span>
        <span className="mt-1 block text-[0.8125rem] leading-snug">{withheldWords[cell.reason]}</span>
      </div>
    );
  const { estimate, low, high } = cell;
  if (estimate === null) return <span className="text-muted">no estimate</span>;
  const interval = formatInterval(kind, low, high);
  const shows = (measure: Measure) => measures.includes(measure);
  const further = furtherLines(cell, kind, measures);
  return (
    <div className="max-w-44 min-w-28">
      <div className="flex items-baseline justify-between gap-2">
        <span className={`text-xl leading-tight font-semibold ${cell.reliability.verdict === "unreliable" ? "text-muted" : ""}`}>
          {formatFigure(kind, estimate, figureDecimals(kind, low, high))}
        </span>
        {shows("difference") && <Difference cell={cell} kind={kind} />}
      </div>
      {shows("picture") && extent && <CellInterval cell={cell} extent={extent} />}
      <div className="flex flex-wrap justify-between gap-x-3 text-[0.8125rem] text-muted">
        {shows("interval") && <span className="whitespace-nowrap">{interval ?? "no interval"}</span>}
        {shows("respondents") && <span className="whitespace-nowrap">n {formatCount(cell.respondents)}</span>}
      </div>
      <ReliabilityMark cell={cell} />
      {further.length > 0 && (
        <dl className="mt-1 text-[0.8125rem] text-muted">
          {further.map(([label, value]) => (
            <div key={label} className="flex justify-between gap-3">
              <dt>{label}</dt>
              <dd className="text-right">{value}</dd>
            </div>
          ))}
        </dl>
      )}
    </div>
  );
}
