import { expect } from "vitest";

/** Fails unless `actual` is within a relative `tolerance` of `expected`; beside 0, within the tolerance of `scale`. */
export function expectClose(
  actual: number | null | undefined,
  expected: number,
  tolerance: number,
  label: string,
  scale = 0,
): void {
  const reach = tolerance * Math.max(Math.abs(expected), scale);
  const isClose = typeof actual === "number" && Math.abs(actual - expected) <= reach;
  expect(isClose, `${label}: got ${String(actual)}, expected ${expected} within ${reach}`).toBe(true);
}
