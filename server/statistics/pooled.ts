import { DesignError } from "./errors.ts";
import type { Assignment, Replicates, Sample, SecondStage } from "./types.ts";

/** One wave to be pooled. */
export interface Wave {
  sample: Sample;
  assignment: Assignment;
  /** What its weights are multiplied by: 1 to compare waves or follow them, 1/waves to describe their average year. */
  factor: number;
}

/**
 * Several waves as one sample. Strata and PSUs of different waves stay apart, so that waves drawn independently have no
 * covariance. Rows, cells and outcomes follow one another in the waves' order; base cells are those of the assignments,
 * which must number them alike (a wave's own cells first shifted by `shiftCells` keep the waves apart).
 *
 * @throws {DesignError} The waves treat lonely PSUs differently; some have replicate weights, sizes of the population or
 *   a second stage and others have not; or replicates take deviations from their own mean, which cannot be pooled.
 * @see Korn & Graubard (1999), Analysis of Health Surveys, chapter 8.
 */
export function poolWaves(waves: readonly Wave[]): { sample: Sample; assignment: Assignment } {
  const samples = waves.map(({ sample }) => sample);
  const assignments = waves.map(({ assignment }) => assignment);
  const lonely = same(samples.map((sample) => sample.lonely));
  const rowsBefore = runningSums(samples.map(({ weight }) => weight.length));
  const psusBefore = runningSums(samples.map(({ psuStart }) => psuStart.length - 1));
  const weight = joined(waves.map(({ sample, factor }) => sample.weight.map((value) => value * factor)));
  return {
    sample: {
      weight,
      psuStart: joinStarts(
        samples.map(({ psuStart }) => psuStart),
        rowsBefore,
      ),
      stratumStart: joinStarts(
        samples.map(({ stratumStart }) => stratumStart),
        psusBefore,
      ),
      lonely,
      stratumPopulation: all(
        samples.map(({ stratumPopulation }) => stratumPopulation),
        joined,
      ),
      secondStage: all(
        samples.map(({ secondStage }) => secondStage),
        (stages) => joinStages(stages, rowsBefore),
      ),
      replicates: all(
        samples.map(({ replicates }) => replicates),
        (replicates) => joinReplicates(waves, replicates, weight, rowsBefore),
      ),
    },
    assignment: {
      cell: Int32Array.from(joined(assignments.map(({ cell }) => Float64Array.from(cell)))),
      cells: Math.max(0, ...assignments.map(({ cells }) => cells)),
      outcome: joined(assignments.map(({ outcome }) => Float64Array.from(outcome))),
      isBinary: assignments.every(({ isBinary }) => isBinary),
    },
  };
}

/** An assignment whose base cells begin at `first`: that of one wave beside others. */
export function shiftCells(assignment: Assignment, first: number): Assignment {
  return {
    ...assignment,
    cell: assignment.cell.map((cell) => (cell < 0 ? -1 : cell + first)),
    cells: assignment.cells + first,
  };
}

/** Waves' replicates in blocks: in each block one wave varies and the others keep their full weights. */
function joinReplicates(
  waves: readonly Wave[],
  replicates: readonly Replicates[],
  weight: Float64Array,
  rowsBefore: readonly number[],
): Replicates {
  if (!replicates.every(({ mse }) => mse)) {
    throw new DesignError("bad-replicates", "Replicates with deviations from their own mean cannot be pooled over waves");
  }
  return {
    weights: replicates.flatMap(({ weights }, wave) =>
      weights.map((own) => {
        const values = weight.slice();
        values.set(
          own.map((value) => value * waves[wave]!.factor),
          rowsBefore[wave],
        );
        return values;
      }),
    ),
    scale: 1,
    replicateScales: joined(replicates.map(({ scale, replicateScales }) => replicateScales.map((value) => value * scale))),
    mse: true,
    degreesOfFreedom: replicates.reduce((sum, { degreesOfFreedom }) => sum + degreesOfFreedom, 0),
  };
}

function joinStages(stages: readonly SecondStage[], rowsBefore: readonly number[]): SecondStage {
  const unitsBefore = runningSums(stages.map(({ unitStart }) => unitStart.length - 1));
  return {
    unitStart: joinStarts(
      stages.map(({ unitStart }) => unitStart),
      rowsBefore,
    ),
    psuUnitStart: joinStarts(
      stages.map(({ psuUnitStart }) => psuUnitStart),
      unitsBefore,
    ),
    psuPopulation: joined(stages.map(({ psuPopulation }) => psuPopulation)),
  };
}

/** Starts of runs, each wave's counted on from those before; one past the last once, at the end. */
function joinStarts(starts: readonly Uint32Array[], before: readonly number[]): Uint32Array {
  return Uint32Array.from([
    ...starts.flatMap((start, wave) => Array.from(start.subarray(0, -1), (value) => value + before[wave]!)),
    before[starts.length]!,
  ]);
}

function joined(parts: readonly Float64Array[]): Float64Array {
  const result = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    result.set(part, at);
    at += part.length;
  }
  return result;
}

/** Sums before each place, and the whole after the last. */
function runningSums(values: readonly number[]): number[] {
  const sums = [0];
  for (const value of values) sums.push(sums.at(-1)! + value);
  return sums;
}

function same(rules: readonly Sample["lonely"][]): Sample["lonely"] {
  const [first] = rules;
  if (first === undefined || rules.some((rule) => rule !== first)) {
    throw new DesignError("mixed-waves", "The waves' designs treat strata with one sampling unit differently");
  }
  return first;
}

function all<Part, Whole>(parts: readonly (Part | null)[], join: (parts: readonly Part[]) => Whole): Whole | null {
  const known = parts.filter((part) => part !== null);
  if (known.length === 0) return null;
  if (known.length < parts.length) {
    throw new DesignError("mixed-waves", "The waves' designs differ: only some have replicate weights or population sizes");
  }
  return join(known);
}
