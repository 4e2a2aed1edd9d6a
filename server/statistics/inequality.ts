import { type CellFunction, type CellSums, estimateFunction, type Influence, noInfluence } from "./cellFunction.ts";
import type { Level } from "./intervals.ts";
import { type Measure, measure } from "./measure.ts";
import { type CellDesign, type Fit, fitCells, respond } from "./regression.ts";
import { SeparationError, SingularFitError } from "./errors.ts";
import type { Assignment, Sample } from "./types.ts";

/** Inequality over groups from the lowest to the highest rank. A measure is undefined where its formula is. */
export interface Inequality {
  /** Fitted difference between rank 1 and rank 0 of a straight line. */
  slopeIndex: Measure;
  /** Fitted value at rank 1 over that at rank 0; undefined unless both are above 0. */
  relativeIndex: Measure;
  /** The same two of a logistic curve, which stays between 0 and 1; undefined for a mean. */
  logisticSlopeIndex: Measure;
  logisticRelativeIndex: Measure;
  /** Σ p (2R − 1) y over groups' shares p and ridits R. */
  absoluteConcentration: Measure;
  /** The same over the mean. */
  relativeConcentration: Measure;
  df: number;
}

/**
 * Indexes of inequality over ordered groups, each at its ridit: the share of people below it plus half its own. Ridits
 * are estimates too, and their sampling counts in the errors.
 *
 * @param ordered Base cells from lowest to highest; others are left out.
 * @throws {DesignError} As estimates do.
 * @see Mackenbach & Kunst (1997), Social Science & Medicine 44: 757-771. WHO (2013), Handbook on health inequality
 *   monitoring, chapter 3.
 */
export function inequality(sample: Sample, assignment: Assignment, ordered: readonly number[], level: Level): Inequality {
  const { isBinary } = assignment;
  const estimate = estimateFunction(sample, assignment, {
    values: (sums) => indexesOf(rankGroups(sums, ordered), isBinary),
    influences: (sums) => indexInfluences(sums, ordered, isBinary),
  } satisfies CellFunction);
  const df = estimate.degreesOfFreedom({ cells: ordered });
  const of = (value: number) => measure(estimate, value, df, level);
  return {
    slopeIndex: of(0),
    relativeIndex: of(1),
    absoluteConcentration: of(2),
    relativeConcentration: of(3),
    logisticSlopeIndex: of(4),
    logisticRelativeIndex: of(5),
    df,
  };
}

/** Ordered groups with people, outcome and rank, the ridit less ½. */
interface RankedGroups {
  people: number[];
  all: number;
  rank: number[];
  outcome: number[];
  mean: number;
}

function rankGroups(sums: CellSums, ordered: readonly number[]): RankedGroups {
  const people = ordered.map((cell) => sums.people[cell]!);
  const all = people.reduce((sum, weight) => sum + weight, 0);
  let below = 0;
  const rank = people.map((weight) => {
    const middle = (below + weight / 2) / all - 0.5;
    below += weight;
    return middle;
  });
  const outcome = ordered.map((cell, place) => (people[place]! > 0 ? sums.mean[cell]! : 0));
  return { people, all, rank, outcome, mean: outcome.reduce((sum, y, place) => sum + people[place]! * y, 0) / all };
}

/** Σ w x (y − ȳ) and Σ w x² of ranks x. */
function momentsOf({ people, rank, outcome, mean }: RankedGroups): { product: number; square: number } {
  const sumOf = (term: (place: number) => number) => people.reduce((sum, weight, place) => sum + weight * term(place), 0);
  return { product: sumOf((place) => rank[place]! * (outcome[place]! - mean)), square: sumOf((place) => rank[place]! ** 2) };
}

function indexesOf(groups: RankedGroups, isBinary: boolean): Float64Array {
  const { all, mean } = groups;
  const { product, square } = momentsOf(groups);
  const slope = square > 0 ? product / square : NaN;
  const [bottom, top] = [mean - slope / 2, mean + slope / 2];
  const concentration = (2 * product) / all;
  const curve = isBinary ? fitCurve(groups) : null;
  const ends = curve === null ? null : endsOf(curve);
  return Float64Array.of(
    slope,
    bottom > 0 && top > 0 ? top / bottom : NaN,
    concentration,
    mean === 0 ? NaN : concentration / mean,
    ends === null ? NaN : ends.top.mean - ends.bottom.mean,
    ends === null ? NaN : ends.top.mean / ends.bottom.mean,
  );
}

interface Curve {
  sums: CellSums;
  design: CellDesign;
  fit: Fit;
}

/** The logistic curve over ranks; null where there is none. */
function fitCurve({ people, outcome, rank }: RankedGroups): Curve | null {
  const sums = { people: Float64Array.from(people), mean: Float64Array.from(outcome) };
  const design = { terms: 2, values: Float64Array.from(rank.flatMap((x) => [1, x])) };
  try {
    return { sums, design, fit: fitCells(sums, design, "logistic") };
  } catch (error) {
    if (error instanceof SeparationError || error instanceof SingularFitError) return null;
    throw error;
  }
}

