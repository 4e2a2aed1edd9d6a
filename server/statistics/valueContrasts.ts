import type { FunctionEstimate } from "./cellFunction.ts";
import type { ContrastSide } from "./contrast.ts";
import type { ContrastVariances } from "./moments.ts";

/**
 * What value `of` is compared with and how the comparison varies: another value of the same function estimate, with
 * their covariance, or a fixed number.
 *
 * @param sides One for each value, in the order of the estimate's values.
 */
export function withContrastVariances(
  estimate: FunctionEstimate,
  sides: readonly ContrastSide[],
  of: number,
  from: number | { fixed: number },
): { side: ContrastSide; variances: ContrastVariances } {
  const other = typeof from === "number" ? from : null;
  const side =
    typeof from === "number" ? sides[from]! : { estimate: from.fixed, variance: 0, respondents: 0, df: Infinity, isFixed: true };
  const p = sides[of]!.estimate;
  const q = side.estimate;
  if (p === null || q === null) {
    return { side, variances: { difference: null, covariance: null, logRatio: null, logOddsRatio: null } };
  }
  const combine = (f: (p: number, q: number) => number, slopeP: number, slopeQ: number) => {
    const gradient = new Float64Array(sides.length);
    gradient[of]! += slopeP;
    if (other !== null) gradient[other]! += slopeQ;
    return estimate.varianceOf((values) => f(values[of]!, other === null ? q : values[other]!), gradient);
  };
  const hasOdds = p > 0 && p < 1 && q > 0 && q < 1;
  const variances = {
    difference: combine((a, b) => a - b, 1, -1),
    covariance: other === null ? 0 : estimate.covariance(of, other),
    logRatio: p > 0 && q > 0 ? combine((a, b) => (a > 0 && b > 0 ? Math.log(a / b) : NaN), 1 / p, -1 / q) : null,
    logOddsRatio: hasOdds
      ? combine((a, b) => Math.log(a / (1 - a) / (b / (1 - b))), 1 / (p * (1 - p)), -1 / (q * (1 - q)))
      : null,
  };
  return { side, variances };
}
