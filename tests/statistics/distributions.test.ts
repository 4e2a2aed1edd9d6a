import betaincinv from "@stdlib/math-base-special-betaincinv";
import jstat from "jstat";
import { describe, expect, it } from "vitest";
import {
  betaCdf,
  betaQuantile,
  fisherCdf,
  fisherQuantile,
  fisherUpperTail,
  normalCdf,
  normalQuantile,
  studentCdf,
  studentCritical,
  studentQuantile,
  studentTwoSidedP,
} from "../../server/statistics/distributions.ts";
import { expectClose } from "./support/close.ts";

// Abramowitz & Stegun (1964), Tables 26.1, 26.9 and 26.10; further digits as any table of more places prints them.
const STUDENT_TABLE: [number, number, number][] = [
  [0.975, 1, 12.7062047361747],
  [0.975, 2, 4.30265272974946],
  [0.975, 10, 2.22813885198627],
  [0.975, 30, 2.04227245630124],
  [0.995, 5, 4.03214298355523],
  [0.95, 120, 1.65765089935236],
  [0.9995, 1, 636.619248768],
  [0.975, Infinity, 1.95996398454005],
];

// Whole degrees of freedom have closed forms (Abramowitz & Stegun 26.7.3 and 26.7.4).
function closedFormTwoSided(t: number, df: number): number {
  const theta = Math.atan(t / Math.sqrt(df));
  const cosine = Math.cos(theta);
  let term = df % 2 === 1 ? cosine : 1;
  let sum = df === 1 ? 0 : term;
  for (let power = df % 2 === 1 ? 2 : 1; power <= df - 3 + (df % 2 === 1 ? 1 : 0); power += 2) {
    term *= (power / (power + 1)) * cosine * cosine;
    if (power + 1 > df - 2) break;
    sum += term;
  }
  const inside = df % 2 === 1 ? (2 / Math.PI) * (theta + Math.sin(theta) * sum) : Math.sin(theta) * sum;
  return 1 - inside;
}

/** Share of a function's integral over [0, π/2] that lies below `end`, by Simpson's rule: a second way that needs no special function. */
function shareBelow(density: (angle: number) => number, end: number): number {
  const integrate = (from: number, to: number) => {
    const steps = 20_000;
    const step = (to - from) / steps;
    let sum = density(from) + density(to);
    for (let point = 1; point < steps; point++) sum += (point % 2 === 1 ? 4 : 2) * density(from + point * step);
    return (sum * step) / 3;
  };
  const below = integrate(0, end);
  return below / (below + integrate(end, Math.PI / 2));
}

/** t = √df tan θ turns Student's density into cos^(df − 1) θ. */
function integratedStudent(t: number, df: number): number {
  const half = shareBelow((angle) => Math.cos(angle) ** (df - 1), Math.atan(Math.abs(t) / Math.sqrt(df))) / 2;
  return t > 0 ? 0.5 + half : 0.5 - half;
}

/** x = sin² θ turns the beta density into sin^(2a − 1) θ cos^(2b − 1) θ; logarithms keep large shapes in range. */
function integratedBeta(x: number, a: number, b: number): number {
  const logarithm = (angle: number) => (2 * a - 1) * Math.log(Math.sin(angle)) + (2 * b - 1) * Math.log(Math.cos(angle));
  const peak = logarithm(Math.atan(Math.sqrt((2 * a - 1) / (2 * b - 1))));
  return shareBelow((angle) => Math.exp(logarithm(angle) - peak), Math.asin(Math.sqrt(x)));
}

/** P(Binomial(a + b − 1, x) ≥ a), which the beta distribution of whole shapes equals (26.5.24). */
function binomialTail(x: number, a: number, b: number): number {
  const trials = a + b - 1;
  let sum = 0;
  for (let k = a; k <= trials; k++) {
    let term = 1;
    for (let factor = 1; factor <= k; factor++) term *= ((trials - k + factor) / factor) * x;
    sum += term * (1 - x) ** (trials - k);
  }
  return sum;
}

describe("Student's t", () => {
  it.each(STUDENT_TABLE)("quantile %f with %d degrees of freedom is the printed one", (probability, df, value) => {
    expectClose(studentQuantile(probability, df), value, 1e-11, "quantile");
    expectClose(studentQuantile(1 - probability, df), -value, 1e-9, "mirrored");
  });

  it("agrees with the closed form of whole degrees of freedom", () => {
    for (const df of [1, 2, 3, 4, 7, 10, 16, 25, 40]) {
      for (const t of [0.05, 0.7, 1.96, 3.5]) {
        expectClose(studentTwoSidedP(t, df), closedFormTwoSided(t, df), 1e-11, `t ${t}, df ${df}`);
      }
    }
  });

  it("agrees with the integral of its density, whole degrees of freedom or not", () => {
    for (const df of [2.7, 8, 16, 41.5, 196, 1000.25]) {
      for (const t of [-6, -2.1, -0.4, 0.01, 1.3, 2.72, 4.2]) {
        expect(Math.abs(studentCdf(t, df) - integratedStudent(t, df)), `t ${t}, df ${df}`).toBeLessThan(1e-10);
      }
    }
  });

  it("agrees with a second library to 1e-8 from 2 degrees of freedom", () => {
    // With fewer, or shapes of thousands, the other's own continued fraction stops at 5e-8.
    for (const df of [2, 2.7, 8, 16, 41.5]) {
      for (const t of [-6, -2.1, -0.4, 1.3, 2.72, 4.2]) {
        expect(Math.abs(studentCdf(t, df) - jstat.studentt.cdf(t, df)), `t ${t}, df ${df}`).toBeLessThan(1e-8);
      }
    }
  });

  it("keeps its digits far out: with 2 degrees of freedom the tail is 1 − t/√(2 + t²)", () => {
    for (const t of [10, 1e3, 1e6]) {
      const square = t * t;
      // 1 − t/√(2 + t²) without the difference of near equals.
      const tail = 2 / (2 + square) / (1 + t / Math.sqrt(2 + square));
      expectClose(studentTwoSidedP(t, 2), tail, 1e-11, `t ${t}`);
    }
    expect(studentTwoSidedP(60, 200)).toBeGreaterThan(0);
    expect(studentTwoSidedP(Infinity, 5)).toBe(0);
  });

  it("quantile and distribution undo one another from 1 to a million degrees of freedom", () => {
    for (const df of [1, 1.5, 3, 12.34, 99, 1e4, 1e6]) {
      for (const probability of [1e-9, 0.004, 0.3, 0.499, 0.5, 0.61, 0.975, 0.9999]) {
        expectClose(studentCdf(studentQuantile(probability, df), df), probability, 1e-9, `${probability}, df ${df}`);
      }
    }
    expect(studentQuantile(0, 4)).toBe(-Infinity);
    expect(studentQuantile(1, 4)).toBe(Infinity);
  });

  it("gives critical values per level", () => {
    expectClose(studentCritical(90, 16), 1.74588367627625, 1e-11, "90 %");
    expectClose(studentCritical(99, 16), 2.920781622425, 1e-11, "99 %");
  });
});

