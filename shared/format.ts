/**
 * How numbers and dates stand on pages, in captions and in sentences (STATISTICS.md §9). Stored and exported figures
 * keep full precision; nothing here is ever computed with again.
 */

const MINUS = "\u2212";
const NO_BREAK = "\u00a0";
const WIDE_INTERVAL = 0.1;
const SIGNIFICANT_FIGURES = 3;

const grouped = (value: number, decimals: number) =>
  value.toLocaleString("en-GB", { minimumFractionDigits: decimals, maximumFractionDigits: decimals });

/** Rounded with grouped thousands and a true minus; a value that rounds to nothing has no sign. */
export function formatNumber(value: number, decimals = 0): string {
  const text = grouped(Math.abs(value), decimals);
  return value < 0 && /[1-9]/.test(text) ? `${MINUS}${text}` : text;
}

/** The same with a plus where it is above nothing. */
export function formatSigned(value: number, decimals = 0): string {
  const text = formatNumber(value, decimals);
  return value > 0 && /[1-9]/.test(text) ? `+${text}` : text;
}

/** A whole count, such as of respondents. */
export const formatCount = (count: number): string => formatNumber(count, 0);

/** Decimals of a percentage and its interval: one, or none when the interval is wider than 10 points. */
export function percentDecimals(low: number | null, high: number | null): 0 | 1 {
  if (low === null || high === null) return 1;
  // A width of exactly ten points keeps its decimal whatever the last bits of the subtraction are.
  return high - low > WIDE_INTERVAL + 1e-9 ? 0 : 1;
}

/** "14.1" of every 100, for 0.141. */
export const formatPer100 = (fraction: number, decimals = 1): string => formatNumber(fraction * 100, decimals);

/** "14.1 %" for 0.141. */
export const formatPercent = (fraction: number, decimals = 1): string => `${formatPer100(fraction, decimals)}${NO_BREAK}%`;

/** A difference of two fractions in percentage points with its sign: "+15.6", "−7.2", "0.0". */
export const formatPoints = (difference: number, decimals = 1): string => formatSigned(difference * 100, decimals);

/** "10.6 to 18.3" for fractions; both ends in the same decimals. */
export const formatPer100Interval = (low: number, high: number, decimals: number = percentDecimals(low, high)): string =>
  `${formatPer100(low, decimals)} to ${formatPer100(high, decimals)}`;

/** People to three significant figures, never to less than a whole person: "5,480", "1,230,000", "41". */
export function formatPeople(people: number): string {
  if (!Number.isFinite(people) || people === 0) return formatNumber(people);
  const digits = Math.floor(Math.log10(Math.abs(people))) + 1;
  const unit = 10 ** Math.max(0, digits - SIGNIFICANT_FIGURES);
  return formatNumber(Math.round(people / unit) * unit);
}

/** A number of unknown size to three significant figures, such as a weight, a mean or a design effect's parts. */
export function formatSignificant(value: number, figures = SIGNIFICANT_FIGURES): string {
  if (!Number.isFinite(value) || value === 0) return formatNumber(value);
  const digits = Math.floor(Math.log10(Math.abs(value))) + 1;
  const decimals = Math.min(12, Math.max(0, figures - digits));
  return formatNumber(value, decimals);
}

/** A p-value: three decimals, "< 0.001" instead of nothing, "> 0.999" instead of certainty. */
export function formatP(p: number): string {
  if (p < 0.0005) return `<${NO_BREAK}0.001`;
  if (p >= 0.9995 && p < 1) return `>${NO_BREAK}0.999`;
  return p.toFixed(3);
}

/** "1 December 2026" for a date or the day of a moment, in UTC unless told otherwise. */
export const formatDate = (iso: string, timeZone = "UTC"): string =>
  new Date(iso).toLocaleDateString("en-GB", { day: "numeric", month: "long", year: "numeric", timeZone });

/** "1 December 2026, 14:05", in the reader's own time zone unless told otherwise. */
export const formatDateTime = (iso: string, timeZone?: string): string =>
  `${new Date(iso).toLocaleDateString("en-GB", { day: "numeric", month: "long", year: "numeric", timeZone })}, ${new Date(
    iso,
  ).toLocaleTimeString("en-GB", { hour: "2-digit", minute: "2-digit", timeZone })}`;

/** "4.1 MB" for a file's size in bytes, in powers of 1000. */
export function formatBytes(bytes: number): string {
  const units = ["bytes", "kB", "MB", "GB", "TB"];
  const step = bytes < 1000 ? 0 : Math.min(units.length - 1, Math.floor(Math.log10(bytes) / 3));
  return `${formatNumber(bytes / 1000 ** step, step === 0 ? 0 : 1)}${NO_BREAK}${units[step] ?? ""}`;
}

/** "1 row", "2,000 rows": a count with the right form of its noun. */
export const formatCounted = (count: number, one: string, many = `${one}s`): string =>
  `${formatCount(count)} ${count === 1 ? one : many}`;
