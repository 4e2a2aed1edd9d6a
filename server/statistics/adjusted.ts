import { type CellFunction, type CellSums, estimateFunction, everyCell, type Influence, noInfluence } from "./cellFunction.ts";
import { compareSides, type ContrastEstimate, type ContrastSide } from "./contrast.ts";
import type { EstimateOptions } from "./estimate.ts";
import { intervalFor } from "./intervals.ts";
import { type CellDesign, coefficientInfluences, type Fit, fitCells, type Link, respond } from "./regression.ts";
import { undefinedWhereUnfit } from "./trend.ts";
import type { Assignment, Sample } from "./types.ts";
import { withContrastVariances } from "./valueContrasts.ts";

/** A categorical column to adjust for, rows in layout order: codes 0 to `levels` − 1, −1 missing. */
export interface Covariate {
  codes: Int32Array;
  levels: number;
}

/** One group's predictive margin: what its share would be, were everyone in it. */
export interface AdjustedEstimate {
  /** Unweighted, with every covariate known; 0 where the group has no figure. */
  respondents: number;
  estimate: number | null;
  /** Counts the sampling of the covariates too. */
  se: number | null;
  low: number | null;
  high: number | null;
  clipped: boolean;
  df: number;
}

/** Adjusted figures with the fit they come from. */
export interface Adjustment {
  groups: AdjustedEstimate[];
  contrasts: ContrastEstimate[];
  /** The intercept, then groups after the first, then each covariate's levels after its first, those without anybody left out. */
  coefficients: { estimate: number; se: number | null }[];
  /** Respondents with every covariate known. */
  respondents: number;
}

/**
 * Predictive margins of a design-based regression on groups and covariates (main effects): the mean, over everyone in the
 * model, of what the fit says had all been in the group. Each base cell of the assignment is a group.
 *
 * @param options `isBinary` fits a logistic model, otherwise a linear one.
 * @throws {SeparationError} Some group or level has only one outcome: never numbers.
 * @throws {SingularFitError} Groups and covariates cannot be told apart.
 * @throws {DesignError} As estimates do.
 * @see Graubard & Korn (1999), Biometrics 55: 652-659.
 */
export function adjust(
  sample: Sample,
  assignment: Assignment,
  covariates: readonly Covariate[],
  contrasts: readonly { of: number; from: number | { fixed: number } }[],
  options: EstimateOptions,
): Adjustment {
  const link: Link = options.isBinary && assignment.isBinary ? "logistic" : "linear";
  const { combined, codes } = combine(sample, assignment, covariates);
  const plan = planTerms(codes, [assignment.cells, ...covariates.map(({ levels }) => levels)]);
  const { groups } = plan;
  const count = groups.length + plan.design.terms;
  const model: CellFunction = {
    values: undefinedWhereUnfit((sums) => {
      const fit = fitCells(sums, plan.design, link);
      return Float64Array.from([...groups.map((group) => marginOf(sums, plan, fit, link, group).margin), ...fit.coefficients]);
    }, count),
    influences: (sums) => {
      const fit = fitCells(sums, plan.design, link);
      const ofCoefficients = coefficientInfluences(sums, plan.design, fit);
      return [...groups.map((group) => marginInfluence(sums, plan, fit, link, group, ofCoefficients)), ...ofCoefficients];
    },
  };
  const estimate = estimateFunction(sample, combined, model);
  const df = estimate.degreesOfFreedom(everyCell(combined.cells));
  const sizes = new Float64Array(assignment.cells);
  codes.forEach((code, cell) => (sizes[code[0]!]! += estimate.respondents[cell]!));
  const seOf = (value: number) => {
    const variance = estimate.covariance(value, value);
    return variance === null ? null : Math.sqrt(Math.max(0, variance));
  };
  const { level, interval, isBinary } = options;
  const described = Array.from({ length: assignment.cells }, (_, group): AdjustedEstimate => {
    const at = groups.indexOf(group);
    const n = sizes[group]!;
    const margin = at < 0 ? null : estimate.values[at]!;
    const se = at < 0 ? null : seOf(at);
    return {
      respondents: n,
      estimate: margin,
      se,
      ...intervalFor(interval, { estimate: margin, se, n, df, level, isBinary }),
      df,
    };
  });
  const sideOf = (group: number): ContrastSide => {
    const { estimate: margin, se, respondents } = described[group]!;
    return { estimate: margin, variance: se === null ? null : se * se, respondents, df, isFixed: false };
  };
  const sides = [...groups.map(sideOf), ...Array.from({ length: plan.design.terms }, () => NO_SIDE)];
  const compared = contrasts.map(({ of, from }) => {
    const at = groups.indexOf(of);
    const other = typeof from === "number" ? groups.indexOf(from) : from;
    if (at < 0 || other === -1) return compareSides(NO_SIDE, NO_SIDE, NO_VARIANCES, df, options);
    const { side, variances } = withContrastVariances(estimate, sides, at, other);
    return compareSides(sides[at]!, side, variances, df, options);
  });
  const coefficients = Array.from(estimate.values.subarray(groups.length), (value, term) => ({
    estimate: value,
    se: seOf(groups.length + term),
  }));
  return { groups: described, contrasts: compared, coefficients, respondents: sizes.reduce((sum, n) => sum + n, 0) };
}

