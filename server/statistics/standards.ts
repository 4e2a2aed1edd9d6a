import type { Standard } from "../../shared/standards.ts";

/** Weights that sum to 1. */
export function normalise(weights: readonly number[]): number[] {
  const sum = weights.reduce((total, weight) => total + weight, 0);
  return weights.map((weight) => weight / sum);
}

/**
 * A standard's weights for a survey's own age bands, summed over the standard's bands inside each and normalised to 1.
 *
 * @param bands Whole years, both ends included; `to` null for no upper end.
 * @returns Null where an edge of a band cuts one of the standard's, so that its weight is not known, or where no weight
 *   is left. A standard's open band belongs to the survey's open band only.
 */
export function weightsForBands(
  standard: Standard,
  bands: readonly { from: number; to: number | null }[],
): { weights: number[] } | null {
  const weights = bands.map(({ from, to }) => {
    const end = to ?? Infinity;
    const touching = standard.bands.filter((band) => band.from <= end && (band.to ?? Infinity) >= from);
    const isCut = touching.some((band) => band.from < from || (band.to ?? Infinity) > end);
    return isCut ? null : touching.reduce((sum, band) => sum + band.weight, 0);
  });
  const known = weights.filter((weight) => weight !== null);
  if (known.length < weights.length || !known.some((weight) => weight > 0)) return null;
  return { weights: normalise(known) };
}
