import { estimateTargets, type TargetEstimate } from "../../../server/statistics/estimate.ts";
import type { Assignment, Sample } from "../../../server/statistics/types.ts";
import { loadCase, type LoadedCase, type ReferenceCase } from "./referenceCases.ts";

/** How published tables were made unless they say otherwise. */
export const options = { level: 95, interval: "korn-graubard", difference: "linear", isBinary: true } as const;

/** A data set beside cases.json as a sample with cells, without a case of its own. */
export function load(data: string, design: ReferenceCase["design"], query: ReferenceCase["query"]): LoadedCase {
  return loadCase({ id: data, kind: "", data, design, query, expected: {} });
}

/** Everyone in any cell, as one domain. */
export function estimateAll({ sample, assignment }: { sample: Sample; assignment: Assignment }): TargetEstimate {
  const cells = Array.from({ length: assignment.cells }, (_, cell) => cell);
  const { isBinary } = assignment;
  return estimateTargets(sample, assignment, [{ cells }], [], { ...options, isBinary }).targets[0]!;
}
