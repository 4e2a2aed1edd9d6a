import { fileURLToPath } from "node:url";
import { expect, it } from "vitest";
import { runReference } from "../../server/cli/reference/run.ts";

// Independent results (R's survey package and published tables) with their data; each case names its source.
it("brings in every reference case's file and gets its figures from the product's own columns and engine", async () => {
  const lines: string[] = [];
  const counts = await runReference(fileURLToPath(new URL(".", import.meta.url)), (line) => lines.push(line));
  expect(lines.filter((line) => line.startsWith("failed"))).toEqual([]);
  expect(counts.passed).toBeGreaterThanOrEqual(51);
}, 300_000);
