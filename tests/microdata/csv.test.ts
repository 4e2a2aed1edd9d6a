import fc from "fast-check";
import { expect, it } from "vitest";
import { detectDelimiter } from "../../server/microdata/csvRecords.ts";
import { bringIn, readBack } from "./support/bringIn.ts";

const TEXT_CODEBOOK = "variable,label,kind\na,A,text\nb,B,text\n";

// RFC 4180 (2005), section 2: the rules by their numbers.
it("reads fields as RFC 4180 writes them: quotes, doubled quotes, delimiters and breaks inside", async () => {
  const file = 'a,b\r\n"one, two","say ""yes"""\r\nplain,"two\r\nlines"\r\n';
  expect(await readBack(file, TEXT_CODEBOOK)).toEqual({ a: ["one, two", "plain"], b: ['say "yes"', "two\nlines"] });
});

it("takes the last line with or without a break, and a byte order mark", async () => {
  const expected = { a: ["x"], b: ["y"] };
  expect(await readBack("a,b\nx,y", TEXT_CODEBOOK)).toEqual(expected);
  expect(await readBack("\uFEFFa,b\r\nx,y\r\n", TEXT_CODEBOOK)).toEqual(expected);
});

it("finds semicolons and tabs, and reads a decimal comma where semicolons separate", async () => {
  expect(await readBack("w;n\n1,5;2\n2,25;3\n", "variable,kind\nw,numeric\nn,numeric\n")).toEqual({ w: [1.5, 2.25], n: [2, 3] });
  expect(await readBack("w\tn\n1.5\t2\n", "variable,kind\nw,numeric\nn,numeric\n")).toEqual({ w: [1.5], n: [2] });
  expect(detectDelimiter('"a;b;c",d')).toBe(",");
});

it("gives back any table that was written with any delimiter, line end and quoting", async () => {
  const cell = fc.stringMatching(/^[a-z"',;\t é\n]{0,12}$/);
  const table = fc.array(fc.tuple(cell, cell), { minLength: 1, maxLength: 8 });
  await fc.assert(
    fc.asyncProperty(
      table,
      fc.constantFrom(",", ";", "\t"),
      fc.constantFrom("\n", "\r\n"),
      fc.boolean(),
      async (rows, delimiter, newline, quotesAll) => {
        const write = (value: string) =>
          quotesAll || /["\n\r,;\t]/.test(value) ? `"${value.replaceAll('"', '""').replaceAll("\n", newline)}"` : value;
        const lines = [["a", "b"], ...rows].map((row) => row.map(write).join(delimiter));
        const kept = (values: string[]) => values.map((value) => value.trim() || null);
        expect(await readBack(lines.join(newline) + newline, TEXT_CODEBOOK)).toEqual({
          a: kept(rows.map(([a]) => a)),
          b: kept(rows.map(([, b]) => b)),
        });
      },
    ),
    { numRuns: 150 },
  );
});

it("names the line of the file, breaks inside quotes counted", async () => {
  const { outcome } = await bringIn('a,b\n"1\n2\n3",x\nfour,y\n', "variable,kind\na,numeric\nb,text\n");
  expect(outcome.problems.find(({ kind }) => kind === "not-a-number")?.first).toEqual([
    { line: 2, column: "a", value: "1␣2␣3" },
    { line: 5, column: "a", value: "four" },
  ]);
});
