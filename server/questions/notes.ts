import { STANDARDS } from "../../shared/standards.ts";
import type { Design } from "../../shared/contracts/design.ts";
import type { Question } from "../../shared/contracts/questions.ts";

const LONELY: Record<Design["lonely"], string> = {
  centred: "a stratum with one PSU counts by its distance from the mean of all PSUs",
  certainty: "a stratum with one PSU adds no variance",
  average: "a stratum with one PSU counts as much as the others on average",
  refuse: "no stratum may have one PSU",
};

const INTERVALS: Record<Question["interval"], string> = {
  "korn-graubard": "Korn–Graubard intervals (1998) with the effective number of respondents capped at the number asked",
  logit: "logit intervals",
  wilson: "Wilson intervals (1927) with the effective number of respondents",
  linear: "linear (Wald) intervals, cut off at 0 and 100",
};

const ADJUSTMENTS: Record<Question["adjustment"], string | null> = {
  none: null,
  holm: "p-values are adjusted after Holm (1979)",
  "benjamini-hochberg": "p-values are adjusted after Benjamini and Hochberg (1995)",
};

function designNote(design: Design): string {
  const parts = [design.weight === null ? "every respondent weighs the same" : `weighted by ${design.weight}`];
  if (design.replicates) {
    parts.push(`variances from replicate weights (${design.replicates.method}, ${design.replicates.pattern})`);
    return `Design: ${parts.join("; ")}.`;
  }
  const psu = Array.isArray(design.psu) ? design.psu.join(" then ") : design.psu;
  parts.push(
    design.strata === null ? "one stratum" : `strata ${design.strata}`,
    psu === null ? "each respondent a PSU" : `PSUs ${psu}`,
  );
  if (design.populationSize !== null) parts.push("with finite population correction");
  if (design.strata !== null) parts.push(LONELY[design.lonely]);
  return `Design: ${parts.join("; ")}. Standard errors by Taylor linearisation (Binder 1983; Woodruff 1971), subgroups as domains of the whole sample.`;
}

function comparisonNote(question: Question, familySize: number): string[] {
  if (question.comparison.kind === "none") return [];
  const adjustment = ADJUSTMENTS[question.adjustment];
  const family = `${familySize} ${familySize === 1 ? "comparison" : "comparisons"}`;
  return [
    `Differences use the exact covariance of both sides${question.difference === "mover" ? ", with MOVER limits (Zou and Donner 2008)" : ""}; ` +
      (adjustment
        ? `${adjustment} over this table's ${family}, subtotals among themselves.`
        : `p-values are not adjusted for this table's ${family}.`),
    "“No difference shown” isn't “no difference”: see the smallest difference that could have been found.",
  ];
}

/** How figures were standardised or adjusted; empty where they are crude. */
function correctionNote({ standardise, adjustFor }: Question): string[] {
  if (standardise) {
    const { weights } = standardise;
    const standard = "standard" in weights ? STANDARDS.find(({ id }) => id === weights.standard) : undefined;
    const by = standard
      ? `the ${standard.label} (${standard.source})`
      : `weights of one's own: ${"own" in weights ? weights.own.join(", ") : ""}`;
    return [
      `Directly standardised for ${standardise.variable} by ${by}; a group with nobody in a band has no figure. Totals of people are crude.`,
    ];
  }
  if (adjustFor.length === 0) return [];
  const names = adjustFor.map(({ variable }) => variable).join(", ");
  return [
    `Adjusted for ${names}: predictive margins of a design-based regression (logistic for shares; Graubard and Korn 1999), with the sampling of those variables counted. Respondents without a value of them are left out; totals of people are crude.`,
  ];
}

/** How a table was worked out and how to read it, as sentences; they stand under it and in every export. */
export function tableNotes(question: Question, design: Design, measure: "share" | "mean", familySize: number): string[] {
  const isQuantile = "variable" in question.outcome && question.outcome.quantile !== undefined;
  const interval =
    measure === "share" ? INTERVALS[question.interval] : isQuantile ? "Woodruff intervals (1952)" : "linear intervals";
  return [
    designNote(design),
    `${question.level} % ${interval}; t with the subgroup's own degrees of freedom (PSUs less strata that hold its respondents).`,
    ...correctionNote(question),
    ...comparisonNote(question, familySize),
    measure === "share"
      ? "Reliability after the NCHS data presentation standards for proportions (Parker et al. 2017)."
      : "Reliability of a mean by its relative standard error (common practice).",
    `Withheld: fewer than ${design.minimums.respondents} respondents, ${design.minimums.affected} affected or ${design.minimums.unaffected} not affected, and what would give those away.`,
    "Estimates describe groups, never a person. A withheld or wide figure isn't a small one. Association isn't cause.",
  ];
}
