import type { Question } from "../../shared/contracts/questions.ts";
import type { OverallResult } from "../../shared/contracts/tables.ts";
import { association } from "../statistics/association.ts";
import { SingularFitError, SeparationError } from "../statistics/errors.ts";
import { attributable } from "../statistics/attributable.ts";
import { inequality } from "../statistics/inequality.ts";
import type { Measure } from "../statistics/measure.ts";
import type { Level } from "../statistics/intervals.ts";
import { trend } from "../statistics/trend.ts";
import type { Assignment, Sample } from "../statistics/types.ts";

/** A table's groups as base cells of their own, and what is asked of them together. */
export interface OverallInput {
  sample: Sample;
  /** Base cell i is the table's group i; everyone else is in none. */
  assignment: Assignment;
  kinds: Question["overall"];
  level: Level;
  /** Score of each group: the number its code spells, or its place. */
  scores: readonly number[];
  /** Index of the reference group; −1 without one. */
  reference: number;
}

type Figure = OverallResult["figures"][number];

const figure = (name: string, unit: Figure["unit"], { estimate, se, low, high }: Measure): Figure => ({
  name,
  unit,
  estimate,
  se,
  low,
  high,
});
const bare = (name: string, unit: Figure["unit"], estimate: number | null): Figure => ({
  name,
  unit,
  estimate,
  se: null,
  low: null,
  high: null,
});

/** What is said of the table as a whole, in the order asked for; what can't be worked out says so by its nulls. */
export function overallOf(input: OverallInput): OverallResult[] {
  return input.kinds.map((kind) => RESULTS[kind](input));
}

const RESULTS: Record<Question["overall"][number], (input: OverallInput) => OverallResult> = {
  association({ sample, assignment }) {
    const test = assignment.isBinary ? association(sample, assignment) : null;
    return {
      kind: "association",
      title: "Do the groups differ at all?",
      meaning:
        "Rao–Scott test (1984), second-order corrected: a small p says that the share isn't the same in every group, not which groups differ.",
      figures: [bare("F", "number", test?.f ?? null), bare("Numerator degrees of freedom", "number", test?.numeratorDf ?? null)],
      p: test?.p ?? null,
      df: test?.denominatorDf ?? null,
    };
  },
  trend({ sample, assignment, scores, level }) {
    const groups = scores.map((_, cell) => ({ cells: [cell] }));
    const fit = (link: "linear" | "logistic") => {
      try {
        return trend(sample, assignment, groups, scores, { link, level });
      } catch (error) {
        if (error instanceof SingularFitError || error instanceof SeparationError) return null;
        throw error;
      }
    };
    const line = fit("linear");
    const odds = assignment.isBinary ? fit("logistic") : null;
    const measure = (found: typeof line): Measure => ({
      estimate: found?.slope ?? null,
      se: found?.slopeSe ?? null,
      low: found?.low ?? null,
      high: found?.high ?? null,
    });
    return {
      kind: "trend",
      title: "Is there a trend over the groups?",
      meaning:
        "Change from each group to the next, by a design-based straight line through everyone's group score (the number its code spells, or its place).",
      figures: [
        figure("Slope for one step", assignment.isBinary ? "points" : "value", measure(line)),
        bare("Value at score 0", assignment.isBinary ? "share" : "value", line?.intercept ?? null),
        ...(odds
          ? [figure("Slope of the log odds", "number", measure(odds)), bare("Log odds at score 0", "number", odds.intercept)]
          : []),
      ],
      p: line?.p ?? null,
      df: line?.df ?? null,
    };
  },
  inequality({ sample, assignment, level }) {
    const order = Array.from({ length: assignment.cells }, (_, cell) => cell);
    const result = inequality(sample, assignment, order, level);
    return {
      kind: "inequality",
      title: "How unequal are the groups, from first to last?",
      meaning:
        "Slope index: fitted difference between the last and the first person when everyone is ranked by group in the order listed. Relative index: their ratio (Mackenbach and Kunst 1997).",
      figures: [
        figure("Slope index", assignment.isBinary ? "points" : "value", result.slopeIndex),
        figure("Relative index", "ratio", result.relativeIndex),
      ],
      p: null,
      df: result.df,
    };
  },
  attributable({ sample, assignment, reference, level }) {
    const result = reference < 0 ? null : attributable(sample, assignment, reference, level);
    const none: Measure = { estimate: null, se: null, low: null, high: null };
    return {
      kind: "attributable",
      title: "How much would go, had everyone the reference group's level?",
      meaning:
        "Arithmetic on an association, not on a cause: the overall level less the reference group's, and that as a share of the overall level (Miettinen 1974).",
      figures: [
        bare("Overall", assignment.isBinary ? "share" : "value", result?.overall ?? null),
        bare("Reference group", assignment.isBinary ? "share" : "value", result?.reference ?? null),
        figure("Population attributable risk", assignment.isBinary ? "points" : "value", result?.risk ?? none),
        figure("Population attributable fraction", "ratio", result?.fraction ?? none),
      ],
      p: null,
      df: result?.df ?? null,
    };
  },
};
