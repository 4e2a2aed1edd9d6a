import Papa from "papaparse";
import { describe, expect, it } from "vitest";
import { tableCsv } from "../../../src/features/questions/tableCsv.ts";
import { tableText } from "../../../src/features/questions/tableText.ts";
import { ageBands, askOf, tableOf } from "./askFixtures.ts";

const question = askOf({ down: [ageBands], across: [{ variable: "sex" }], comparison: { kind: "all" } });

function parse(csv: string) {
  const [header = [], ...lines] = Papa.parse<string[]>(csv).data;
  const end = lines.findIndex((line) => line.length === 1 && line[0] === "");
  const rows = lines.slice(0, end).map((line) => new Map(header.map((name, index) => [name, line[index] ?? ""])));
  return { header, rows, notes: lines.slice(end + 1).map(([note]) => note ?? "") };
}

describe("a table as CSV", () => {
  const { rows, notes } = parse(tableCsv(tableOf(question)));
  const row = (group: string) => rows.find((row) => row.get("group") === group);

  it("holds every group, margin and the whole at full precision", () => {
    expect(rows).toHaveLength(1 + 6 + 2 + 12);
    expect(Number(row("18–24, Women")?.get("estimate"))).toBe(0.369);
    expect(row("18–24, Women")?.get("difference")).toBe(String(0.369 - 0.213));
    expect(row("Everyone")?.get("Sex")).toBe("Everyone");
  });

  it("says why a figure is withheld and holds none of its figures", () => {
    const withheld = row("65 and over, Men");
    expect(withheld?.get("status")).toBe("withheld: too few respondents");
    for (const name of ["respondents", "people", "estimate", "se", "low", "high", "difference", "p"])
      expect(withheld?.get(name)).toBe("");
  });

  it("carries question, source, method and what the numbers are", () => {
    expect(notes[0]).toBe(
      "Question: In Tamarisk Coast Adult Health Survey, 2025, of every 100 people, how many have Smoking now: Daily? Split by Age in years in bands down and Sex across. Compared with everyone.",
    );
    expect(notes[1]).toContain("Source: Tamarisk Coast Adult Health Survey, 2025; microdata checksum c0ffee");
    expect(notes.some((note) => note.includes("Korn–Graubard"))).toBe(true);
  });

  it("keeps text from running as a formula, and negative numbers as numbers", () => {
    const table = tableOf(question);
    const [first] = table.breakdowns;
    if (first?.values[0]) first.values[0].label = "=HYPERLINK(1)";
    const { rows } = parse(tableCsv(table));
    expect(rows.some((row) => row.get("group")?.startsWith("'=HYPERLINK"))).toBe(true);
    expect(rows.some((row) => row.get("difference")?.startsWith("-0."))).toBe(true);
  });
});

describe("a table as text", () => {
  const lines = tableText(tableOf(question), ["interval", "difference", "respondents"])
    .split("\n")
    .map((line) => line.split("\t"));

  it("has the question above, a header for every column, and plain numbers as they stand in the cells", () => {
    const [caption, header, first] = lines;
    expect(caption?.[0]).toContain("how many have Smoking now: Daily?");
    expect(header?.slice(0, 6)).toEqual([
      "Group",
      "Women: of every 100",
      "Women: low",
      "Women: high",
      "Women: difference",
      "Women: n",
    ]);
    expect(header?.at(-1)).toBe("Everyone: n");
    expect(first?.slice(0, 6)).toEqual(["18–24", "36.9", "32.7", "41.9", "16", "249"]);
    expect(lines.every((line, index) => index === 0 || line.length === header?.length)).toBe(true);
  });

  it("says that a figure is withheld, and ends with everyone", () => {
    expect(lines.find(([group]) => group === "65 and over")?.slice(6, 11)).toEqual([
      "withheld: too few respondents",
      "",
      "",
      "",
      "",
    ]);
    expect(lines.at(-1)?.[0]).toBe("Everyone");
  });

  it("writes nested groups with their path", () => {
    const nested = tableText(tableOf(askOf({ down: [{ variable: "settlement" }, { variable: "sex" }] })), []).split("\n");
    expect(nested.slice(2, 5).map((line) => line.split("\t")[0])).toEqual(["Town", "Town, Women", "Town, Men"]);
  });
});
