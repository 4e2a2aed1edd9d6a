import { render, screen, within } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { DotField } from "../../../src/charts/DotField.tsx";
import { fitLabel, layOutForest, type ForestRow } from "../../../src/charts/forestLayout.ts";
import { differenceRows, intervalRows } from "../../../src/features/questions/plots.ts";
import { askOf, tableOf } from "./askFixtures.ts";

const row = (id: string, value: number | null, half = 2, heading: string | null = null): ForestRow => ({
  id,
  heading,
  label: id,
  value,
  low: value === null ? null : value - half,
  high: value === null ? null : value + half,
  reference: null,
  tone: "plain",
  figures: "",
});

describe("the layout of an interval plot", () => {
  it("keeps every interval and nothing itself on its axis", () => {
    const { x, ticks } = layOutForest([row("a", 12), row("b", 31)], 800, true);
    const [from = 0, to = 0] = x.domain();
    expect(from).toBe(0);
    expect(to).toBeGreaterThanOrEqual(33);
    expect(ticks.every((tick) => tick >= from && tick <= to)).toBe(true);
    const [left = 0, right = 0] = x.range();
    for (const end of [10, 33]) expect(x(end)).toSatisfy((at: number) => at >= left && at <= right);
  });

  it("puts a heading above the first of its groups alone, and no two rows over each other", () => {
    const { rows, axisY } = layOutForest([row("a", 1, 1, "A"), row("b", 2, 1, "A"), row("c", 3, 1, "B")], 800, true);
    expect(rows.map(({ headingY }) => headingY !== null)).toEqual([true, false, true]);
    for (const [index, { top }] of rows.entries()) {
      const before = rows[index - 1];
      if (before) expect(top).toBeGreaterThanOrEqual(before.top + before.height);
    }
    expect(axisY).toBeGreaterThan(rows.at(-1)?.y ?? Infinity);
  });

  it("gives labels their own line on a phone", () => {
    const wide = layOutForest([row("a", 1)], 800, true);
    const narrow = layOutForest([row("a", 1)], 328, true);
    expect(wide.gutter).toBeGreaterThan(0);
    expect(narrow.gutter).toBe(0);
    expect(narrow.rows[0]?.height).toBeGreaterThan(wide.rows[0]?.height ?? 0);
  });

  it("holds with nothing to draw, and with one value alone", () => {
    expect(layOutForest([row("a", null)], 800, false).x.domain()).toEqual([0, 1]);
    const [from = 0, to = 0] = layOutForest([row("a", 5, 0)], 800, false).x.domain();
    expect(to).toBeGreaterThan(from);
  });

  it("cuts labels to their room", () => {
    expect(fitLabel("Unable to work through illness", 100)).toBe("Unable to wo…");
    expect(fitLabel("Men", 100)).toBe("Men");
  });
});

describe("the rows of a plot", () => {
  const table = tableOf(
    askOf({ down: [{ variable: "settlement" }], across: [{ variable: "sex" }], comparison: { kind: "all" } }),
  );

  it("are the table's groups with its figures, everyone last", () => {
    const rows = intervalRows(table);
    expect(rows.map(({ heading, label }) => `${heading ?? ""}: ${label}`).at(-1)).toBe("Everyone: All together");
    expect(rows[0]).toMatchObject({ heading: "Town", figures: "36.9 (32.7 to 41.9)", reference: 21.3, tone: "higher" });
  });

  it("leave everyone out of differences from everyone", () => {
    expect(differenceRows(table)).toHaveLength(6);
  });
});

describe("the field of a hundred dots", () => {
  const count = (look: string) =>
    within(screen.getByRole("figure")).getByRole("img").querySelectorAll(`circle[class~="${look}"]`).length;

  it("fills as many as the low limit, darkens up to the estimate and pales up to the high limit", () => {
    render(<DotField estimate={0.3841} low={0.336} high={0.435} text="about 38 of 100" />);
    expect([count("fill-higher"), count("fill-higher-text"), count("fill-higher/25"), count("fill-transparent")]).toEqual([
      34, 4, 6, 56,
    ]);
    expect(screen.getByRole("img", { name: "about 38 of 100" })).toBeInTheDocument();
  });
});
