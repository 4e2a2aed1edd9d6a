import { describe, expect, it } from "vitest";
import { Question, type QuestionInput } from "../../shared/contracts/questions.ts";
import type { CodebookVariable } from "../../server/microdata/codebook.ts";
import { AppError } from "../../server/errors.ts";
import { assign } from "../../server/questions/assign.ts";
import { compileQuestion } from "../../server/questions/compile.ts";

const RELEASE = "00000000-0000-4000-8000-000000000001";

function variable(name: string, parts: Partial<CodebookVariable>): CodebookVariable {
  return {
    id: name,
    name,
    label: name,
    kind: "categorical",
    storage: "code",
    isWhole: true,
    minimum: null,
    maximum: null,
    categories: [],
    ...parts,
  };
}
const category = (position: number, code: string, label: string, isMissing = false) => ({ position, code, label, isMissing });
const VARIABLES = [
  variable("smoker", { categories: [category(0, "0", "no"), category(1, "1", "yes"), category(2, "9", "refused", true)] }),
  variable("sex", { categories: [category(0, "1", "men"), category(1, "2", "women")] }),
  variable("age", { kind: "numeric", storage: "number", categories: [category(0, "999", "unknown", true)] }),
  variable("name", { kind: "text", storage: "text" }),
];
const MISSING = 255;
const COLUMNS = {
  smoker: Uint8Array.of(1, 0, 2, 1, MISSING, 1),
  sex: Uint8Array.of(0, 1, 0, MISSING, 1, 1),
  age: Float64Array.of(20, 45, 50, 999, 30, Number.NaN),
};
const WEIGHTS = Float64Array.of(1, 1, 1, 1, 1, 0);

function assigned(question: Omit<QuestionInput, "releaseId">, weights = WEIGHTS) {
  const { plan } = compileQuestion(Question.parse({ releaseId: RELEASE, ...question }), VARIABLES);
  return assign(plan, COLUMNS, weights);
}
const smokes = { rule: { variable: "smoker", in: ["1"] } };
const ALL_ONES = new Float64Array(6).fill(1);

describe("assign", () => {
  it("leaves out a missing outcome, a missing code and weight 0, and keeps those without a group in the last slot", () => {
    const { cell, cells, outcome } = assigned({ outcome: smokes, down: [{ variable: "sex" }] });
    expect(cells).toBe(3);
    expect([...cell]).toEqual([0, 1, -1, 2, -1, -1]);
    expect([outcome[0], outcome[1], outcome[3]]).toEqual([1, 0, 1]);
  });

  it("puts a value on a shared band end into the first band, and a missing code into none", () => {
    const bands: [number | null, number | null, string][] = [
      [null, 45, "to 45"],
      [45, null, "45 and over"],
    ];
    const { cell } = assigned({ outcome: smokes, down: [{ variable: "age", bands }] }, ALL_ONES);
    expect([...cell]).toEqual([0, 0, -1, 2, -1, 2]);
  });

  it("keeps only respondents for whom the population's rule is certainly true", () => {
    const among = { not: { variable: "age", between: [40, null] } };
    expect([...assigned({ outcome: smokes, among }, ALL_ONES).cell]).toEqual([0, -1, -1, -1, -1, -1]);
  });

  it("decides a rule by the part that is certain, though another part is unknown", () => {
    const outcome = {
      rule: {
        any: [
          { variable: "smoker", in: ["1"] },
          { variable: "age", between: [0, 100] },
        ],
      },
    };
    const { cell } = assigned({ outcome }, ALL_ONES);
    // Row 2: smoking unknown, age 50 → true. Row 3: smoker, age unknown → true. Row 4: smoking unknown, age 30 → true.
    expect([...cell]).toEqual([0, 0, 0, 0, 0, 0]);
  });

  it("takes the mean over codes that are numbers", () => {
    const { outcome, isBinary } = assigned({ outcome: { variable: "sex" } }, ALL_ONES);
    expect(isBinary).toBe(false);
    expect([outcome[0], outcome[1]]).toEqual([1, 2]);
  });
});

describe("compileQuestion", () => {
  const refusals: [string, object, string][] = [
    ["an unknown variable", { outcome: { rule: { variable: "smokes", in: ["1"] } } }, "outcome.rule"],
    ["an unknown code", { outcome: { rule: { variable: "smoker", in: ["7"] } } }, "outcome.rule"],
    ["text", { outcome: smokes, down: [{ variable: "name" }] }, "down.0"],
    ["numbers without bands", { outcome: smokes, down: [{ variable: "age" }] }, "down.0"],
    [
      "a reference group that isn't there",
      { outcome: smokes, down: [{ variable: "sex" }], comparison: { kind: "group", breakdown: "sex", value: "3" } },
      "comparison.value",
    ],
  ];
  it.each(refusals)("refuses %s, naming the part of the question", (_what, question, field) => {
    const attempt = () => compileQuestion(Question.parse({ releaseId: RELEASE, ...question }), VARIABLES);
    expect(attempt).toThrow(AppError);
    try {
      attempt();
    } catch (error) {
      expect(Object.keys((error as AppError).fields ?? {})).toEqual([field]);
    }
  });
});
