import type { DisclosureMinimums } from "../../shared/contracts/design.ts";
import { poolWaves, shiftCells } from "../statistics/pooled.ts";
import type { Assignment, Sample } from "../statistics/types.ts";
import { assign, type Columns } from "./assign.ts";
import type { Plan } from "./plan.ts";

/** The same question over another release, whose groups are those of the table in the same order. */
export interface OtherWave {
  plan: Plan;
  columns: Columns;
  sample: Sample;
  minimums: DisclosureMinimums | null;
}

/** Both waves as one sample with strata of their own; the other wave's cells come after the first one's. */
export function besideEachOther(
  sample: Sample,
  assignment: Assignment,
  other: OtherWave,
): { sample: Sample; assignment: Assignment } {
  const second = assign(other.plan, other.columns, other.sample.weight);
  return poolWaves([
    { sample, assignment, factor: 1 },
    { sample: other.sample, assignment: shiftCells(second, assignment.cells), factor: 1 },
  ]);
}
