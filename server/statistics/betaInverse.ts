import betainc from "@stdlib/math-base-special-betainc";
import { gammaln } from "simple-statistics";

const MOST_STEPS = 200;
/** Standard deviations from the middle at which the search starts: limits are mostly asked for at 95 %. */
const START = 2;
/** Beyond these logits a value is 0 or 1 in double precision. */
const FARTHEST = 745;

/**
 * Logit of the value below which a share `probability` of the beta distribution lies. On this scale values next to 0 and
 * next to 1 keep their digits, and the logarithm of either tail is concave, so that Newton's steps go straight to the
 * solution; a bracket catches any that do not.
 *
 * @param probability Strictly between 0 and 1.
 * @param a Shape above 0.
 * @param b Shape above 0.
 */
export function inverseBetaLogit(probability: number, a: number, b: number): number {
  // The smaller tail is the one with digits to spare.
  const isLower = probability <= 0.5;
  const wanted = Math.log(isLower ? probability : 1 - probability);
  const logBeta = gammaln(a) + gammaln(b) - gammaln(a + b);
  let low = -FARTHEST;
  let high = FARTHEST;
  const spread = Math.sqrt(1 / a + 1 / b);
  let logit = Math.log(a / b) + (isLower ? -1 : 1) * Math.min(1, spread) * START;
  for (let step = 0; step < MOST_STEPS; step++) {
    const tail = betaTail(logit, a, b, isLower);
    const excess = Math.log(tail) - wanted;
    if (excess === 0) return logit;
    if (excess > 0 === isLower) high = logit;
    else low = logit;
    const density = Math.exp(-a * softplus(-logit) - b * softplus(logit) - logBeta);
    const slope = (isLower ? density : -density) / tail;
    const next = logit - excess / slope;
    // Newton doubles the digits: after a step this small another would change none.
    if (Math.abs(next - logit) <= 1e-9 * Math.max(1, Math.abs(logit))) return next;
    logit = next > low && next < high ? next : (low + high) / 2;
  }
  return logit;
}

/** Share below (or above) the value with this logit, by the form of the incomplete beta function whose argument is small. */
function betaTail(logit: number, a: number, b: number, isLower: boolean): number {
  return logit < 0
    ? betainc(1 / (1 + Math.exp(-logit)), a, b, true, !isLower)
    : betainc(1 / (1 + Math.exp(logit)), b, a, true, isLower);
}

/** log(1 + eˣ) without overflow. */
function softplus(x: number): number {
  return x > 0 ? x + Math.log1p(Math.exp(-x)) : Math.log1p(Math.exp(x));
}
