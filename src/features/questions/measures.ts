/** What a cell may show beside its estimate, in the order of a cell. */
export const MEASURES = [
  "interval",
  "picture",
  "difference",
  "differenceInterval",
  "p",
  "respondents",
  "people",
  "affected",
  "deff",
] as const;
export type Measure = (typeof MEASURES)[number];

export const defaultMeasures: readonly Measure[] = ["interval", "picture", "difference", "respondents"];

export const measureLabels: Record<Measure, string> = {
  interval: "Interval",
  picture: "Drawn interval",
  difference: "Difference",
  differenceInterval: "Interval of the difference",
  p: "p of the difference",
  respondents: "Respondents (n)",
  people: "People in the group",
  affected: "People affected",
  deff: "Design effect",
};
