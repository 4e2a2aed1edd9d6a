import { symbol, symbolCircle, symbolTriangle } from "d3-shape";
import type { KeyboardEvent } from "react";
import { fitLabel, layOutForest, type ForestLayout, type ForestRow, type PlacedRow } from "./forestLayout.ts";
import { toneFill, toneStroke, type Tone } from "./tones.ts";

const CIRCLE = symbol(symbolCircle, 56)() ?? "";
const TRIANGLE = symbol(symbolTriangle, 64)() ?? "";

const MARKS: Record<Tone, { path: string; turn: number }> = {
  higher: { path: TRIANGLE, turn: 0 },
  lower: { path: TRIANGLE, turn: 180 },
  none: { path: CIRCLE, turn: 0 },
  plain: { path: CIRCLE, turn: 0 },
};

function Mark({ x, y, tone }: { x: number; y: number; tone: Tone }) {
  const { path, turn } = MARKS[tone];
  return (
    <path
      d={path}
      transform={`translate(${x} ${y}) rotate(${turn})`}
      strokeWidth="1.75"
      className={`${toneFill[tone]} ${toneStroke[tone]}`}
    />
  );
}

function Row({
  placed: { row, top, height, y },
  layout: { x, gutter, isNarrow },
  width,
  hasZeroLine,
}: {
  hasZeroLine: boolean;
  placed: PlacedRow;
  layout: ForestLayout;
  width: number;
}) {
  const [left, right] = [x.range()[0] ?? 0, x.range()[1] ?? width];
  const textY = isNarrow ? top + 16 : y + 4.5;
  return (
    <>
      <rect x="0" y={top} width={width} height={height} className="fill-transparent" />
      <text x={0} y={textY} className="fill-ink text-[13.5px]">
        {fitLabel(row.label, isNarrow ? width - 150 : gutter)}
      </text>
      {row.value !== null && <line x1={left} x2={right} y1={y} y2={y} className="stroke-line" />}
      {hasZeroLine && isNarrow && row.value !== null && (
        <line x1={x(0)} x2={x(0)} y1={y - 11} y2={y + 11} className="stroke-ink" />
      )}
      {row.reference !== null && (
        <line x1={x(row.reference)} x2={x(row.reference)} y1={y - 10} y2={y + 10} strokeDasharray="2 2" className="stroke-ink" />
      )}
      {row.low !== null && row.high !== null && (
        <line
          x1={x(row.low)}
          x2={x(row.high)}
          y1={y}
          y2={y}
          strokeWidth="3.5"
          strokeLinecap="round"
          strokeOpacity="0.55"
          className={toneStroke[row.tone]}
        />
      )}
      {row.value !== null && <Mark x={x(row.value)} y={y} tone={row.tone} />}
      <text
        x={width}
        y={textY}
        textAnchor="end"
        className={`text-[12.5px] tabular-nums ${row.value === null ? "fill-muted italic" : "fill-ink"}`}
      >
        {row.figures}
      </text>
    </>
  );
}

export interface ForestPlotProps {
  /** Name of the list of groups, for screen readers. */
  label: string;
  rows: readonly ForestRow[];
  axisLabel: string;
  formatTick: (value: number) => string;
  /** A share's axis begins at nothing; a difference's holds nothing, with a line there. */
  isFromZero: boolean;
  hasZeroLine?: boolean;
  width: number;
  selected: string;
  onSelect: (id: string) => void;
}

/** Estimates with their intervals, one group to a line, on one axis; up and down keys go from group to group. */
export function ForestPlot({
  label,
  rows,
  axisLabel,
  formatTick,
  isFromZero,
  hasZeroLine = false,
  width,
  selected,
  onSelect,
}: ForestPlotProps) {
  const layout = layOutForest(rows, width, isFromZero);
  const { x, ticks, axisY } = layout;
  const focusable = rows.some(({ id }) => id === selected) ? selected : rows[0]?.id;
  const move = (event: KeyboardEvent<SVGSVGElement>) => {
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (step === undefined) return;
    const options = [...event.currentTarget.querySelectorAll<SVGGElement>("[role=option]")];
    const at = options.findIndex((option) => option === event.target);
    event.preventDefault();
    options[Math.min(Math.max(at + step, 0), options.length - 1)]?.focus();
  };
  return (
    <svg
      role="listbox"
      aria-label={label}
      width={width}
      height={layout.height}
      viewBox={`0 0 ${width} ${layout.height}`}
      className="block overflow-visible font-sans"
      onKeyDown={move}
    >
      {ticks.map((tick) => (
        <g key={tick} role="presentation">
          {/* On a narrow drawing labels stand over the marks, and lines would run through them. */}
          <line
            x1={x(tick)}
            x2={x(tick)}
            y1={layout.isNarrow ? axisY - 4 : 0}
            y2={axisY}
            className="stroke-line"
            strokeOpacity="0.6"
          />
          <text x={x(tick)} y={axisY + 16} textAnchor="middle" className="fill-muted text-[12px] tabular-nums">
            {formatTick(tick)}
          </text>
        </g>
      ))}
      {hasZeroLine && !layout.isNarrow && <line x1={x(0)} x2={x(0)} y1="0" y2={axisY} className="stroke-ink" />}
      <line x1={x.range()[0]} x2={x.range()[1]} y1={axisY} y2={axisY} className="stroke-field" />
      <text x={x.range()[0]} y={axisY + 34} className="fill-muted text-[12px]">
        {axisLabel}
      </text>
      {layout.rows.map((placed) => (
        <g key={placed.row.id} role="presentation">
          {placed.headingY !== null && (
            <text x="0" y={placed.headingY + 21} className="fill-ink text-[13.5px] font-semibold" aria-hidden="true">
              {placed.row.heading}
            </text>
          )}
          <g
            role="option"
            aria-selected={placed.row.id === selected}
            aria-label={[placed.row.heading, placed.row.label].filter(Boolean).join(", ").concat(`: ${placed.row.figures}`)}
            tabIndex={placed.row.id === focusable ? 0 : -1}
            onFocus={() => onSelect(placed.row.id)}
            onClick={(event) => event.currentTarget.focus()}
            className="cursor-pointer aria-selected:[&>rect]:fill-action-soft"
          >
            <Row placed={placed} layout={layout} width={width} hasZeroLine={hasZeroLine} />
          </g>
        </g>
      ))}
    </svg>
  );
}
