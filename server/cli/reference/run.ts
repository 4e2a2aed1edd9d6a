import { readCases, type ReferenceCase } from "./cases.ts";
import type { Comparison } from "./compare.ts";
import {
  checkAdjusted,
  checkAssociation,
  checkAttributable,
  checkInequality,
  checkQuantiles,
  checkStandardised,
  checkTrend,
} from "./models.ts";
import { checkTable } from "./tables.ts";

/** How each kind of case is checked; a kind without an entry is `not yet`. */
const KINDS: Readonly<Record<string, (reference: ReferenceCase, folder: string) => Promise<Comparison>>> = {
  prevalence: checkTable,
  mean: checkTable,
  comparison: checkTable,
  "two-group-mean": checkTable,
  association: checkAssociation,
  standardised: checkStandardised,
  trend: checkTrend,
  adjusted: checkAdjusted,
  attributable: checkAttributable,
  inequality: checkInequality,
  quantile: checkQuantiles,
};

const DIFFERENCES_PRINTED = 5;

async function judge(
  reference: ReferenceCase,
  folder: string,
): Promise<{ verdict: "passed" | "failed" | "not yet"; line: string }> {
  const check = KINDS[reference.kind];
  if (!check)
    return { verdict: "not yet", line: `not yet  ${reference.id}: no question of the kind “${reference.kind}” can be put` };
  try {
    const { differences, checks, unchecked } = await check(reference, folder);
    const left = unchecked.size > 0 ? `; not offered: ${[...unchecked].sort().join(", ")}` : "";
    if (differences.length === 0 && checks > 0)
      return { verdict: "passed", line: `passed   ${reference.id}: ${checks} figures${left}` };
    const shown = [
      ...differences.slice(0, DIFFERENCES_PRINTED),
      ...(differences.length > DIFFERENCES_PRINTED ? [`and ${differences.length - DIFFERENCES_PRINTED} more`] : []),
    ];
    return { verdict: "failed", line: `failed   ${reference.id}: ${checks === 0 ? "nothing was checked" : shown.join("; ")}` };
  } catch (error) {
    return { verdict: "failed", line: `failed   ${reference.id}: ${error instanceof Error ? error.message : String(error)}` };
  }
}

/** Runs every case of a folder and prints a line for each. */
export async function runReference(
  folder: string,
  print: (line: string) => void,
): Promise<{ passed: number; failed: number; notYet: number }> {
  const counts = { passed: 0, failed: 0, "not yet": 0 };
  for (const entry of await readCases(folder)) {
    const { verdict, line } =
      "case" in entry
        ? await judge(entry.case, folder)
        : { verdict: "failed" as const, line: `failed   ${entry.id}: ${entry.problem}` };
    counts[verdict]++;
    print(line);
  }
  return { passed: counts.passed, failed: counts.failed, notYet: counts["not yet"] };
}
