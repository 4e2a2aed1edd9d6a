import { scaleLinear, type ScaleLinear } from "d3-scale";
import type { Tone } from "./tones.ts";

/** One group of an interval plot, in the numbers that its axis shows. */
export interface ForestRow {
  id: string;
  /** Groups under one heading stand together; null without headings. */
  heading: string | null;
  label: string;
  value: number | null;
  low: number | null;
  high: number | null;
  /** Where the dashed line of this row stands; null without one. */
  reference: number | null;
  tone: Tone;
  /** The figures as text, or why there are none. */
  figures: string;
}

export interface PlacedRow {
  row: ForestRow;
  /** Top of the heading above it; null where the heading above still holds. */
  headingY: number | null;
  top: number;
  height: number;
  /** Where its mark stands. */
  y: number;
}

export interface ForestLayout {
  isNarrow: boolean;
  /** Width of the gutter for labels; nothing on a narrow drawing, where they stand above their mark. */
  gutter: number;
  x: ScaleLinear<number, number>;
  ticks: number[];
  rows: PlacedRow[];
  axisY: number;
  height: number;
}

const NARROW = 560;
const LETTER = 7.2;
const HEADING = 30;
const FIGURES = 172;
const AXIS = 44;

/** Ends of the axis: all that is drawn, and nothing itself where asked for. */
function extentOf(rows: readonly ForestRow[], isFromZero: boolean): [number, number] {
  const drawn = rows.flatMap(({ value, low, high, reference }) => [value, low, high, reference]).filter((end) => end !== null);
  const ends = isFromZero ? [0, ...drawn] : drawn;
  if (ends.length === 0) return [0, 1];
  const [from, to] = [Math.min(...ends), Math.max(...ends)];
  return from === to ? [from, from + 1] : [from, to];
}

/** Places the rows of an interval plot one under another in a drawing of a given width. */
export function layOutForest(rows: readonly ForestRow[], width: number, isFromZero: boolean): ForestLayout {
  const isNarrow = width < NARROW;
  const longest = Math.max(0, ...rows.map(({ label }) => label.length)) * LETTER + 16;
  const gutter = isNarrow ? 0 : Math.min(Math.max(longest, 72), width * 0.34);
  const right = isNarrow ? 8 : FIGURES;
  const x = scaleLinear(extentOf(rows, isFromZero), [gutter + 8, width - right]).nice(5);
  const height = isNarrow ? 46 : 30;
  let top = 4;
  let heading: string | null = null;
  const placed = rows.map((row): PlacedRow => {
    const isNew = row.heading !== null && row.heading !== heading;
    heading = row.heading;
    const headingY = isNew ? top : null;
    if (isNew) top += HEADING;
    const place = { row, headingY, top, height, y: top + (isNarrow ? 33 : height / 2) };
    top += height;
    return place;
  });
  return { isNarrow, gutter, x, ticks: x.ticks(isNarrow ? 4 : 6), rows: placed, axisY: top + 6, height: top + AXIS };
}

/** A label cut to the room it has; the whole of it stays in its row's text. */
export const fitLabel = (label: string, room: number): string => {
  const letters = Math.max(4, Math.floor(room / LETTER));
  return label.length > letters ? `${label.slice(0, letters - 1)}…` : label;
};