describe("the normal", () => {
  it("has the printed quantiles and tails", () => {
    expectClose(normalQuantile(0.995), 2.5758293035489, 1e-12, "0.995");
    expectClose(normalQuantile(0.8), 0.841621233572914, 1e-12, "0.8");
    expectClose(normalCdf(-1.96), 0.02499789514822, 1e-11, "Φ(−1.96)");
    // Table 26.2: −log10 of the tail beyond 10 is 23.11805.
    expect(-Math.log10(normalCdf(-10))).toBeCloseTo(23.11805, 5);
    expect(normalQuantile(0)).toBe(-Infinity);
  });
});

describe("the beta distribution", () => {
  it("of whole shapes is a binomial tail", () => {
    for (const [a, b] of [
      [1, 1],
      [2, 5],
      [15, 134],
      [30, 30],
    ] as const) {
      for (const x of [0.02, 0.1, 0.5, 0.83]) expectClose(betaCdf(x, a, b), binomialTail(x, a, b), 1e-11, `${a}, ${b} at ${x}`);
    }
  });

  it("agrees with the integral of its density, and quantiles undo it, for shapes of effective sample sizes", () => {
    for (const [a, b] of [
      [2.4, 12],
      [1, 36.7],
      [19.96, 180.65],
      [440.3, 2400.1],
    ] as const) {
      for (const probability of [0.005, 0.025, 0.05, 0.5, 0.95, 0.975, 0.995]) {
        const x = betaQuantile(probability, a, b);
        expectClose(betaCdf(x, a, b), probability, 1e-10, `${a}, ${b} at ${probability}`);
        expect(Math.abs(integratedBeta(x, a, b) - probability), `${a}, ${b} at ${probability}`).toBeLessThan(1e-10);
        expectClose(betaincinv(probability, a, b), x, 1e-11, `${a}, ${b} at ${probability}, another inverse`);
        if (a + b < 500) expect(Math.abs(jstat.beta.cdf(x, a, b) - probability)).toBeLessThan(1e-8);
      }
    }
    // All but 1e-16 of (0, 1), where a general inverse can answer 0: the limits of a handful of respondents.
    expect(betaQuantile(0.975, 1.2, 0.1)).toBeCloseTo(1, 12);
    expectClose(betaQuantile(0.025, 0.2, 1.1), 8.529322717657e-9, 1e-11, "next to 0");
    expect(betaCdf(0, 2, 3)).toBe(0);
    expect(betaCdf(1, 2, 3)).toBe(1);
  });
});

describe("the F distribution", () => {
  it("has the printed 95 % points (Abramowitz & Stegun, Table 26.9)", () => {
    expect(fisherQuantile(0.95, 5, 10)).toBeCloseTo(3.33, 2);
    expect(fisherQuantile(0.95, 1, 16)).toBeCloseTo(4.49, 2);
    expectClose(fisherQuantile(0.95, 1, 16), studentQuantile(0.975, 16) ** 2, 1e-10, "square of t");
  });

  it("agrees with a second library to 1e-8 and keeps its upper tail", () => {
    for (const [numerator, denominator] of [
      [1, 16],
      [1.92, 30.77],
      [3.24, 81.1],
      [7, 300],
    ] as const) {
      for (const f of [0.2, 1, 3.15, 9.9]) {
        expect(Math.abs(fisherCdf(f, numerator, denominator) - jstat.centralF.cdf(f, numerator, denominator))).toBeLessThan(1e-8);
        const upper = fisherUpperTail(f, numerator, denominator);
        expect(upper + fisherCdf(f, numerator, denominator)).toBeCloseTo(1, 12);
      }
    }
    expectClose(fisherUpperTail(400, 1, 16), studentTwoSidedP(20, 16), 1e-10, "far tail");
    expect(fisherUpperTail(0, 2, 3)).toBe(1);
    expect(fisherCdf(-1, 2, 3)).toBe(0);
  });
});

describe("values outside a distribution's domain", () => {
  it("are refused", () => {
    expect(() => studentQuantile(1.2, 3)).toThrow(RangeError);
    expect(() => studentCdf(1, 0)).toThrow(RangeError);
    expect(() => betaQuantile(0.5, NaN, 1)).toThrow(RangeError);
    expect(() => normalQuantile(NaN)).toThrow(RangeError);
  });
});
