import { describe, expect, it } from "vitest";
import { figureDecimals, formatDifferenceInterval, formatFigure, formatInterval } from "../../shared/figures.ts";
import { differenceSentences, estimateSentence, naturalBase, type ReadingContext } from "../../shared/reading.ts";
import { compared, shownCell } from "../pages/questions/askFixtures.ts";

const context: ReadingContext = {
  kind: "share",
  group: "people with Sex: Men",
  outcome: "Smoking now: Daily",
  average: "mean",
  correction: null,
  comparison: { kind: "all" },
  reference: "everyone",
  isAdjusted: false,
};

describe("what a share means in words", () => {
  it("is told in whole people of every 100, with the ends of its interval", () => {
    const cell = shownCell(["2"], { estimate: 0.3841, low: 0.336, high: 0.435 });
    expect(estimateSentence(cell, context)).toBe(
      "Of every 100 people with Sex: Men, about 38 have Smoking now: Daily (34 to 44).",
    );
  });

  it("is told of every 1,000 or 10,000 where whole people of 100 would say nothing", () => {
    expect([0.5, 0.01, 0.0099, 0.9985, 0.0004, 0, 1].map(naturalBase)).toEqual([100, 100, 1000, 1000, 10_000, 100, 100]);
    const cell = shownCell(["2"], { estimate: 0.0041, low: 0.001, high: 0.0093 });
    expect(estimateSentence(cell, context)).toContain("Of every 1,000 people with Sex: Men, about 4 have");
  });

  it("says none and all where nobody or everybody in the survey was affected, with the interval that remains", () => {
    expect(estimateSentence(shownCell([], { estimate: 0, low: 0, high: 0.036 }), context)).toContain(
      "none have Smoking now: Daily (0 to 4)",
    );
    expect(estimateSentence(shownCell([], { estimate: 1, low: 0.94, high: 1 }), context)).toContain(
      "all have Smoking now: Daily (94 to 100)",
    );
  });

  it("leaves an interval out that can't be worked out", () => {
    expect(estimateSentence(shownCell([], { low: null, high: null }), context)).toMatch(/about 38 have Smoking now: Daily\.$/);
  });
});

describe("what a difference means in words", () => {
  it("counts more and fewer people", () => {
    const higher = shownCell(["2"], { comparison: { ...compared(0.384, 0.213, 0.045) } });
    expect(differenceSentences(higher, context)).toEqual(["That is 17 more than among everyone (13 to 22 more)."]);
    const lower = shownCell(["2"], { comparison: { ...compared(0.1, 0.213, 0.045) } });
    expect(differenceSentences(lower, context)[0]).toBe("That is 11 fewer than among everyone (7 to 16 fewer).");
  });

  it("never calls a difference that isn't shown none, and says what would have been found", () => {
    const cell = shownCell(["2"], { comparison: { ...compared(0.22, 0.213, 0.05), detectable: 0.071 } });
    expect(differenceSentences(cell, context)).toEqual([
      "No difference from everyone is shown: 1 more than among everyone (4 fewer to 6 more).",
      "A true difference of 7.1 points or more would probably have been found; a smaller one may be there.",
    ]);
  });

  it("names a reference group as people, and a target as a number", () => {
    const cell = shownCell(["2"], { comparison: compared(0.384, 0.2, 0.045) });
    const group = { ...context, comparison: { kind: "group", breakdown: "sex", value: "1" } as const, reference: "Sex: Women" };
    expect(differenceSentences(cell, group)[0]).toContain("more than among people with Sex: Women");
    const target = { ...context, comparison: { kind: "target", value: 0.2 } as const, reference: "20 of every 100" };
    expect(differenceSentences(cell, target)[0]).toContain("That is 18 more than 20 of every 100");
  });

  it("tells a mean in its own units", () => {
    const mean: ReadingContext = { ...context, kind: "mean", outcome: "Distress score" };
    const cell = shownCell(["2"], { estimate: 8.54, low: 7.9, high: 9.18, comparison: compared(8.54, 7.3, 0.9) });
    expect(estimateSentence(cell, mean)).toBe(
      "Among people with Sex: Men, the mean of Distress score is about 8.5 (7.9 to 9.2).",
    );
    expect(differenceSentences(cell, mean)[0]).toBe("That is 1.2 higher than among everyone (0.3 to 2.1 higher).");
  });

  it("says nothing where nothing is compared, and says so where the difference has no value", () => {
    expect(differenceSentences(shownCell(["2"]), context)).toEqual([]);
    const cell = shownCell(["2"], { comparison: { ...compared(0.3, 0.2, 0.1), difference: null, low: null, high: null } });
    expect(differenceSentences(cell, context)).toEqual(["The difference from everyone can't be worked out."]);
  });
});

describe("figures of a table", () => {
  it("have one decimal, and none when the interval is wider than ten points", () => {
    expect(figureDecimals("share", 0.2, 0.3)).toBe(1);
    expect(figureDecimals("share", 0.2, 0.3001)).toBe(0);
    expect(formatInterval("share", 0.1063, 0.1829)).toBe("10.6 to 18.3");
    expect(formatInterval("share", 0.1, 0.35)).toBe("10 to 35");
    expect(formatInterval("share", null, 0.3)).toBeNull();
  });

  it("of a mean have decimals that fit the interval's width", () => {
    expect([
      figureDecimals("mean", 7.9, 9.2),
      figureDecimals("mean", 120, 145),
      figureDecimals("mean", 0.12, 0.13),
      figureDecimals("mean", 3, 3),
    ]).toEqual([1, 0, 3, 2]);
    expect(formatFigure("mean", 1234.5, 1)).toBe("1,234.5");
  });

  it("of a difference carry their sign, and a true minus", () => {
    expect(formatDifferenceInterval("share", -0.0668, 0.0211)).toBe("−6.7 to +2.1");
    expect(formatDifferenceInterval("share", -0.0002, 0.0211)).toBe("0.0 to +2.1");
  });
});
