import type { Design } from "../../shared/contracts/design.ts";
import type { ReadinessFinding, ReadinessView } from "../../shared/contracts/readiness.ts";
import { isUnlabelled } from "./columns.ts";
import type { DesignData } from "./designData.ts";
import type { Labels, Layout } from "./layout.ts";
import { fault, remark } from "./findings.ts";
import { populationFindings } from "./populationFindings.ts";
import { weightSpread } from "./weightSpread.ts";

/** What a release's checks find in its design's variables. */
export type ReadinessFacts = Pick<
  ReadinessView,
  "sumOfWeights" | "strata" | "psus" | "degreesOfFreedom" | "lonelyPsus" | "weight" | "findings"
>;

/** Below so many degrees of freedom the NCHS standards ask for a look at every figure (Series 2 no. 175). */
const FEW_DEGREES = 8;
/** Common practice, no source: past this the weights alone more than halve what the sample tells. */
const HEAVY_KISH = 2.5;

const countWhere = (rows: number, test: (row: number) => boolean) => {
  let count = 0;
  for (let row = 0; row < rows; row++) if (test(row)) count += 1;
  return count;
};

const people = (count: number) => `${count.toLocaleString("en-GB")} ${count === 1 ? "respondent has" : "respondents have"}`;

function weightFindings(weight: Float64Array, name: string): ReadinessFinding[] {
  const missing = countWhere(weight.length, (row) => Number.isNaN(weight[row]!));
  const negative = countWhere(weight.length, (row) => weight[row]! < 0);
  const zero = countWhere(weight.length, (row) => weight[row] === 0);
  const findings: ReadinessFinding[] = [];
  if (missing > 0)
    findings.push(
      fault(
        "weight-missing",
        `${people(missing)} no weight in “${name}”.`,
        "Bring the release in again with a weight for everyone; 0 for those who weren't examined.",
        missing,
      ),
    );
  if (negative > 0)
    findings.push(
      fault(
        "weight-negative",
        `${people(negative)} a negative weight in “${name}”.`,
        "Correct the weights, or choose the right variable, and bring the release in again.",
        negative,
      ),
    );
  if (zero > 0 && zero + missing === weight.length)
    findings.push(
      fault("weights-all-zero", `All weights in “${name}” are zero.`, "Choose the variable that holds the weights.", zero),
    );
  else if (zero > 0)
    findings.push(
      remark("weight-zero", `${people(zero)} weight 0: they count in no figure, but their PSUs stay in the design.`, zero),
    );
  return findings;
}

function labelFindings(labels: Labels, what: string, name: string): ReadinessFinding[] {
  const missing = countWhere(labels.labels.length, (row) => isUnlabelled(labels.labels[row]!));
  if (missing === 0) return [];
  return [
    fault(
      `${what}-missing`,
      `${people(missing)} no ${what} in “${name}”.`,
      `Give everyone a ${what}, or choose another variable.`,
      missing,
    ),
  ];
}

/** PSU labels that stand in more than one stratum. */
function sharedPsus(strata: Labels, psus: Labels): number {
  const stratumOf = new Map<number, number>();
  const shared = new Set<number>();
  psus.labels.forEach((psu, row) => {
    if (isUnlabelled(psu)) return;
    const stratum = strata.labels[row]!;
    const known = stratumOf.get(psu);
    if (known === undefined) stratumOf.set(psu, stratum);
    else if (known !== stratum) shared.add(psu);
  });
  return shared.size;
}

function lonelyFindings(design: Design, strata: number, lonely: number): ReadinessFinding[] {
  if (lonely === 0 || design.replicates) return [];
  const which = `${lonely} of ${strata} strata ${lonely === 1 ? "has" : "have"} a single PSU`;
  if (lonely === strata)
    return [
      fault(
        "all-lonely",
        `Every stratum has a single PSU, so no variance can be worked out.`,
        "Join strata, or name smaller PSUs, or leave the strata out.",
        lonely,
      ),
    ];
  if (design.lonely === "refuse")
    return [
      fault(
        "lonely-refused",
        `${which}, and the design says to refuse that.`,
        "Join those strata with neighbours, or choose another rule for lonely PSUs.",
        lonely,
      ),
    ];
  const rule = {
    centred: "is counted by its distance from the mean of all PSUs",
    certainty: "adds nothing to variances",
    average: "counts as much as the others on average",
  }[design.lonely];
  return [remark("lonely", `${which}; each ${rule}.`, lonely)];
}