function endsOf({ fit: { coefficients } }: Curve) {
  const [level, slope] = [coefficients[0]!, coefficients[1]!];
  return { bottom: respond(level - slope / 2, "logistic"), top: respond(level + slope / 2, "logistic") };
}

/**
 * What one person more in each group is worth by way of ranks: it raises groups above by 1/all, its own by half that, and
 * lowers all by their ridits.
 *
 * @param worth What a unit of rank is worth in each group.
 */
function throughRanks({ rank, all }: RankedGroups, worth: readonly number[]): number[] {
  const lowered = worth.reduce((sum, value, place) => sum + value * (rank[place]! + 0.5), 0);
  let above = worth.reduce((sum, value) => sum + value, 0);
  return worth.map((value) => {
    above -= value;
    return (above + value / 2 - lowered) / all;
  });
}

/** By chain rule from the influences of the moments, the mean and the number of people. */
function indexInfluences(sums: CellSums, ordered: readonly number[], isBinary: boolean): Influence[] {
  const groups = rankGroups(sums, ordered);
  const { people, all, rank, outcome, mean } = groups;
  const { product, square } = momentsOf(groups);
  const cells = sums.people.length;
  const from = (onResidual: (place: number) => number, onPeople: (place: number) => number): Influence => {
    const influence = noInfluence(cells);
    ordered.forEach((cell, place) => {
      if (!(people[place]! > 0)) return;
      influence.onResidual[cell] = onResidual(place);
      influence.onPeople[cell] = onPeople(place);
    });
    return influence;
  };
  const away = (place: number) => outcome[place]! - mean;
  const productByRank = throughRanks(
    groups,
    people.map((weight, place) => weight * away(place)),
  );
  const squareByRank = throughRanks(
    groups,
    people.map((weight, place) => 2 * weight * rank[place]!),
  );
  const ofProduct = from(
    (place) => rank[place]!,
    (place) => rank[place]! * away(place) + productByRank[place]!,
  );
  const ofSquare = from(
    () => 0,
    (place) => rank[place]! ** 2 + squareByRank[place]!,
  );
  const ofMean = from(
    () => 1 / all,
    (place) => away(place) / all,
  );
  const ofPeople = from(
    () => 0,
    () => 1,
  );
  const slope = product / square;
  const bottom = mean - slope / 2;
  const concentration = (2 * product) / all;
  const ofSlope = sumOf([1 / square, ofProduct], [-slope / square, ofSquare]);
  const ofConcentration = sumOf([2 / all, ofProduct], [-concentration / all, ofPeople]);
  return [
    ofSlope,
    sumOf([-slope / bottom ** 2, ofMean], [mean / bottom ** 2, ofSlope]),
    ofConcentration,
    sumOf([1 / mean, ofConcentration], [-concentration / mean ** 2, ofMean]),
    ...curveInfluences(groups, from, isBinary),
  ];
}

/** Of the logistic curve's difference and ratio of ends. */
function curveInfluences(
  groups: RankedGroups,
  from: (onResidual: (place: number) => number, onPeople: (place: number) => number) => Influence,
  isBinary: boolean,
): Influence[] {
  const curve = isBinary ? fitCurve(groups) : null;
  if (curve === null)
    return [
      from(
        () => 0,
        () => 0,
      ),
      from(
        () => 0,
        () => 0,
      ),
    ];
  const { fit } = curve;
  const { people, rank, outcome } = groups;
  const residual = (place: number) => outcome[place]! - fit.fitted[place]!;
  const fall = (place: number) => people[place]! * fit.slope[place]! * fit.coefficients[1]!;
  // The score's two parts, Σ w (y − μ) and Σ w x (y − μ), respond to ranks too.
  const levelByRank = throughRanks(
    groups,
    rank.map((_, place) => -fall(place)),
  );
  const slopeByRank = throughRanks(
    groups,
    rank.map((x, place) => people[place]! * residual(place) - fall(place) * x),
  );
  const scores = [
    from(
      () => 1,
      (place) => residual(place) + levelByRank[place]!,
    ),
    from(
      (place) => rank[place]!,
      (place) => rank[place]! * residual(place) + slopeByRank[place]!,
    ),
  ] as const;
  const ofCoefficient = (term: number) => sumOf([fit.inverse[2 * term]!, scores[0]], [fit.inverse[2 * term + 1]!, scores[1]]);
  const ofLevel = ofCoefficient(0);
  const ofSlope = ofCoefficient(1);
  const { bottom, top } = endsOf(curve);
  const ofBottom = sumOf([bottom.slope, ofLevel], [-bottom.slope / 2, ofSlope]);
  const ofTop = sumOf([top.slope, ofLevel], [top.slope / 2, ofSlope]);
  return [sumOf([1, ofTop], [-1, ofBottom]), sumOf([1 / bottom.mean, ofTop], [-top.mean / bottom.mean ** 2, ofBottom])];
}

function sumOf(...terms: (readonly [number, Influence])[]): Influence {
  const influence = noInfluence(terms[0]?.[1].onPeople.length ?? 0);
  for (const [factor, { onResidual, onPeople }] of terms) {
    onResidual.forEach((value, cell) => (influence.onResidual[cell]! += factor * value));
    onPeople.forEach((value, cell) => (influence.onPeople[cell]! += factor * value));
  }
  return influence;
}
