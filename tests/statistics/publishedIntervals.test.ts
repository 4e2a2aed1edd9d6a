import { describe, expect, it } from "vitest";
import { adjustPValues } from "../../server/statistics/adjustments.ts";
import { intervalFor, type IntervalMethod, moverInterval } from "../../server/statistics/intervals.ts";

/** A share of a simple random sample, with the normal distribution: the setting of the published tables. */
function simpleInterval(method: IntervalMethod, events: number, n: number) {
  const estimate = events / n;
  const se = Math.sqrt((estimate * (1 - estimate)) / n);
  return intervalFor(method, { estimate, se, n, df: Infinity, level: 95, isBinary: true });
}

// Newcombe RG. Statistics in Medicine 1998; 17: 857-872. x, n, then Wald, Wilson and Clopper–Pearson limits.
const ONE_SAMPLE: [number, number, [number, number], [number, number], [number, number]][] = [
  [81, 263, [0.2522, 0.3638], [0.2553, 0.3662], [0.2527, 0.3676]],
  [15, 148, [0.0527, 0.15], [0.0624, 0.1605], [0.0578, 0.1617]],
  [0, 20, [0, 0], [0, 0.1611], [0, 0.1684]],
  [1, 29, [0, 0.1009], [0.0061, 0.1718], [0.0009, 0.1776]],
  [29, 29, [1, 1], [0.883, 1], [0.8806, 1]],
  [10, 10, [1, 1], [0.7225, 1], [0.6915, 1]],
  [5, 50, [0.0168, 0.1832], [0.0435, 0.2136], [0.0333, 0.2181]],
];

describe("intervals of one proportion as Newcombe (1998) prints them", () => {
  it.each(ONE_SAMPLE)("%i of %i", (events, n, wald, wilson, clopperPearson) => {
    const published = { linear: wald, wilson, "korn-graubard": clopperPearson } as const;
    for (const [method, [low, high]] of Object.entries(published)) {
      const actual = simpleInterval(method as IntervalMethod, events, n);
      expect(actual.low, method).toBeCloseTo(low, 4);
      expect(actual.high, method).toBeCloseTo(high, 4);
    }
  });

  it("says that a linear limit below 0 was drawn in", () => {
    expect(simpleInterval("linear", 1, 29)).toMatchObject({ low: 0, clipped: true });
    expect(simpleInterval("linear", 81, 263)).toMatchObject({ clipped: false });
  });

  it("has no logit interval at 0 or 1", () => {
    expect(simpleInterval("logit", 0, 20)).toEqual({ low: null, high: null, clipped: false });
    expect(simpleInterval("logit", 20, 20)).toEqual({ low: null, high: null, clipped: false });
  });
});

// Newcombe RG. Statistics in Medicine 1998; 17: 873-890, Table II, method 10.
const TWO_SAMPLES: [number, number, number, number, number, number][] = [
  [56, 70, 48, 80, 0.0524, 0.3339],
  [9, 10, 3, 10, 0.1705, 0.809],
  [6, 7, 2, 7, 0.0582, 0.8062],
  [5, 56, 0, 29, -0.0381, 0.1926],
  [0, 10, 0, 20, -0.1611, 0.2775],
  [0, 10, 0, 10, -0.2775, 0.2775],
  [10, 10, 0, 20, 0.6791, 1],
  [10, 10, 0, 10, 0.6075, 1],
  [84, 101, 89, 105, -0.1177, 0.0851],
];

describe("intervals of a difference by Newcombe's method 10", () => {
  it.each(TWO_SAMPLES)("%i/%i less %i/%i", (x, n, otherX, otherN, low, high) => {
    const side = (events: number, size: number) => {
      const { low: below, high: above } = simpleInterval("wilson", events, size);
      if (below === null || above === null) throw new Error("Wilson limits always exist");
      return { estimate: events / size, low: below, high: above };
    };
    const actual = moverInterval(side(x, n), side(otherX, otherN), 0);
    expect(actual.low).toBeCloseTo(low, 4);
    expect(actual.high).toBeCloseTo(high, 4);
  });

  it("is narrower when the two estimates rise and fall together", () => {
    const side = { estimate: 0.3, low: 0.2, high: 0.4 };
    const apart = moverInterval(side, { ...side, estimate: 0.31 }, 0);
    const together = moverInterval(side, { ...side, estimate: 0.31 }, 0.8);
    expect(together.high - together.low).toBeLessThan(0.6 * (apart.high - apart.low));
  });
});

// Benjamini Y, Hochberg Y. JRSS B 1995; 57: 289-300: fifteen p-values of the thrombolysis trial.
const THROMBOLYSIS = [
  0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.324, 0.4262, 0.5719, 0.6528, 0.759, 1,
];

describe("adjusted p-values", () => {
  it("are those of Benjamini and Hochberg's example, of which the first four are below 0.05", () => {
    const adjusted = adjustPValues(THROMBOLYSIS, "benjamini-hochberg");
    [0.0015, 0.003, 0.0095, 0.035625, 0.0603, 0.063857, 0.063857, 0.0645, 0.0765, 0.486].forEach((p, index) => {
      expect(adjusted[index]).toBeCloseTo(p, 6);
    });
    expect(adjusted.filter((p) => p !== null && p <= 0.05)).toHaveLength(4);
  });

  it("are Holm's for the same example, of which three are below 0.05", () => {
    const adjusted = adjustPValues(THROMBOLYSIS, "holm");
    [0.0015, 0.0056, 0.0247, 0.114, 0.2211, 0.278, 0.278, 0.278, 0.3213, 1].forEach((p, index) => {
      expect(adjusted[index]).toBeCloseTo(p, 6);
    });
    expect(adjusted.filter((p) => p !== null && p <= 0.05)).toHaveLength(3);
  });

  it("keep the order given, and leave out of the family what could not be tested", () => {
    expect(adjustPValues([0.01, null, 0.04, 0.03, 0.005], "holm")).toEqual([0.03, null, 0.06, 0.06, 0.02]);
    expect(adjustPValues([0.01, 0.04, null, 0.03, 0.005], "benjamini-hochberg")).toEqual([0.02, 0.04, null, 0.04, 0.02]);
  });

  it("are the raw ones when none is asked for", () => {
    expect(adjustPValues([0.2, null], "none")).toEqual([0.2, null]);
  });
});
