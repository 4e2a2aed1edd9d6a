import { type CellFunction, type CellSums, estimateFunction, everyCell, noInfluence } from "./cellFunction.ts";
import { fisherUpperTail } from "./distributions.ts";
import { invertSymmetric } from "./matrices.ts";
import type { Assignment, Sample } from "./types.ts";

/** Whether shares differ between groups at all. */
export interface Association {
  /** Pearson's X² of the weighted table scaled to the number of respondents, over the trace of its design effects. */
  f: number;
  numeratorDf: number;
  denominatorDf: number;
  p: number;
}

/**
 * Rao–Scott second-order corrected test that a 0/1 outcome's share is the same in every base cell: X²/tr Δ on
 * d = (tr Δ)²/tr Δ² and d·ν degrees of freedom, Δ the generalised design effects at the observed proportions, ν the PSUs
 * minus strata of the table's respondents. Empty cells are left out.
 *
 * @returns Null where there is nothing to test: fewer than two groups, everybody or nobody affected, no degrees of
 *   freedom, or design effects that are all 0.
 * @throws {DesignError} As estimates do.
 * @see Rao & Scott (1984), Annals of Statistics 12: 46-60. Thomas & Rao (1987), JASA 82: 630-636.
 */
export function association(sample: Sample, assignment: Assignment): Association | null {
  const table = estimateFunction(sample, assignment, {
    values: (sums) => contrastsOf(sums, proportionsOf(sums)),
    influences: (sums) => influencesOf(sums, proportionsOf(sums)),
  } satisfies CellFunction);
  // In replicates the proportions move but their inverses, part of the test's definition, stay; see `frozen`.
  const reference = proportionsOf(table.sums);
  const frozen =
    sample.replicates === null
      ? table
      : estimateFunction(sample, assignment, {
          values: (sums) => contrastsOf(sums, reference),
          influences: () => [],
        });
  const { groups, affected, unaffected } = reference;
  const size = groups.length - 1;
  const share = affected.reduce((sum, part) => sum + part, 0);
  if (size < 1 || share <= 0 || share >= 1) return null;
  const respondents = groups.reduce((sum, group) => sum + table.respondents[group]!, 0);
  const observed = new Float64Array(size * size);
  const simple = new Float64Array(size * size);
  for (let row = 0; row < size; row++) {
    for (let column = 0; column < size; column++) {
      const covariance = frozen.covariance(row, column);
      if (covariance === null) return null;
      observed[row * size + column] = covariance;
      const last = inverse(affected[size]!) + inverse(unaffected[size]!);
      const own = row === column ? inverse(affected[row]!) + inverse(unaffected[row]!) : 0;
      simple[row * size + column] = (own + last) / respondents;
    }
  }
  const inverted = invertSymmetric(simple, size);
  if (inverted === null) return null;
  const delta = product(inverted, observed, size);
  const trace = traceOf(delta, size);
  const traceOfSquare = traceOf(product(delta, delta, size), size);
  const degrees = table.degreesOfFreedom(everyCell(assignment.cells));
  if (!(trace > 0 && traceOfSquare > 0) || degrees < 1) return null;
  const f = (respondents * pearson(reference, share)) / trace;
  const numeratorDf = trace ** 2 / traceOfSquare;
  const denominatorDf = numeratorDf * degrees;
  return { f, numeratorDf, denominatorDf, p: fisherUpperTail(f, numeratorDf, denominatorDf) };
}

/** Shares of everyone: in a group and affected, in a group and not. */
interface Proportions {
  /** Base cells with anybody. */
  groups: number[];
  affected: number[];
  unaffected: number[];
  people: number;
}

function proportionsOf({ people, mean }: CellSums): Proportions {
  const groups = [...people.keys()].filter((cell) => people[cell]! > 0);
  const total = people.reduce((sum, weight) => sum + weight, 0);
  return {
    groups,
    affected: groups.map((cell) => (people[cell]! * mean[cell]!) / total),
    unaffected: groups.map((cell) => (people[cell]! * (1 - mean[cell]!)) / total),
    people: total,
  };
}

/** Each group's affected less unaffected share, both over their full-sample values, less the same of the last group. */
function contrastsOf(sums: CellSums, full: Proportions): Float64Array {
  const total = sums.people.reduce((sum, weight) => sum + weight, 0);
  const level = (index: number) => {
    const cell = full.groups[index]!;
    const people = sums.people[cell]!;
    const affected = people > 0 ? (people * sums.mean[cell]!) / total : 0;
    return affected * inverse(full.affected[index]!) - (people / total - affected) * inverse(full.unaffected[index]!);
  };
  const last = full.groups.length - 1;
  return Float64Array.from({ length: Math.max(0, last) }, (_, index) => level(index) - level(last));
}

function influencesOf({ people, mean }: CellSums, full: Proportions) {
  const last = full.groups.length - 1;
  const add = (index: number, sign: number, into: ReturnType<typeof noInfluence>) => {
    const cell = full.groups[index]!;
    const onAffected = sign * inverse(full.affected[index]!);
    const onUnaffected = sign * inverse(full.unaffected[index]!);
    into.onResidual[cell]! += (onAffected + onUnaffected) / full.people;
    // Where a group has both outcomes, a person more or less of its own kind changes nothing.
    if (onAffected !== 0 && onUnaffected !== 0) return;
    into.onPeople[cell]! += (onAffected * mean[cell]! - onUnaffected * (1 - mean[cell]!)) / full.people;
    const shrink = (onAffected * full.affected[index]! - onUnaffected * full.unaffected[index]!) / full.people;
    for (const other of full.groups) into.onPeople[other]! -= shrink;
  };
  return Array.from({ length: Math.max(0, last) }, (_, index) => {
    const influence = noInfluence(people.length);
    add(index, 1, influence);
    add(last, -1, influence);
    return influence;
  });
}

/** Σ (observed − expected)²/expected of the proportions. */
function pearson({ affected, unaffected }: Proportions, share: number): number {
  return affected.reduce((sum, part, index) => {
    const group = part + unaffected[index]!;
    const expected = group * share;
    const difference = part - expected;
    return sum + difference ** 2 / expected + difference ** 2 / (group - expected);
  }, 0);
}

function inverse(proportion: number): number {
  return proportion > 0 ? 1 / proportion : 0;
}

function product(left: Float64Array, right: Float64Array, size: number): Float64Array {
  const result = new Float64Array(size * size);
  for (let row = 0; row < size; row++) {
    for (let inner = 0; inner < size; inner++) {
      const factor = left[row * size + inner]!;
      for (let column = 0; column < size; column++) result[row * size + column]! += factor * right[inner * size + column]!;
    }
  }
  return result;
}

function traceOf(matrix: Float64Array, size: number): number {
  let sum = 0;
  for (let row = 0; row < size; row++) sum += matrix[row * size + row]!;
  return sum;
}
