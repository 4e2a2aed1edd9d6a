import { medianSorted } from "simple-statistics";
import type { ReadinessView } from "../../shared/contracts/readiness.ts";

const BINS = 20;

/** A step of 1, 2 or 5 times a power of ten, at least as wide as asked. */
function niceStep(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least));
  const factor = [1, 2, 5, 10].find((multiple) => multiple * power >= least * (1 - 1e-9)) ?? 10;
  return factor * power;
}

function histogram(sorted: Float64Array): NonNullable<ReadinessView["weight"]>["histogram"] {
  const [low, high] = [sorted[0]!, sorted.at(-1)!];
  if (low === high) return [{ from: low, to: high, respondents: sorted.length }];
  const step = niceStep((high - low) / BINS);
  const first = Math.floor(low / step);
  const bins = Array.from({ length: Math.floor(high / step) - first + 1 }, (_, i) => ({
    from: Number(((first + i) * step).toPrecision(12)),
    to: Number(((first + i + 1) * step).toPrecision(12)),
    respondents: 0,
  }));
  for (const value of sorted) bins[Math.min(bins.length - 1, Math.floor(value / step) - first)]!.respondents += 1;
  return bins;
}

/** How unequal the weights are; weights that are missing or negative are left out. Null where none is left. */
export function weightSpread(weight: Float64Array): ReadinessView["weight"] {
  const sorted = weight.filter((value) => value >= 0).sort();
  if (sorted.length === 0) return null;
  let total = 0;
  let squares = 0;
  for (const value of sorted) {
    total += value;
    squares += value * value;
  }
  const positive = sorted.filter((value) => value > 0);
  const median = positive.length === 0 ? 0 : medianSorted([...positive]);
  return {
    minimum: sorted[0]!,
    median,
    maximum: sorted.at(-1)!,
    kishEffect: total === 0 ? 1 : (positive.length * squares) / total ** 2,
    zero: sorted.length - positive.length,
    histogram: histogram(sorted),
  };
}
