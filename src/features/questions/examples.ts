import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Breakdown } from "../../../shared/contracts/questions.ts";
import { outcomeWords, breakdownWords } from "../../../shared/wording.ts";
import { bandPresets } from "./bands.ts";
import type { Draft } from "./draft.ts";
import { answers } from "./variables.ts";

const DESCRIBES_PEOPLE =
  /\b(sex|gender|age|district|region|area|province|county|settlement|urban|rural|education|schooling|income|wealth|work|activity|household|race|ethnicity|marital)\b/iu;

const text = ({ name, label }: VariableView) => `${name.replaceAll("_", " ")} ${label}`;

function breakdownBy(variable: VariableView): Breakdown | null {
  if (variable.kind === "categorical") return answers(variable).length <= 12 ? { variable: variable.name } : null;
  const bands = bandPresets(variable)[0]?.bands;
  return bands ? { variable: variable.name, bands } : null;
}

/** A few questions that fit this codebook, to begin with: an outcome's first answer, split by who people are. */
export function exampleQuestions(variables: readonly VariableView[]): { words: string; changes: Partial<Draft> }[] {
  const describing = variables.filter((variable) => DESCRIBES_PEOPLE.test(text(variable)));
  const splits = describing.map(breakdownBy).filter((breakdown) => breakdown !== null);
  const byPattern = (pattern: RegExp) => splits.find(({ variable }) => pattern.test(variable)) ?? null;
  const sex = byPattern(/sex|gender/iu);
  const place = byPattern(/district|region|area|province/iu);
  const age = byPattern(/age/iu);
  const outcomes = variables.filter(
    (variable) =>
      !describing.includes(variable) &&
      variable.kind === "categorical" &&
      answers(variable).length >= 2 &&
      answers(variable).length <= 6,
  );
  const shapes: { down: Breakdown[]; across: Breakdown[] }[] = [
    { down: [age, place].filter((split) => split !== null).slice(0, 1), across: sex ? [sex] : [] },
    { down: place ? [place] : splits.slice(0, 1), across: [] },
    { down: splits.slice(0, 1), across: [] },
  ];
  return outcomes.slice(0, 3).flatMap((variable, index) => {
    const first = answers(variable)[0];
    const shape = shapes[index];
    if (!first || !shape) return [];
    const outcome = { rule: { variable: variable.name, in: [first.code] } };
    const by = breakdownWords([...shape.down, ...shape.across], variables);
    return [
      {
        words: `${outcomeWords(outcome, variables)}${by ? `, by ${by}` : ""}`,
        changes: { outcome, ...shape, comparison: { kind: "all" } },
      },
    ];
  });
}