function replicateFindings(weights: ReadonlyMap<string, Float64Array>): ReadinessFinding[] {
  let damaged = 0;
  for (const values of weights.values()) if (values.some((value) => Number.isNaN(value) || value < 0)) damaged += 1;
  if (damaged === 0) return [];
  return [
    fault(
      "replicate-weights",
      `${damaged} replicate weights have missing or negative values.`,
      "Bring the release in again with all replicate weights filled, or correct the pattern.",
      damaged,
    ),
  ];
}

/**
 * Checks what a design says of each respondent.
 * @param names What the variables are called. @param replicates Replicate weights by name, rows in file order.
 */
export function readinessFacts(
  design: Design,
  data: DesignData,
  layout: Layout,
  rows: number,
  replicates: ReadonlyMap<string, Float64Array>,
): ReadinessFacts {
  const psu = Array.isArray(design.psu) ? design.psu : design.psu === null ? [] : [design.psu];
  const sizes = Array.isArray(design.populationSize)
    ? design.populationSize
    : design.populationSize === null
      ? []
      : [design.populationSize];
  const strata = layout.stratumStart.length - 1;
  const psus = layout.psuStart.length - 1;
  let lonelyPsus = 0;
  for (let h = 0; h < strata; h++) if (layout.stratumStart[h + 1]! - layout.stratumStart[h]! === 1) lonelyPsus += 1;
  const findings: ReadinessFinding[] = [];
  if (data.weight && design.weight !== null) findings.push(...weightFindings(data.weight, design.weight));
  else findings.push(remark("no-weight", "No weight is declared: every respondent counts the same.", null));
  if (data.strata) findings.push(...labelFindings(data.strata, "stratum", design.strata ?? ""));
  data.stages.forEach((stage, i) => findings.push(...labelFindings(stage, "PSU", psu[i] ?? "")));
  const [first] = data.stages;
  if (design.psuLabelsAreUnique && data.strata && first) {
    const shared = sharedPsus(data.strata, first);
    if (shared > 0)
      findings.push(
        fault(
          "psu-in-two-strata",
          `${shared} PSU ${shared === 1 ? "label stands" : "labels stand"} in more than one stratum, though labels are declared unique.`,
          "If labels are only unique within a stratum, say so in the design; otherwise correct the file.",
          shared,
        ),
      );
  }
  const stratumRows = Uint32Array.from(layout.psuStart);
  if (data.populations[0])
    findings.push(
      ...populationFindings(data.populations[0], layout.stratumStart, stratumRows, layout.order, sizes[0] ?? "", "strata"),
    );
  if (data.populations[1] && layout.psuUnitStart && layout.unitStart)
    findings.push(
      ...populationFindings(data.populations[1], layout.psuUnitStart, layout.unitStart, layout.order, sizes[1] ?? "", "PSUs"),
    );
  findings.push(...lonelyFindings(design, strata, lonelyPsus), ...replicateFindings(replicates));
  const weight = data.weight ? weightSpread(data.weight) : null;
  const degreesOfFreedom = design.replicates
    ? (design.replicates.degreesOfFreedom ?? replicates.size - 1)
    : countedDegrees(data.weight, layout);
  if (degreesOfFreedom < FEW_DEGREES && lonelyPsus < strata)
    findings.push(
      remark(
        "few-degrees",
        `The design has ${degreesOfFreedom} degrees of freedom; below ${FEW_DEGREES} every interval is wide and worth a second look.`,
        null,
      ),
    );
  if (weight && weight.kishEffect > HEAVY_KISH)
    findings.push(
      remark(
        "uneven-weights",
        `The weights are very uneven: by themselves they widen intervals as if the sample were ${weight.kishEffect.toFixed(1)} times smaller.`,
        null,
      ),
    );
  return { sumOfWeights: data.weight ? sum(data.weight) : rows, strata, psus, degreesOfFreedom, lonelyPsus, weight, findings };
}

function sum(values: Float64Array): number {
  let total = 0;
  for (const value of values) if (!Number.isNaN(value)) total += value;
  return total;
}

/** PSUs less strata, of those that hold someone of positive weight. */
function countedDegrees(weight: Float64Array | null, { order, psuStart, stratumStart }: Layout): number {
  let psus = 0;
  let strata = 0;
  for (let h = 0; h + 1 < stratumStart.length; h++) {
    let inStratum = 0;
    for (let psu = stratumStart[h]!; psu < stratumStart[h + 1]!; psu++) {
      const isCounted = weight === null || order.subarray(psuStart[psu], psuStart[psu + 1]).some((row) => weight[row]! > 0);
      if (isCounted) inStratum += 1;
    }
    psus += inStratum;
    if (inStratum > 0) strata += 1;
  }
  return psus - strata;
}
