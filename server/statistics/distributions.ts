import betainc from "@stdlib/math-base-special-betainc";
import erfc from "@stdlib/math-base-special-erfc";
import erfcinv from "@stdlib/math-base-special-erfcinv";
import { inverseBetaLogit } from "./betaInverse.ts";
import { DomainError } from "./errors.ts";

/**
 * Student, normal, beta and F distributions by way of the regularized incomplete beta function and the complementary
 * error function, which keep their relative precision far into the tails. Degrees of freedom need not be whole numbers.
 *
 * @see Abramowitz & Stegun (1964), Handbook of Mathematical Functions, 26.2, 26.5-26.7.
 */

/** Share of the standard normal distribution below `z`. */
export function normalCdf(z: number): number {
  return 0.5 * erfc(-z / Math.SQRT2);
}

/** The standard normal value below which a share `probability` lies; 0 and 1 give −∞ and ∞. */
export function normalQuantile(probability: number): number {
  assertProbability(probability);
  return -Math.SQRT2 * erfcinv(2 * probability);
}

/** Share of Student's t distribution below `t`. `df` > 0, or Infinity for the normal. */
export function studentCdf(t: number, df: number): number {
  const tail = studentTwoSidedP(t, df) / 2;
  return t > 0 ? 1 - tail : tail;
}

/** Two-sided p-value of a t statistic: the share of the distribution farther from 0 than `t`. */
export function studentTwoSidedP(t: number, df: number): number {
  assertPositive(df, "degrees of freedom");
  if (df === Infinity) return erfc(Math.abs(t) / Math.SQRT2);
  const square = t * t;
  if (square === Infinity) return 0;
  // Either form of the argument loses digits where the other keeps them.
  return square > df ? betainc(df / (df + square), df / 2, 0.5) : betainc(square / (df + square), 0.5, df / 2, true, true);
}

/** The t value below which a share `probability` of the distribution lies. */
export function studentQuantile(probability: number, df: number): number {
  assertProbability(probability);
  assertPositive(df, "degrees of freedom");
  if (df === Infinity) return normalQuantile(probability);
  if (probability === 0.5) return 0;
  const twoTails = 2 * Math.min(probability, 1 - probability);
  if (twoTails === 0) return probability === 0 ? -Infinity : Infinity;
  // df/(df + t²) is beta with shapes df/2 and ½; on the logit scale t² is df · e^(−logit), and neither end loses digits.
  const logit = inverseBetaLogit(twoTails, df / 2, 0.5);
  return Math.sign(probability - 0.5) * Math.sqrt(df) * Math.exp(-logit / 2);
}

const criticalValues = new Map<string, number>();
const REMEMBERED_CRITICAL_VALUES = 20_000;

/**
 * Half-width of a two-sided interval in standard errors: t with 1 − α/2 below it.
 *
 * @param level Percent, such as 95.
 */
export function studentCritical(level: number, df: number): number {
  // A table asks for the same few values hundreds of times.
  const key = `${level}/${df}`;
  const known = criticalValues.get(key);
  if (known !== undefined) return known;
  const value = studentQuantile((100 + level) / 200, df);
  if (criticalValues.size >= REMEMBERED_CRITICAL_VALUES) criticalValues.clear();
  criticalValues.set(key, value);
  return value;
}

/** Share of the beta distribution below `x`. `a`, `b` > 0. */
export function betaCdf(x: number, a: number, b: number): number {
  assertPositive(a, "shape");
  assertPositive(b, "shape");
  if (x <= 0) return 0;
  return x >= 1 ? 1 : betainc(x, a, b);
}

/** The value below which a share `probability` of the beta distribution lies. */
export function betaQuantile(probability: number, a: number, b: number): number {
  assertProbability(probability);
  assertPositive(a, "shape");
  assertPositive(b, "shape");
  if (probability === 0 || probability === 1) return probability;
  return 1 / (1 + Math.exp(-inverseBetaLogit(probability, a, b)));
}

/** Share of the F distribution above `f`: the p-value of an F statistic. */
export function fisherUpperTail(f: number, numeratorDf: number, denominatorDf: number): number {
  assertPositive(numeratorDf, "degrees of freedom");
  assertPositive(denominatorDf, "degrees of freedom");
  if (f <= 0) return 1;
  return betainc(denominatorDf / (denominatorDf + numeratorDf * f), denominatorDf / 2, numeratorDf / 2);
}

/** Share of the F distribution below `f`. */
export function fisherCdf(f: number, numeratorDf: number, denominatorDf: number): number {
  if (f <= 0) return 0;
  return betaCdf((numeratorDf * f) / (denominatorDf + numeratorDf * f), numeratorDf / 2, denominatorDf / 2);
}

/** The value below which a share `probability` of the F distribution lies. */
export function fisherQuantile(probability: number, numeratorDf: number, denominatorDf: number): number {
  assertProbability(probability);
  assertPositive(numeratorDf, "degrees of freedom");
  assertPositive(denominatorDf, "degrees of freedom");
  if (probability === 0 || probability === 1) return probability === 0 ? 0 : Infinity;
  return (denominatorDf / numeratorDf) * Math.exp(inverseBetaLogit(probability, numeratorDf / 2, denominatorDf / 2));
}

function assertProbability(probability: number): void {
  if (!(probability >= 0 && probability <= 1)) throw new DomainError(`${probability} is not a probability`);
}

function assertPositive(value: number, what: string): void {
  if (!(value > 0)) throw new DomainError(`${what} must be above 0, not ${value}`);
}
