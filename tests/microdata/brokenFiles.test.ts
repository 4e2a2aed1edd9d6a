import { describe, expect, it } from "vitest";
import { bringIn } from "./support/bringIn.ts";
import { BROKEN_FILES } from "./support/brokenFiles.ts";

describe("a broken file is refused with its kind, line and column", () => {
  it.each(BROKEN_FILES.map((broken) => [broken.name, broken] as const))("%s", async (_name, broken) => {
    const { outcome } = await bringIn(broken.microdata, broken.codebook ?? null);
    expect(outcome).not.toHaveProperty("respondents");
    const problem = outcome.problems.find(({ kind }) => kind === broken.kind);
    expect(problem, JSON.stringify(outcome.problems)).toMatchObject({ severity: "error" });
    expect(problem?.first[0]?.line ?? null).toBe(broken.line);
    if (broken.column !== undefined) expect(problem?.first[0]?.column).toBe(broken.column);
    expect(problem?.message).toMatch(/\.$/);
  });
});

it("counts every place of a kind and shows the first five", async () => {
  const rows = Array.from({ length: 50 }, (_, i) => (i % 5 === 0 ? "much" : "1"));
  const { outcome } = await bringIn(`w,t\n${rows.map((row) => `${row},x`).join("\n")}\n`, "variable,kind\nw,numeric\nt,text\n");
  expect(outcome.problems).toMatchObject([{ kind: "not-a-number", count: 10 }]);
  expect(outcome.problems[0]!.first.map(({ line }) => line)).toEqual([2, 7, 12, 17, 22]);
});

it("gives up on a file where nearly everything is wrong, keeping what it found", async () => {
  const { outcome } = await bringIn(`w\n${"much\n".repeat(60_000)}`, "variable,kind\nw,numeric\n");
  expect(outcome.problems[0]?.count).toBe(20_000);
});
