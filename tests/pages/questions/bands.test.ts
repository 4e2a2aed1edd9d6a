import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bandOf, bandPresets, bandsRemark, bandsText, readBands } from "../../../src/features/questions/bands.ts";

describe("typed bands", () => {
  it("are read in every usual way of writing them", () => {
    expect(readBands("18–24, 25-34; 35 to 44\n≤17, 65+, 80 and over, >= 90, 7, young: 18–24")).toEqual({
      bands: [
        [18, 24, "18–24"],
        [25, 34, "25–34"],
        [35, 44, "35–44"],
        [null, 17, "up to 17"],
        [65, null, "65 and over"],
        [80, null, "80 and over"],
        [90, null, "90 and over"],
        [7, 7, "7"],
        [18, 24, "young"],
      ],
    });
    expect(readBands("-5 to -1, −0.5–0.5")).toEqual({ bands: [bandOf(-5, -1), bandOf(-0.5, 0.5)] });
  });

  it("come back as they were read", () => {
    const end = fc.integer({ min: -200, max: 200 });
    const band = fc.oneof(
      fc.tuple(end, end).map(([a, b]) => bandOf(Math.min(a, b), Math.max(a, b))),
      end.map((from) => bandOf(from, null)),
      end.map((to) => bandOf(null, to)),
    );
    fc.assert(
      fc.property(fc.array(band, { minLength: 1, maxLength: 8 }), (bands) => {
        expect(readBands(bandsText(bands))).toEqual({ bands });
      }),
    );
  });

  it("that can't be read are named, with how to write them", () => {
    expect(readBands("18–24, teenagers")).toEqual({
      problem: "“teenagers” isn't a band. Write two ends such as 18–24, or one open end such as 65+.",
    });
    expect(readBands("30–20")).toEqual({ problem: "“30–20”: A band's low end is above its high end." });
    expect(readBands(" , ")).toHaveProperty("problem");
  });

  it("are remarked on where values fall between them or in two of them", () => {
    expect(bandsRemark([bandOf(18, 24), bandOf(30, 40)], true)).toBe(
      "Values between 24 and 30 belong to no band and are left out.",
    );
    expect(bandsRemark([bandOf(18, 24), bandOf(25, 40)], true)).toBeNull();
    expect(bandsRemark([bandOf(18, 24), bandOf(25, 40)], false)).toContain("between 24 and 25");
    expect(bandsRemark([bandOf(0, 10), bandOf(10, 20)], false)).toBeNull();
    expect(bandsRemark([bandOf(0, 10), bandOf(10, 20)], true)).toContain("first of them");
  });

  it("are ready-made for ages, and for numbers whose ends are known", () => {
    const age = { name: "age", label: "Age in years", isWhole: true, minimum: null, maximum: null };
    expect(bandsText(bandPresets(age)[0]?.bands ?? [])).toBe("18–24, 25–34, 35–44, 45–54, 55–64, 65–74, 75+");
    const score = { name: "score", label: "", isWhole: true, minimum: 0, maximum: 40 };
    expect(bandsText(bandPresets(score)[0]?.bands ?? [])).toBe("up to 9, 10–19, 20–29, 30+");
    expect(bandPresets({ ...score, name: "wage", minimum: null, maximum: null })[0]?.name).not.toBe("Ten years");
  });
});
