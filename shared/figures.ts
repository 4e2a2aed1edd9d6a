import { formatNumber, formatSigned, percentDecimals } from "./format.ts";

/** What a table's estimates are: shares of people, or means in the variable's own units. */
export type FigureKind = "share" | "mean";

const MOST_DECIMALS = 6;

/**
 * Decimals that an estimate and its interval are written with: of a share as STATISTICS §9 says, of a mean by the
 * same measure: none when the interval is wider than 5, one down to 0.5, and so on.
 */
export function figureDecimals(kind: FigureKind, low: number | null, high: number | null): number {
  if (kind === "share") return percentDecimals(low, high);
  const width = low === null || high === null ? 0 : high - low;
  if (!(width > 0)) return 2;
  return Math.min(MOST_DECIMALS, Math.max(0, Math.ceil(-Math.log10(width / 5) - 1e-9)));
}

/** The number that people read: of every 100 for a share, the mean itself otherwise. */
export const readable = (kind: FigureKind, value: number): number => (kind === "share" ? 100 * value : value);

/** "38.4" for 0.384 of a share. */
export const formatFigure = (kind: FigureKind, value: number, decimals: number): string =>
  formatNumber(readable(kind, value), decimals);

/** "+17.1", "−7.2", "0.0": a difference in points or units. */
export const formatDifference = (kind: FigureKind, value: number, decimals: number): string =>
  formatSigned(readable(kind, value), decimals);

/** "33.6 to 43.5"; null where there is no interval. */
export function formatInterval(kind: FigureKind, low: number | null, high: number | null): string | null {
  if (low === null || high === null) return null;
  const decimals = figureDecimals(kind, low, high);
  return `${formatFigure(kind, low, decimals)} to ${formatFigure(kind, high, decimals)}`;
}

/** "+12.8 to +21.9", in the decimals of its own width. */
export function formatDifferenceInterval(kind: FigureKind, low: number | null, high: number | null): string | null {
  if (low === null || high === null) return null;
  const decimals = figureDecimals(kind, low, high);
  return `${formatDifference(kind, low, decimals)} to ${formatDifference(kind, high, decimals)}`;
}
