import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { boundsOfWithheld } from "../../server/questions/disclosure/audit.ts";
import { suppress } from "../../server/questions/disclosure/suppress.ts";
import { tableShape } from "../../server/questions/nodes.ts";

const MINIMUMS = { respondents: 10, affected: 3, unaffected: 3 };

/** Counts of every node from those of the full cells (respondents without a value: none). */
function countsOf(down: number[], across: number[], respondents: number[], affected: number[]) {
  const shape = tableShape(down, across);
  const cells = shape.nodes.filter((node) => node.kind === "cell");
  const covers = (outer: (number | null)[], inner: (number | null)[]) =>
    outer.every((value, axis) => value === null || value === inner[axis]);
  const counts = shape.nodes.map((node) => {
    const parts = cells.flatMap((cell, i) => (covers(node.key, cell.key) ? [i] : []));
    return {
      respondents: parts.reduce((sum, i) => sum + respondents[i]!, 0),
      affected: parts.reduce((sum, i) => sum + affected[i]!, 0),
    };
  });
  return { shape, counts };
}

describe("suppress", () => {
  it("shows everything when no figure is under the minimums", async () => {
    const { shape, counts } = countsOf([2], [2], [40, 50, 60, 70], [10, 20, 30, 20]);
    expect(await suppress({ counts, lines: shape.lines }, MINIMUMS)).toEqual(counts.map(() => null));
  });

  // Handbook on Statistical Disclosure Control, 2nd ed., §5.2: a lone suppressed cell in a row with a total is no protection.
  it("withholds a second figure in every line where one alone could be worked out from the total", async () => {
    const { shape, counts } = countsOf([3], [2], [4, 50, 60, 70, 80, 90], [1, 20, 30, 20, 30, 30]);
    const withheld = await suppress({ counts, lines: shape.lines }, MINIMUMS);
    for (const line of shape.lines) {
      const hidden = [line.parent, ...line.children].filter((node) => withheld[node] !== null);
      expect(hidden.length).not.toBe(1);
    }
    expect(withheld.filter((reason) => reason === "too-few")).toHaveLength(1);
  });

  it("withholds a figure whose people without the outcome are too few, since the rest of 100 would tell", async () => {
    const { shape, counts } = countsOf([2], [], [40, 60], [39, 30]);
    expect(await suppress({ counts, lines: shape.lines }, MINIMUMS)).toEqual([null, "too-few", "protects-another"]);
  });

  it("leaves nobody's cell as empty rather than withheld", async () => {
    const { shape, counts } = countsOf([2], [], [0, 60], [0, 30]);
    expect(await suppress({ counts, lines: shape.lines }, MINIMUMS)).toEqual([null, "empty", null]);
  });

  it("keeps every withheld count uncertain by the minimums, whatever the table (an attacker's linear programmes)", async () => {
    const table = fc
      .record({
        down: fc.array(fc.integer({ min: 2, max: 3 }), { minLength: 1, maxLength: 2 }),
        across: fc.array(fc.integer({ min: 2, max: 3 }), { maxLength: 1 }),
      })
      .chain(({ down, across }) => {
        const cells = [...down, ...across].reduce((product, size) => product * size, 1);
        const count = fc.integer({ min: 0, max: 60 });
        return fc.record({
          down: fc.constant(down),
          across: fc.constant(across),
          affected: fc.array(count, { minLength: cells, maxLength: cells }),
          unaffected: fc.array(count, { minLength: cells, maxLength: cells }),
        });
      });
    await fc.assert(
      fc.asyncProperty(table, async ({ down, across, affected, unaffected }) => {
        const { shape, counts } = countsOf(
          down,
          across,
          affected.map((value, i) => value + unaffected[i]!),
          affected,
        );
        const withheld = await suppress({ counts, lines: shape.lines }, MINIMUMS);
        const isWithheld = withheld.map((reason) => reason === "too-few" || reason === "protects-another");
        // Everything withheld: nothing is shown that could give anything away.
        if (counts.every(({ respondents }, node) => respondents === 0 || isWithheld[node])) return;
        const exact = await boundsOfWithheld(
          { counts: counts.map(({ respondents }) => respondents), isWithheld, lines: shape.lines },
          Number.POSITIVE_INFINITY,
        );
        exact.forEach((range) => range && expect(range[1] - range[0]).toBeGreaterThanOrEqual(MINIMUMS.respondents - 1e-6));
      }),
      { numRuns: 150, seed: 20251 },
    );
  });
});
