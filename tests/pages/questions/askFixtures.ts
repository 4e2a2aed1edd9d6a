import type { CodebookView, VariableView } from "../../../shared/contracts/codebook.ts";
import type { ReleaseSummary, SurveysView } from "../../../shared/contracts/holdings.ts";
import { Question, type Breakdown, type QuestionInput } from "../../../shared/contracts/questions.ts";
import type { Cell, ShownCell, Table } from "../../../shared/contracts/tables.ts";
import { questionSentence } from "../../../shared/wording.ts";

/** An invented survey, its codebook and tables with figures made up by rule; the pages' tests read them. */
export const releaseId = "5f0c2c1e-2f6b-4a57-9d4e-3b8a54d0c001";
export const olderReleaseId = "5f0c2c1e-2f6b-4a57-9d4e-3b8a54d0c002";
const surveyId = "5f0c2c1e-2f6b-4a57-9d4e-3b8a54d0c003";

const release = (id: string, wave: string): ReleaseSummary => ({
  id,
  surveyId,
  wave,
  status: "published",
  respondents: 5914,
  variables: 9,
  hasDesign: true,
  createdAt: `${wave}-11-01T09:00:00.000Z`,
  publishedAt: `${wave}-11-20T09:00:00.000Z`,
  importId: null,
  can: { import: false, design: false, publish: false, ask: true, remove: false },
});

export const surveys: SurveysView = {
  surveys: [
    {
      id: surveyId,
      title: "Tamarisk Coast Adult Health Survey",
      description: "",
      stewards: [],
      releases: [release(olderReleaseId, "2023"), release(releaseId, "2025")],
      grantEndsOn: null,
      can: { update: false, import: false, manageAccess: false },
    },
  ],
};

function variable(name: string, label: string, categories: readonly string[] | null, missingShare = 0): VariableView {
  return {
    id: `5f0c2c1e-2f6b-4a57-9d4e-${name
      .padEnd(12, "0")
      .slice(0, 12)
      .replace(/[^0-9a-f]/gu, "a")}`,
    name,
    label,
    kind: categories ? "categorical" : "numeric",
    categories: (categories ?? []).map((text, index) => ({
      code: String(index + 1),
      label: text,
      isMissing: text === "Refused",
      respondents: null,
    })),
    missingShare,
    minimum: null,
    maximum: null,
    isWhole: true,
    distinct: 5,
  };
}

export const codebook: CodebookView = {
  releaseId,
  respondents: 5914,
  designVariables: ["stratum", "weight"],
  can: { update: false },
  variables: [
    variable("stratum", "Stratum: district and kind of settlement", ["North, town", "North, village"]),
    variable("weight", "Weight: design and non-response", null),
    variable("district", "District", ["North Spit", "Harbour", "Saltmarsh", "Uplands", "Far Islands"]),
    variable("settlement", "Kind of settlement", ["Town", "Village", "Remote place"]),
    variable("sex", "Sex", ["Women", "Men"]),
    variable("age", "Age in years", null),
    variable("smoking", "Smoking now", ["Daily", "Less than daily", "Formerly", "Never", "Refused"], 0.013),
    variable("flu_vaccination", "Vaccinated against flu in the last 12 months", ["Yes", "No"], 0.018),
    variable("distress", "Distress score, 0 (none) to 40", null, 0.04),
  ],
};

export const ageBands: Breakdown = {
  variable: "age",
  bands: [
    [18, 24, "18–24"],
    [25, 34, "25–34"],
    [35, 44, "35–44"],
    [45, 54, "45–54"],
    [55, 64, "55–64"],
    [65, null, "65 and over"],
  ],
};

export const askOf = (question: Partial<QuestionInput> = {}): Question =>
  Question.parse({ releaseId, outcome: { rule: { variable: "smoking", in: ["1"] } }, ...question });

/** A shown cell; what a test is about is given, the rest fits it. */
export function shownCell(key: (string | null)[], changes: Partial<ShownCell> = {}): ShownCell {
  return {
    key,
    shown: true,
    respondents: 301,
    affectedRespondents: 114,
    people: 14_270,
    peopleSe: 910,
    peopleLow: 12_463,
    peopleHigh: 16_077,
    affectedPeople: 5482,
    affectedPeopleSe: 402,
    affectedPeopleLow: 4684,
    affectedPeopleHigh: 6280,
    estimate: 0.3841,
    se: 0.025,
    low: 0.3358,
    high: 0.4347,
    df: 94,
    deff: 1.62,
    effectiveRespondents: 186,
    cv: 0.065,
    clipped: false,
    reliability: { verdict: "reliable", reasons: [] },
    ...changes,
  };
}