const NO_SIDE: ContrastSide = { estimate: null, variance: null, respondents: 0, df: 0, isFixed: false };
const NO_VARIANCES = { difference: null, covariance: null, logRatio: null, logOddsRatio: null };

/** One base cell for each combination of group and covariates that occurs; `codes` are its group and levels. */
function combine(
  sample: Sample,
  assignment: Assignment,
  covariates: readonly Covariate[],
): { combined: Assignment; codes: number[][] } {
  const cell = new Int32Array(assignment.cell.length).fill(-1);
  const known = new Map<number, number>();
  const codes: number[][] = [];
  for (let row = 0; row < cell.length; row++) {
    let key = assignment.cell[row]!;
    if (key < 0 || sample.weight[row] === 0) continue;
    for (const { codes: levelOf, levels } of covariates) {
      const code = levelOf[row]!;
      key = code < 0 || key < 0 ? -1 : key * levels + code;
    }
    if (key < 0) continue;
    let index = known.get(key);
    if (index === undefined) {
      index = codes.push([assignment.cell[row]!, ...covariates.map(({ codes: levelOf }) => levelOf[row]!)]) - 1;
      known.set(key, index);
    }
    cell[row] = index;
  }
  return { combined: { ...assignment, cell, cells: codes.length }, codes };
}

interface TermPlan {
  design: CellDesign;
  /** Groups that occur, the first the model's reference. */
  groups: number[];
  /** Term of each group that occurs; 0 for the reference. */
  groupTerm: Map<number, number>;
}

/** An intercept and an indicator of each level after the first of those that occur. */
function planTerms(codes: readonly number[][], levels: readonly number[]): TermPlan {
  const occurring = levels.map((count, axis) => {
    const seen = new Set(codes.map((code) => code[axis]!));
    return Array.from({ length: count }, (_, level) => level).filter((level) => seen.has(level));
  });
  let terms = 1;
  const termOf = occurring.map(
    (present) => new Map(present.map((level, index): [number, number] => [level, index === 0 ? 0 : terms++])),
  );
  const values = new Float64Array(codes.length * terms);
  codes.forEach((code, cell) => {
    values[cell * terms] = 1;
    code.forEach((level, axis) => (values[cell * terms + (termOf[axis]!.get(level) ?? 0)] = 1));
  });
  return { design: { terms, values }, groups: occurring[0]!, groupTerm: termOf[0]! };
}

/** The margin, the prediction for each cell had it been in the group, and the margin's slopes by coefficient. */
function marginOf(sums: CellSums, plan: TermPlan, fit: Fit, link: Link, group: number) {
  const { terms, values } = plan.design;
  const groupTerms = new Set([...plan.groupTerm.values()].filter((term) => term > 0));
  const ownTerm = plan.groupTerm.get(group) ?? 0;
  const predicted = new Float64Array(sums.people.length);
  const slopes = new Float64Array(terms);
  let people = 0;
  let total = 0;
  for (let cell = 0; cell < predicted.length; cell++) {
    const weight = sums.people[cell]!;
    if (!(weight > 0)) continue;
    const x = (term: number) => (groupTerms.has(term) ? Number(term === ownTerm) : values[cell * terms + term]!);
    let predictor = 0;
    for (let term = 0; term < terms; term++) predictor += fit.coefficients[term]! * x(term);
    const { mean, slope } = respond(predictor, link);
    predicted[cell] = mean;
    people += weight;
    total += weight * mean;
    for (let term = 0; term < terms; term++) slopes[term]! += weight * slope * x(term);
  }
  return { margin: total / people, predicted, slopes: slopes.map((slope) => slope / people), people };
}

function marginInfluence(
  sums: CellSums,
  plan: TermPlan,
  fit: Fit,
  link: Link,
  group: number,
  ofCoefficients: readonly Influence[],
): Influence {
  const { margin, predicted, slopes, people } = marginOf(sums, plan, fit, link, group);
  const influence = noInfluence(sums.people.length);
  for (let cell = 0; cell < predicted.length; cell++) {
    if (!(sums.people[cell]! > 0)) continue;
    influence.onPeople[cell] = (predicted[cell]! - margin) / people;
    ofCoefficients.forEach((coefficient, term) => {
      influence.onResidual[cell]! += slopes[term]! * coefficient.onResidual[cell]!;
      influence.onPeople[cell]! += slopes[term]! * coefficient.onPeople[cell]!;
    });
  }
  return influence;
}
