import { adjust, type Covariate } from "../statistics/adjusted.ts";
import {
  estimateTargets,
  type ContrastEstimate,
  type ContrastRequest,
  type EstimateOptions,
  type TargetEstimate,
} from "../statistics/estimate.ts";
import type { Target } from "../statistics/domainTotals.ts";
import { estimateQuantiles } from "../statistics/quantiles.ts";
import { standardise } from "../statistics/standardise.ts";
import type { Assignment, Sample } from "../statistics/types.ts";

/** What a table's figures are worked out from. */
export interface FigureInput {
  sample: Sample;
  /** Base cells of the table; with a standard, each split by its bands and those without one, bands fastest. */
  assignment: Assignment;
  /** Unions of the table's own base cells. */
  targets: readonly Target[];
  contrasts: readonly ContrastRequest[];
  options: EstimateOptions;
  /** Weights of the bands to standardise by. */
  standard: readonly number[] | null;
  covariates: readonly Covariate[];
  /** Levels of the table that split everyone into groups, by target: what one regression is fitted for. */
  levels: readonly (readonly number[])[];
  quantile: number | null;
}

/** Estimates of the targets and their contrasts, as asked for. */
export interface Figures {
  designDf: number;
  targets: TargetEstimate[];
  contrasts: ContrastEstimate[];
}

/**
 * Works out crude, standardised or adjusted figures, or quantiles. Counts and totals of people are crude in all of them,
 * of respondents that the figure rests on.
 */
export function figuresOf(input: FigureInput): Figures {
  if (input.standard) return standardisedFigures(input, input.standard);
  const { sample, assignment, targets, contrasts, options } = input;
  if (input.covariates.length > 0) return adjustedFigures(input);
  const crude = estimateTargets(sample, assignment, targets, contrasts, options);
  if (input.quantile === null) return crude;
  const quantiles = estimateQuantiles(sample, assignment, targets, [input.quantile], options.level);
  const merged = crude.targets.map((target, i): TargetEstimate => {
    const { estimate, low, high, df } = quantiles[i]![0]!;
    return { ...target, estimate, low, high, df, se: null, cv: null, deff: null, clipped: false };
  });
  return { ...crude, targets: merged };
}

function standardisedFigures(
  { sample, assignment, targets, contrasts, options }: FigureInput,
  weights: readonly number[],
): Figures {
  const slots = weights.length + 1;
  const inBand = ({ cells }: Target, band: number): Target => ({ cells: Int32Array.from(cells, (cell) => cell * slots + band) });
  const groups = targets.map((target) => weights.map((_, band) => inBand(target, band)));
  const known = groups.map((bands): Target => ({ cells: bands.flatMap(({ cells }) => [...cells]) }));
  const crude = estimateTargets(sample, assignment, known, [], options);
  const result = standardise(sample, assignment, groups, weights, contrasts, options);
  const merged = crude.targets.map((target, i): TargetEstimate => {
    const { estimate, se, low, high, clipped, df, deff, cv, effectiveBeforeAdjustment } = result.groups[i]!;
    return {
      ...target,
      estimate,
      se,
      low,
      high,
      clipped,
      df,
      deff,
      cv,
      effectiveBeforeAdjustment,
      effectiveRespondents: effectiveBeforeAdjustment,
    };
  });
  return { designDf: crude.designDf, targets: merged, contrasts: result.contrasts };
}

/** One regression for each level of the table: its groups are disjoint, and comparisons stay within it. */
function adjustedFigures({ sample, assignment, targets, contrasts, options, covariates, levels }: FigureInput): Figures {
  const isKnown = (row: number) => covariates.every(({ codes }) => codes[row]! >= 0);
  const modelled: Assignment = { ...assignment, cell: assignment.cell.map((cell, row) => (isKnown(row) ? cell : -1)) };
  const crude = estimateTargets(sample, modelled, targets, [], options);
  const merged = [...crude.targets];
  const compared: ContrastEstimate[] = [];
  for (const level of levels) {
    const groupOf = new Int32Array(assignment.cells).fill(-1);
    level.forEach((target, group) => {
      for (const cell of targets[target]!.cells) groupOf[cell] = group;
    });
    const grouped: Assignment = {
      ...assignment,
      cells: level.length,
      cell: modelled.cell.map((cell) => (cell < 0 ? -1 : groupOf[cell]!)),
    };
    const own = contrasts.flatMap(({ of, from }, i) =>
      level.includes(of) ? [{ i, of: level.indexOf(of), from: typeof from === "number" ? level.indexOf(from) : from }] : [],
    );
    const result = adjust(sample, grouped, covariates, own, options);
    own.forEach(({ i }, k) => (compared[i] = result.contrasts[k]!));
    level.forEach((target, group) => {
      const { estimate, se, low, high, clipped, df } = result.groups[group]!;
      const unit = options.isBinary && estimate !== null ? estimate * (1 - estimate) : 0;
      merged[target] = {
        ...merged[target]!,
        estimate,
        se,
        low,
        high,
        clipped,
        df,
        deff: null,
        effectiveRespondents: null,
        effectiveBeforeAdjustment: se !== null && se > 0 && unit > 0 ? unit / (se * se) : merged[target]!.respondents,
        cv: se !== null && estimate !== null && estimate !== 0 ? se / estimate : null,
      };
    });
  }
  return { designDf: crude.designDf, targets: merged, contrasts: compared };
}
