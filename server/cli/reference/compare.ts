/** Relative tolerances (STATISTICS §10): estimates and SEs, intervals and p-values, fits. */
export const EXACT = 1e-9;
export const INTERVAL = 1e-6;
export const FIT = 1e-7;

/** Collects what differs between the product's figures and the expected ones, and which expected fields were not looked at. */
export class Comparison {
  readonly differences: string[] = [];
  readonly unchecked = new Set<string>();
  #checks = 0;

  get checks(): number {
    return this.#checks;
  }

  /**
   * @param scale What a figure that is 0 in theory is measured against: 1e-13 of the estimate's own size counts as 0.
   */
  number(what: string, actual: number | null | undefined, expected: unknown, tolerance: number, scale = 0): void {
    if (typeof expected !== "number") return;
    this.#checks++;
    if (actual === null || actual === undefined) {
      this.differences.push(`${what}: nothing, expected ${expected}`);
      return;
    }
    const allowed = tolerance * Math.abs(expected) + 1e-9 * Math.abs(scale) + Number.MIN_VALUE;
    if (!(Math.abs(actual - expected) <= allowed)) {
      const relative = Math.abs(actual - expected) / Math.max(Math.abs(expected), Number.MIN_VALUE);
      this.differences.push(`${what}: ${actual}, expected ${expected} (off by ${relative.toExponential(1)})`);
    }
  }

  /** Names the fields of `expected` that no check looked at. */
  leave(expected: Readonly<Record<string, unknown>>, looked: readonly string[]): void {
    for (const field of Object.keys(expected)) if (!looked.includes(field)) this.unchecked.add(field);
  }
}
