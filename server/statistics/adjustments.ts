/** How p-values of one family are adjusted for their number. */
export type Adjustment = "none" | "holm" | "benjamini-hochberg";

/**
 * Adjusted p-values in the order given. A null (no test was possible) stays null and does not count in the family.
 *
 * Holm holds the chance of any false claim at the level; Benjamini–Hochberg the expected share of false claims.
 *
 * @see Holm (1979), Scandinavian Journal of Statistics 6: 65-70.
 * @see Benjamini & Hochberg (1995), Journal of the Royal Statistical Society B 57: 289-300.
 */
export function adjustPValues(pValues: readonly (number | null)[], method: Adjustment): (number | null)[] {
  const adjusted = [...pValues];
  if (method === "none") return adjusted;
  const tested = pValues.flatMap((p, index) => (p === null ? [] : [{ p, index }])).sort((left, right) => left.p - right.p);
  const size = tested.length;
  if (method === "holm") {
    let largest = 0; // an adjusted value is never below that of a smaller p
    tested.forEach(({ p, index }, rank) => {
      largest = Math.max(largest, Math.min(1, p * (size - rank)));
      adjusted[index] = largest;
    });
    return adjusted;
  }
  let smallest = 1;
  tested.toReversed().forEach(({ p, index }, fromLast) => {
    smallest = Math.min(smallest, (p * size) / (size - fromLast));
    adjusted[index] = smallest;
  });
  return adjusted;
}
