import { describe, expect, it } from "vitest";
import { adjustedEffectiveSize, effectiveSize, intervalFor } from "../../server/statistics/intervals.ts";
import { reliabilityOfMean, reliabilityOfShare, type ShareEvidence } from "../../server/statistics/reliability.ts";

function evidence(estimate: number, se: number, n: number, df: number): ShareEvidence {
  const affectedRespondents = Math.round(estimate * n);
  return { estimate, se, respondents: n, affectedRespondents, df, effectiveBeforeAdjustment: effectiveSize(estimate, se, n) };
}

// Parker et al. (2017), Vital and Health Statistics Series 2, No. 175, by the steps of the Center's macro
// calculate_KornGraubard_CIs 2.0: p, se, n, df, effective n, the same adjusted for df, limits, verdict.
type Vector = [number, number, number, number, number, number, number, number, string, string[]];
const VECTORS: Vector[] = [
  [0.1, 0.02, 500, 20, 225, 199.60647, 0.062126, 0.150271, "reliable", []],
  [0.5, 0.05, 400, 16, 100, 86.0007, 0.390178, 0.609822, "reliable", []],
  [0.02, 0.01, 300, 16, 196, 168.904919, 0.004687, 0.05428, "reliable", []],
  [0.02, 0.006, 800, 30, 544.444444, 502.966589, 0.009656, 0.03641, "reliable", []],
  [0.95, 0.02, 200, 30, 118.75, 110.713591, 0.891296, 0.982371, "reliable", ["the share without the outcome may be unreliable"]],
  [0.3, 0.08, 60, 12, 32.8125, 27.675256, 0.141923, 0.502844, "unreliable", ["interval 30 points wide or wider"]],
  [0.15, 0.05, 80, 6, 51, 33.747077, 0.051005, 0.31486, "unreliable", ["interval wider than 130 % of the estimate"]],
  [0, 0, 100, 16, 100, 100, 0, 0.036217, "caution", ["no respondent has the outcome"]],
  [0, 0, 40, 16, 40, 40, 0, 0.088097, "caution", ["no respondent has the outcome"]],
  [1, 0, 60, 16, 60, 60, 0.940371, 1, "caution", ["every respondent has the outcome"]],
  [0.1, 0.005, 200, 16, 3600, 200, 0.062159, 0.150213, "reliable", []],
];

describe("the Center for Health Statistics' steps for proportions", () => {
  it.each(VECTORS)("p %f, se %f, n %i, df %i", (p, se, n, df, effective, adjusted, low, high, verdict, reasons) => {
    expect(effectiveSize(p, se, n)).toBeCloseTo(effective, 6);
    expect(adjustedEffectiveSize(p, se, n, df, 95)).toBeCloseTo(adjusted, 6);
    const interval = intervalFor("korn-graubard", { estimate: p, se, n, df, level: 95, isBinary: true });
    expect(interval.low).toBeCloseTo(low, 6);
    expect(interval.high).toBeCloseTo(high, 6);
    expect(reliabilityOfShare(evidence(p, se, n, df))).toEqual({ verdict, reasons });
  });

  it("without an adjustment for degrees of freedom gives the wider table's limits", () => {
    // The twelfth vector: .10, .02, 500, no adjustment. Degrees of freedom n − 1 make the two t values equal.
    const interval = intervalFor("korn-graubard", { estimate: 0.1, se: 0.02, n: 500, df: 499, level: 95, isBinary: true });
    expect(interval.low).toBeCloseTo(0.064101, 6);
    expect(interval.high).toBeCloseTo(0.146863, 6);
  });

  it("compares with 30 respondents before the adjustment for degrees of freedom", () => {
    const few = reliabilityOfShare(evidence(0.5, Math.sqrt(0.25 / 29), 29, 28));
    expect(few.reasons).toContain("fewer than 30 respondents");
    const effective = reliabilityOfShare(evidence(0.5, Math.sqrt(0.25 / 29), 200, 100));
    expect(effective.reasons).toContain("effective sample size under 30");
    expect(reliabilityOfShare(evidence(0.5, Math.sqrt(0.25 / 30), 200, 100)).reasons.join()).not.toContain("sample size");
  });

  it("reviews few degrees of freedom only where nothing is suppressed", () => {
    expect(reliabilityOfShare(evidence(0.3, 0.02, 2000, 7))).toEqual({
      verdict: "caution",
      reasons: ["fewer than 8 degrees of freedom"],
    });
    expect(reliabilityOfShare(evidence(0.3, 0.02, 2000, 8)).verdict).toBe("reliable");
  });

  it("reviews a share that rests on one respondent, or on all but one", () => {
    expect(reliabilityOfShare(evidence(1 / 200, 0.005, 200, 50)).reasons).toEqual(["only one respondent has the outcome"]);
    const without = reliabilityOfShare(evidence(199 / 200, 0.005, 200, 50));
    expect(without).toEqual({ verdict: "caution", reasons: ["only one respondent is without the outcome"] });
  });

  it("has a verdict where there is nothing to go by", () => {
    const nothing = { estimate: null, se: null, respondents: 0, affectedRespondents: 0, df: 0, effectiveBeforeAdjustment: null };
    expect(reliabilityOfShare(nothing)).toEqual({ verdict: "unreliable", reasons: ["no respondents"] });
    expect(reliabilityOfShare({ ...evidence(0.2, 0.01, 500, 20), se: null }).verdict).toBe("unreliable");
    expect(reliabilityOfShare({ ...evidence(0.2, 0.01, 500, 0), df: 0 }).reasons).toEqual([
      "too few sampling units for an interval",
    ]);
  });
});

describe("the verdict on a mean (limits of common practice)", () => {
  const mean = { estimate: 10, se: 1, respondents: 200, df: 20 };
  it("turns with the relative standard error", () => {
    expect(reliabilityOfMean(mean).verdict).toBe("reliable");
    expect(reliabilityOfMean({ ...mean, se: 3 }).verdict).toBe("reliable");
    expect(reliabilityOfMean({ ...mean, se: 3.01 }).verdict).toBe("caution");
    expect(reliabilityOfMean({ ...mean, se: 5.01 }).verdict).toBe("unreliable");
    expect(reliabilityOfMean({ ...mean, estimate: -10, se: 3.01 }).verdict).toBe("caution");
  });
  it("asks for 30 respondents and 8 degrees of freedom", () => {
    expect(reliabilityOfMean({ ...mean, respondents: 29 }).verdict).toBe("unreliable");
    expect(reliabilityOfMean({ ...mean, df: 7 }).verdict).toBe("caution");
    expect(reliabilityOfMean({ ...mean, df: 0 }).verdict).toBe("unreliable");
    expect(reliabilityOfMean({ ...mean, estimate: null }).verdict).toBe("unreliable");
    expect(reliabilityOfMean({ ...mean, se: null }).verdict).toBe("unreliable");
  });
});
