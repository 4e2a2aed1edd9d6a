import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { assembleColumn } from "../../server/microdata/columns.ts";
import { decodeNumbers, encodeCodes, encodeNumbers, encodeTexts } from "../../server/microdata/segments.ts";
import { bringIn, readBack } from "./support/bringIn.ts";

describe("segments", () => {
  it("keep numbers exactly in the narrowest type that can", () => {
    const widths: [number[], string][] = [
      [[0, 127, -127], "int8"],
      [[128], "int16"],
      [[-128], "int16"],
      [[40_000], "int32"],
      [[2 ** 31], "float64"],
      [[0.1], "float64"],
      [[-0], "float64"],
    ];
    for (const [values, encoding] of widths) {
      const segment = encodeNumbers(Float64Array.from([...values, Number.NaN]));
      expect(segment.encoding).toBe(encoding);
      expect([...assembleColumn("number", [segment], values.length + 1).values]).toEqual([...values, Number.NaN]);
    }
  });

  it("give any numbers back, whatever their mixture", () => {
    fc.assert(
      fc.property(
        fc.array(fc.oneof(fc.integer(), fc.double({ noNaN: true, noDefaultInfinity: true }), fc.constant(Number.NaN)), {
          minLength: 1,
        }),
        (values) => {
          const column = assembleColumn("number", [encodeNumbers(Float64Array.from(values))], values.length);
          expect([...column.values]).toEqual(values);
        },
      ),
    );
  });

  it("join parts of different widths, missing values kept", () => {
    const parts = [encodeNumbers(Float64Array.from([1, Number.NaN])), encodeNumbers(Float64Array.from([1e9, 0.5]))];
    expect([...assembleColumn("number", parts, 4).values]).toEqual([1, Number.NaN, 1e9, 0.5]);
  });

  it("hold 255 categories in a byte and 256 in two, missing apart from all of them", () => {
    const positions = Uint32Array.from([0, 254, 0xffffffff]);
    expect([...decodeNumbers(encodeCodes(positions, 255))]).toEqual([0, 254, 255]);
    expect([...decodeNumbers(encodeCodes(Uint32Array.from([255, 0xffffffff]), 256))]).toEqual([255, 65_535]);
  });

  it("are refused when a byte has changed", () => {
    const segment = encodeNumbers(Float64Array.from([1, 2, 3]));
    const bytes = Uint8Array.from(segment.bytes);
    bytes[bytes.length - 20]! ^= 1;
    expect(() => decodeNumbers({ ...segment, bytes })).toThrow(/checksum/);
  });

  it("number texts by first appearance across parts", () => {
    const column = assembleColumn("text", [encodeTexts(["b", ""]), encodeTexts(["a", "b"])], 4);
    expect([...column.values]).toEqual([0, 0xffffffff, 1, 0]);
    expect(column.texts).toEqual(["b", "a"]);
  });
});

describe("kinds guessed without a codebook", () => {
  it("are categorical for few whole numbers or repeated words, numeric otherwise, text for free text", async () => {
    const rows = Array.from({ length: 60 }, (_, i) => `${i % 3},${i + 0.5},${i % 2 ? "yes" : "no"},person ${i}`);
    const { outcome } = await bringIn(`code,amount,word,name\n${rows.join("\n")}\n`);
    if (!("respondents" in outcome)) throw new Error("not brought in");
    expect(outcome.variables.map(({ name, kind }) => [name, kind])).toEqual([
      ["code", "categorical"],
      ["amount", "numeric"],
      ["word", "categorical"],
      ["name", "text"],
    ]);
    expect(outcome.variables[0]!.categories.map(({ code }) => code)).toEqual(["0", "1", "2"]);
    expect(outcome.variables[1]).toMatchObject({ minimum: 0.5, maximum: 59.5, isWhole: false, distinctValues: 60 });
  });

  it("take words such as NA for missing, and say so", async () => {
    const rows = Array.from({ length: 40 }, (_, i) => (i === 7 ? "NA" : String(i * 1.5)));
    const { outcome } = await bringIn(`amount\n${rows.join("\n")}\n`);
    if (!("respondents" in outcome)) throw new Error("not brought in");
    expect(outcome.problems).toMatchObject([
      { kind: "missing-word", severity: "warning", first: [{ column: "amount", value: "NA" }] },
    ]);
    expect(outcome.variables[0]).toMatchObject({
      kind: "numeric",
      categories: [{ code: "NA", isMissing: true }],
      categoryRows: [1],
    });
  });
});

it("takes a code that is spelt as another number of the same value", async () => {
  const codebook =
    "variable,label,kind,code,category label,missing\ns,Smokes,categorical,,,\ns,,,1,Yes,\ns,,,2,No,\ns,,,9,Refused,yes\n";
  expect(await readBack("s\n1\n2.0\n 1\n9\n\n1\n", codebook)).toEqual({ s: ["1", "2", "1", "9", "1"] });
});

it("counts respondents of each code, and empty fields, over several segments", async () => {
  const rows = Array.from({ length: 140_000 }, (_, i) => `${i % 4 === 3 ? "" : (i % 4) + 1},x`);
  const { outcome, kept } = await bringIn(`s,t\n${rows.join("\n")}\n`);
  if (!("respondents" in outcome)) throw new Error("not brought in");
  expect(outcome.respondents).toBe(140_000);
  expect(outcome.variables[0]).toMatchObject({ missingRows: 35_000, categoryRows: [35_000, 35_000, 35_000] });
  expect(kept.byVariable.get(outcome.variables[0]!.id)?.map(({ rowCount }) => rowCount)).toEqual([65_536, 65_536, 8_928]);
});
