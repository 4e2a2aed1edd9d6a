import { DesignError } from "./errors.ts";
import type { Sample } from "./types.ts";

/**
 * One stage of sampling. The variance of a sum of scores is, added over stages and groups,
 * factor · Σ (cluster's score − mean)², where the mean is the group's, or that over all clusters for a lone cluster.
 */
export interface VarianceLevel {
  /** First row of each cluster, and one past the last row. */
  clusterStart: Uint32Array;
  /** First cluster of each group (stratum; or PSU, at the second stage), and one past the last cluster. */
  groupStart: Uint32Array;
  factor: Float64Array;
  /** 1 where a group's one cluster is held against the mean of all clusters. */
  isLone: Uint8Array;
}

/**
 * The stages that add to a linearized variance. Without a second stage's sizes only the first counts: PSUs with
 * replacement, or with the finite population correction where the strata's sizes are known.
 *
 * @throws {DesignError} A stratum has one PSU and the design says to refuse, or a population is smaller than its sample.
 */
export function varianceLevels(sample: Sample): VarianceLevel[] {
  const first = firstLevel(sample);
  return sample.secondStage === null ? [first] : [first, secondLevel(sample, sample.secondStage)];
}

function firstLevel(sample: Sample): VarianceLevel {
  const { psuStart, stratumStart, lonely } = sample;
  const strata = stratumStart.length - 1;
  const factor = new Float64Array(strata);
  const isLone = new Uint8Array(strata);
  let loneStrata = 0;
  for (let stratum = 0; stratum < strata; stratum++) {
    const psus = stratumStart[stratum + 1]! - stratumStart[stratum]!;
    const unsampled = 1 - samplingFraction(sample, stratum);
    if (psus > 1) factor[stratum] = (unsampled * psus) / (psus - 1);
    else if (psus === 1 && unsampled > 0) {
      if (lonely === "refuse")
        throw new DesignError("lonely-psu", `Stratum number ${stratum + 1} has only one primary sampling unit`);
      loneStrata++;
      if (lonely !== "centred") continue;
      isLone[stratum] = 1;
      factor[stratum] = unsampled;
    }
  }
  if (lonely === "average" && loneStrata > 0 && loneStrata < strata) {
    for (let stratum = 0; stratum < strata; stratum++) factor[stratum]! *= strata / (strata - loneStrata);
  }
  return { clusterStart: psuStart, groupStart: stratumStart, factor, isLone };
}

/** Units within PSUs: f_h (1 − f_hi) m/(m − 1). One unit alone adds nothing; the first stage already counts it. */
function secondLevel(sample: Sample, stage: NonNullable<Sample["secondStage"]>): VarianceLevel {
  const { unitStart, psuUnitStart, psuPopulation } = stage;
  const psus = psuUnitStart.length - 1;
  const factor = new Float64Array(psus);
  for (let stratum = 0; stratum < sample.stratumStart.length - 1; stratum++) {
    const fraction = samplingFraction(sample, stratum);
    for (let psu = sample.stratumStart[stratum]!; psu < sample.stratumStart[stratum + 1]!; psu++) {
      const units = psuUnitStart[psu + 1]! - psuUnitStart[psu]!;
      const within = fractionOf(units, psuPopulation[psu]!, `Primary sampling unit number ${psu + 1}`);
      if (units > 1) factor[psu] = (fraction * (1 - within) * units) / (units - 1);
    }
  }
  return { clusterStart: unitStart, groupStart: psuUnitStart, factor, isLone: new Uint8Array(psus) };
}

function samplingFraction(sample: Sample, stratum: number): number {
  if (sample.stratumPopulation === null) return 0;
  const psus = sample.stratumStart[stratum + 1]! - sample.stratumStart[stratum]!;
  return fractionOf(psus, sample.stratumPopulation[stratum]!, `Stratum number ${stratum + 1}`);
}

function fractionOf(sampled: number, population: number, where: string): number {
  if (!(population >= sampled)) {
    throw new DesignError("bad-population", `${where} has ${sampled} units in the sample but ${population} in its population`);
  }
  return population === Infinity ? 0 : sampled / population;
}
