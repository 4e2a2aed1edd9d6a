import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { OVERALL_KINDS, type Band, type Breakdown } from "../../../shared/contracts/questions.ts";
import type { Rule } from "../../../shared/rules.ts";
import { readAddress, VIEWS, writeAddress, type Ask } from "../../../src/features/questions/address.ts";
import { emptyDraft, tidyDraft } from "../../../src/features/questions/draft.ts";
import { defaultMeasures, MEASURES } from "../../../src/features/questions/measures.ts";

const number = fc
  .oneof(fc.integer(), fc.double({ noNaN: true, noDefaultInfinity: true }))
  .map((value) => (value === 0 ? 0 : value));
const name = fc.string({ minLength: 1, maxLength: 12, unit: "grapheme" }).filter((text) => text.length <= 64);
const code = fc.string({ maxLength: 8, unit: "grapheme" });
const ends = fc.oneof(
  fc.tuple(number, number).map(([a, b]): [number, number] => (a <= b ? [a, b] : [b, a])),
  number.map((from): [number, null] => [from, null]),
  number.map((to): [null, number] => [null, to]),
);
const rule = fc.letrec<{ rule: Rule; leaf: Rule }>((tie) => ({
  leaf: fc.oneof(
    fc.record({ variable: name, in: fc.array(code, { minLength: 1, maxLength: 4 }) }),
    fc.record({ variable: name, between: ends }),
  ),
  rule: fc.oneof(
    { depthSize: "small", withCrossShrink: true },
    tie("leaf"),
    fc.record({ all: fc.array(tie("rule"), { minLength: 1, maxLength: 3 }) }),
    fc.record({ any: fc.array(tie("rule"), { minLength: 1, maxLength: 3 }) }),
    fc.record({ not: tie("rule") }),
  ),
})).rule;
const label = fc
  .string({ minLength: 1, maxLength: 12, unit: "grapheme" })
  .map((text) => text.trim())
  .filter((text) => text !== "" && text.length <= 60);
const bands = fc.array(
  fc.tuple(ends, label).map(([[from, to], text]): Band => [from, to, text]),
  { minLength: 1, maxLength: 4 },
);
const breakdowns = fc.uniqueArray(
  fc.oneof(fc.record({ variable: name }), fc.record({ variable: name, bands })) as fc.Arbitrary<Breakdown>,
  { maxLength: 5, selector: ({ variable }) => variable },
);
const ask: fc.Arbitrary<Ask> = fc
  .record({
    releaseId: fc.option(fc.uuid()),
    outcome: fc.oneof(
      fc.constant(null),
      fc.record({ rule }),
      fc.record({ variable: name }),
      fc.record({ variable: name, quantile: fc.constantFrom(0.1, 0.25, 0.5, 0.9) }),
    ),
    among: fc.option(rule, { nil: undefined }),
    splits: breakdowns,
    cut: fc.nat({ max: 3 }),
    comparison: fc.oneof(
      fc.constantFrom({ kind: "none" as const }, { kind: "rest" as const }, { kind: "all" as const }),
      number.map((value) => ({ kind: "target" as const, value })),
      fc.uuid().map((releaseId) => ({ kind: "release" as const, releaseId })),
      fc.record({ kind: fc.constant("group" as const), breakdown: name, value: code }),
    ),
    level: fc.constantFrom(90 as const, 95 as const, 99 as const),
    interval: fc.constantFrom("korn-graubard" as const, "logit" as const, "wilson" as const, "linear" as const),
    difference: fc.constantFrom("linear" as const, "mover" as const),
    adjustment: fc.constantFrom("none" as const, "holm" as const, "benjamini-hochberg" as const),
    standardise: fc.option(
      fc.oneof(
        fc.record({
          variable: name,
          weights: fc.record({ own: fc.array(fc.nat({ max: 1e6 }), { minLength: 2, maxLength: 5 }) }),
        }),
        fc.record({
          variable: name,
          bands: fc.constant<Band[]>([
            [18, 44, "18–44"],
            [45, null, "45 and over"],
          ]),
          weights: fc.constant({ standard: "who-2000-2025" }),
        }),
      ),
      { nil: undefined },
    ),
    adjustFor: breakdowns,
    overall: fc.subarray([...OVERALL_KINDS]),
    view: fc.constantFrom(...VIEWS),
    measures: fc.subarray([...MEASURES]),
  })
  .map(({ splits, cut, among, standardise, view, measures, ...rest }) => ({
    draft: tidyDraft({
      ...rest,
      ...(among ? { among } : {}),
      ...(standardise ? { standardise } : {}),
      down: splits.slice(0, cut),
      across: splits.slice(cut, cut + 2),
    }),
    view,
    measures,
  }));

describe("the address of an ask", () => {
  it("gives back every ask that it was written from", () => {
    fc.assert(
      fc.property(ask, (given) => {
        const { unread, ...read } = readAddress(writeAddress(given));
        expect(unread).toEqual([]);
        expect(read).toEqual(given);
      }),
      { numRuns: 500 },
    );
  });

  it("survives a mail program that encodes every sign", () => {
    fc.assert(
      fc.property(ask, (given) => {
        const encoded = new URLSearchParams(writeAddress(given)).toString();
        expect(writeAddress(readAddress(`?${encoded}`))).toBe(writeAddress(given));
      }),
      { numRuns: 200 },
    );
  });

  it("reads like the question", () => {
    const releaseId = "7d1c1a52-6a53-4f3b-9d0e-3f5b9c1f0a11";
    expect(
      writeAddress({
        draft: {
          ...emptyDraft,
          releaseId,
          outcome: { rule: { variable: "smoking", in: ["1", "2"] } },
          among: {
            all: [
              { variable: "sex", in: ["1"] },
              { variable: "age", between: [18, null] },
            ],
          },
          down: [
            {
              variable: "age",
              bands: [
                [18, 44, "18–44"],
                [45, null, "older"],
              ],
            },
          ],
          comparison: { kind: "all" },
        },
        view: "differences",
        measures: defaultMeasures,
      }),
    ).toBe(
      `?release=${releaseId}&outcome=smoking:1,2&among=sex:1;age:18..&down=age(18..44;45..=older)&than=all&view=differences`,
    );
  });

  it("names what it can't read and keeps the rest", () => {
    const { draft, unread } = readAddress("?outcome=smoking:1&among=nonsense&level=42&down=sex,sex&across=sex,age(18..)");
    expect(unread).toEqual(["among", "level"]);
    expect(draft).toMatchObject({
      outcome: { rule: { variable: "smoking", in: ["1"] } },
      level: 95,
      down: [{ variable: "sex" }],
    });
    expect(draft.across.map(({ variable }) => variable)).toEqual(["age"]);
  });
});
