import type { ReadinessFinding } from "../../shared/contracts/readiness.ts";
import { fault } from "./findings.ts";

/** Whether sizes of a stage are there, agree within a unit, and are no smaller than what was drawn. */
export function populationFindings(
  sizes: Float64Array,
  starts: ArrayLike<number>,
  rowsOf: ArrayLike<number>,
  order: Uint32Array,
  name: string,
  unit: string,
): ReadinessFinding[] {
  let missing = 0;
  let varies = 0;
  let small = 0;
  for (let i = 0; i + 1 < starts.length; i++) {
    const [from, to] = [rowsOf[starts[i]!]!, rowsOf[starts[i + 1]!]!];
    const size = sizes[order[from]!]!;
    if (Number.isNaN(size)) missing += 1;
    else {
      let agrees = true;
      for (let place = from; place < to && agrees; place++) agrees = sizes[order[place]!] === size;
      if (!agrees) varies += 1;
      if (size < starts[i + 1]! - starts[i]!) small += 1;
    }
  }
  const findings: ReadinessFinding[] = [];
  if (missing > 0)
    findings.push(
      fault(
        "population-size-missing",
        `“${name}” gives no population size for ${missing} ${unit}.`,
        "Give every respondent the size, or take the correction out.",
        missing,
      ),
    );
  if (varies > 0)
    findings.push(
      fault(
        "population-size-varies",
        `“${name}” differs within ${varies} ${unit}.`,
        "The size must be the same for everyone in it. Correct the variable or choose another.",
        varies,
      ),
    );
  if (small > 0)
    findings.push(
      fault(
        "population-size-small",
        `“${name}” is smaller than the number drawn in ${small} ${unit}.`,
        "A population can't be smaller than its sample: the variable may hold sampling fractions. Choose the one that holds counts.",
        small,
      ),
    );
  return findings;
}
