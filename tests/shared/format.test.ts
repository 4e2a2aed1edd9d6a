import { describe, expect, it } from "vitest";
import {
  formatBytes,
  formatCounted,
  formatDate,
  formatDateTime,
  formatNumber,
  formatP,
  formatPeople,
  formatPer100,
  formatPer100Interval,
  formatPercent,
  formatPoints,
  formatSignificant,
  percentDecimals,
} from "../../shared/format.ts";

describe("percentages", () => {
  it("have one decimal", () => {
    expect(formatPer100(0.1409)).toBe("14.1");
    expect(formatPercent(0.97, 0)).toBe("97\u00a0%");
  });

  it("lose the decimal only when the interval is wider than ten points, and give the interval the same decimals", () => {
    expect(formatPer100Interval(0.106, 0.183)).toBe("10.6 to 18.3");
    expect(percentDecimals(0.3, 0.4)).toBe(1);
    expect(percentDecimals(0.3, 0.401)).toBe(0);
    expect(formatPer100Interval(0.2, 0.4)).toBe("20 to 40");
    expect(percentDecimals(null, 0.4)).toBe(1);
  });
});

describe("differences", () => {
  it("carry their sign, with a true minus", () => {
    expect(formatPoints(0.156)).toBe("+15.6");
    expect(formatPoints(-0.072)).toBe("\u22127.2");
  });

  it("have no sign when they round to nothing", () => {
    expect(formatPoints(-0.0001)).toBe("0.0");
    expect(formatPoints(0.0001)).toBe("0.0");
    expect(formatNumber(-0)).toBe("0");
  });
});

describe("people", () => {
  it("are given to three significant figures and never in parts", () => {
    expect(formatPeople(5483.2)).toBe("5,480");
    expect(formatPeople(1_234_567)).toBe("1,230,000");
    expect(formatPeople(999.6)).toBe("1,000");
    expect(formatPeople(41.4)).toBe("41");
    expect(formatPeople(0.4)).toBe("0");
    expect(formatPeople(0)).toBe("0");
  });
});

describe("p-values", () => {
  it("have three decimals and are never nothing", () => {
    expect(formatP(0.0426)).toBe("0.043");
    expect(formatP(0.00049)).toBe("<\u00a00.001");
    expect(formatP(0.0005)).toBe("0.001");
    expect(formatP(0)).toBe("<\u00a00.001");
    expect(formatP(0.9998)).toBe(">\u00a00.999");
    expect(formatP(1)).toBe("1.000");
  });
});

describe("other figures", () => {
  it("keep three significant figures whatever their size", () => {
    expect(formatSignificant(0.012345)).toBe("0.0123");
    expect(formatSignificant(1.6249)).toBe("1.62");
    expect(formatSignificant(-1234.5)).toBe("\u22121,235");
    expect(formatSignificant(0)).toBe("0");
  });

  it("name sizes and counts in words", () => {
    expect(formatBytes(999)).toBe("999\u00a0bytes");
    expect(formatBytes(4_120_000)).toBe("4.1\u00a0MB");
    expect(formatCounted(1, "row")).toBe("1 row");
    expect(formatCounted(2000, "row")).toBe("2,000 rows");
    expect(formatCounted(2, "survey has", "surveys have")).toBe("2 surveys have");
  });
});

describe("dates", () => {
  it("are written out, a day in UTC", () => {
    expect(formatDate("2026-12-01")).toBe("1 December 2026");
    expect(formatDate("2026-12-01T23:59:00.000Z")).toBe("1 December 2026");
    expect(formatDateTime("2026-12-01T14:05:00.000Z", "UTC")).toBe("1 December 2026, 14:05");
  });
});
