import { describe, expect, it } from "vitest";
import { Question, type QuestionInput } from "../../shared/contracts/questions.ts";
import { questionSentence, ruleWords } from "../../shared/wording.ts";

const variables = [
  {
    name: "smoking",
    label: "Smoking now",
    categories: [
      { code: "1", label: "Daily" },
      { code: "2", label: "" },
    ],
  },
  {
    name: "sex",
    label: "Sex",
    categories: [
      { code: "1", label: "Women" },
      { code: "2", label: "Men" },
    ],
  },
  { name: "age", label: "Age in years", categories: [] },
  { name: "distress", label: "", categories: [] },
];
const sentence = (question: Omit<QuestionInput, "releaseId">) =>
  questionSentence(Question.parse({ releaseId: "00000000-0000-4000-8000-000000000001", ...question }), {
    surveyTitle: "Coast Survey",
    wave: "2025",
    variables,
  });

describe("the question as sentences", () => {
  it("names survey, people, outcome, both sides and the comparison", () => {
    expect(
      sentence({
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
              [45, null, "45+"],
            ],
          },
        ],
        across: [{ variable: "sex" }],
        comparison: { kind: "group", breakdown: "age", value: "2" },
      }),
    ).toBe(
      "In Coast Survey, 2025, of every 100 people with Sex: Women and Age in years: at least 18, how many have Smoking now: Daily or 2? Split by Age in years in bands down and Sex across. Compared with Age in years: 45+.",
    );
  });

  it("asks for a mean by name where the variable has no label, and leaves out what isn't asked", () => {
    expect(
      sentence({ outcome: { variable: "distress" }, across: [{ variable: "sex" }], comparison: { kind: "target", value: 12 } }),
    ).toBe("In Coast Survey, 2025, among people, what is the mean of distress? Split by Sex across. Compared with the value 12.");
    expect(sentence({ outcome: { rule: { variable: "smoking", in: ["1"] } }, comparison: { kind: "target", value: 0.07 } })).toBe(
      "In Coast Survey, 2025, of every 100 people, how many have Smoking now: Daily? Compared with 7 of every 100.",
    );
  });
});

it("brackets parts of a rule, so that it can be read one way only", () => {
  expect(
    ruleWords(
      {
        all: [
          {
            any: [
              { variable: "smoking", in: ["1"] },
              { variable: "sex", in: ["2"] },
            ],
          },
          { not: { variable: "age", between: [null, 17] } },
        ],
      },
      variables,
    ),
  ).toBe("(Smoking now: Daily or Sex: Men) and not (Age in years: at most 17)");
});