export const compared = (estimate: number, reference: number, half: number): NonNullable<ShownCell["comparison"]> => {
  const difference = estimate - reference;
  return {
    reference,
    difference,
    se: half / 2,
    low: difference - half,
    high: difference + half,
    df: 96,
    p: Math.abs(difference) > half ? 0.0004 : 0.21,
    pAdjusted: Math.abs(difference) > half ? 0.0012 : 0.42,
    ratio: estimate / reference,
    ratioLow: (estimate - half) / reference,
    ratioHigh: (estimate + half) / reference,
    oddsRatio: estimate / (1 - estimate) / (reference / (1 - reference)),
    oddsRatioLow: null,
    oddsRatioHigh: null,
    detectable: half * 1.4,
    direction: Math.abs(difference) <= half ? "none" : difference > 0 ? "higher" : "lower",
  };
};

function valuesOf({ variable, bands }: Breakdown) {
  if (bands) return bands.map(([, , label], index) => ({ code: String(index + 1), label }));
  const found = codebook.variables.find(({ name }) => name === variable);
  return (found?.categories ?? []).filter(({ isMissing }) => !isMissing).map(({ code, label }) => ({ code, label }));
}

/** Every way to take one value from each list; a list may be taken only in part (null for the rest). */
const product = (lists: readonly string[][]): string[][] =>
  lists.reduce<string[][]>((keys, list) => keys.flatMap((key) => list.map((code) => [...key, code])), [[]]);

const LEVELS = [0.141, 0.246, 0.178, 0.369, 0.215, 0.384, 0.19, 0.312, 0.132, 0.227, 0.074, 0.118];
const WHOLE = 0.213;

function cellAt(key: (string | null)[], isCompared: boolean, scale: number): Cell {
  const seed = key.reduce((sum, code, index) => sum + (code === null ? 0 : Number(code) * (index === 0 ? 2 : 1)), 0);
  if (key.length > 1 && key[0] === "6" && key[1] === "2") return { key, shown: false, reason: "too-few" };
  if (key.length > 1 && key[0] === "6" && key[1] === null) return { key, shown: false, reason: "protects-another" };
  const estimate = (LEVELS[seed % LEVELS.length] ?? 0.2) * scale;
  const half = (0.03 + 0.004 * (seed % 5)) * scale;
  return shownCell(key, {
    estimate,
    low: estimate - half,
    high: estimate + half * 1.2,
    respondents: 180 + 23 * seed,
    ...(seed % 7 === 3 ? { reliability: { verdict: "caution", reasons: ["fewer than 8 degrees of freedom"] } } : {}),
    ...(scale === 1 ? {} : { affectedRespondents: null, affectedPeople: null, affectedPeopleSe: null }),
    ...(isCompared ? { comparison: compared(estimate, WHOLE * scale, half * 1.3) } : {}),
  });
}

/** The table that answers a question, laid out as the server lays it out. */
export function tableOf(question: Question): Table {
  const { down, across } = question;
  const breakdowns = [...down, ...across].map((breakdown, index) => ({
    name: breakdown.variable,
    label: codebook.variables.find(({ name }) => name === breakdown.variable)?.label ?? "",
    axis: index < down.length ? ("down" as const) : ("across" as const),
    values: valuesOf(breakdown),
  }));
  const codes = breakdowns.map(({ values }) => values.map(({ code }) => code));
  const measure = "variable" in question.outcome ? "mean" : "share";
  const scale = measure === "mean" ? 40 : 1;
  const isCompared = question.comparison.kind !== "none";
  const margins: (string | null)[][] = [];
  for (let d = 0; d <= down.length; d += 1)
    for (let a = 0; a <= across.length; a += 1) {
      if ((d === 0 && a === 0) || (d === down.length && a === across.length)) continue;
      const downKeys = product(codes.slice(0, d)).map((key) => [...key, ...Array<null>(down.length - d).fill(null)]);
      const acrossKeys = product(codes.slice(down.length, down.length + a)).map((key) => [
        ...key,
        ...Array<null>(across.length - a).fill(null),
      ]);
      for (const downKey of downKeys) for (const acrossKey of acrossKeys) margins.push([...downKey, ...acrossKey]);
    }
  const cells = breakdowns.length > 0 ? product(codes) : [];
  return {
    question,
    overall: [],
    compared: null,
    release: {
      id: releaseId,
      surveyId,
      surveyTitle: "Tamarisk Coast Adult Health Survey",
      wave: "2025",
      checksum: "c0ffee".repeat(10),
      designDf: 118,
    },
    engine: "1",
    measure,
    breakdowns,
    whole: shownCell(
      breakdowns.map(() => null),
      { estimate: WHOLE * scale, low: 0.201 * scale, high: 0.226 * scale, respondents: 5914 },
    ),
    cells: cells.map((key) => cellAt(key, isCompared, scale)),
    margins: margins.map((key) => cellAt(key, isCompared, scale)),
    familySize: isCompared ? cells.length : 0,
    caption: questionSentence(question, {
      surveyTitle: "Tamarisk Coast Adult Health Survey",
      wave: "2025",
      variables: codebook.variables,
    }),
    notes: ["Design: weighted by weight; strata stratum, PSUs psu.", "95 % Korn–Graubard intervals (1998)."],
  };
}
