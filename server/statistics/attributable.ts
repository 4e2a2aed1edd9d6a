import { type CellFunction, type CellSums, estimateFunction, everyCell, noInfluence } from "./cellFunction.ts";
import type { Level } from "./intervals.ts";
import { type Measure, measure } from "./measure.ts";
import type { Assignment, Sample } from "./types.ts";

/** How much of an outcome would go, had everyone the reference group's level. */
export interface Attributable {
  overall: number | null;
  reference: number | null;
  /** Population attributable risk: overall less reference. */
  risk: Measure;
  /** Population attributable fraction: the risk over the overall level. */
  fraction: Measure;
  df: number;
}

/**
 * Population attributable risk and fraction of base cells against one of them. Arithmetic on an association: it says what
 * equal levels would mean, not what would follow from a cause removed.
 *
 * @param reference The base cell everyone is compared with.
 * @throws {DesignError} As estimates do.
 * @see Miettinen (1974), American Journal of Epidemiology 99: 325-332. Rockhill, Newman & Weinberg (1998), AJPH 88: 15-19.
 */
export function attributable(sample: Sample, assignment: Assignment, reference: number, level: Level): Attributable {
  const { cells } = assignment;
  const estimate = estimateFunction(sample, assignment, {
    values: (sums) => {
      const { mean } = overallOf(sums);
      const own = sums.mean[reference]!;
      return Float64Array.of(mean, own, mean - own, (mean - own) / mean);
    },
    influences: (sums) => {
      const { mean, people } = overallOf(sums);
      const own = sums.mean[reference]!;
      const slopes = [
        [1, 0],
        [0, 1],
        [1, -1],
        [own / mean ** 2, -1 / mean],
      ] as const;
      return slopes.map(([onOverall, onReference]) => {
        const influence = noInfluence(cells);
        for (let cell = 0; cell < cells; cell++) {
          if (!(sums.people[cell]! > 0)) continue;
          influence.onResidual[cell] = onOverall / people;
          influence.onPeople[cell] = (onOverall * (sums.mean[cell]! - mean)) / people;
        }
        influence.onResidual[reference]! += onReference / sums.people[reference]!;
        return influence;
      });
    },
  } satisfies CellFunction);
  const df = estimate.degreesOfFreedom(everyCell(cells));
  const of = (value: number) => measure(estimate, value, df, level);
  return { overall: of(0).estimate, reference: of(1).estimate, risk: of(2), fraction: of(3), df };
}

function overallOf({ people, mean }: CellSums): { people: number; mean: number } {
  let weight = 0;
  let total = 0;
  people.forEach((w, cell) => {
    if (!(w > 0)) return;
    weight += w;
    total += w * mean[cell]!;
  });
  return { people: weight, mean: total / weight };
}
