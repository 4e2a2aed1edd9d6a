import type { ReadinessFinding, ReadinessView } from "../../shared/contracts/readiness.ts";
import type { Release } from "../models/Release.ts";
import type { Designs } from "./design.ts";
import { loadVariables } from "./codebook.ts";

/** Common practice, no source: a variable with more missing than this is remarked upon. */
const MUCH_MISSING = 0.2;

const NO_DESIGN: ReadinessFinding = {
  kind: "no-design",
  severity: "fault",
  message: "No design is declared.",
  remedy: "Say on the Design tab which variables hold weight, strata and PSUs.",
  count: null,
};

function missingRemarks(missing: ReadinessView["missing"]): ReadinessFinding[] {
  return missing
    .filter(({ share }) => share > MUCH_MISSING)
    .map(({ variable, share }) => ({
      kind: "much-missing",
      severity: "remark",
      message: `${Math.round(100 * share)} of 100 respondents have no value in “${variable}”.`,
      remedy: null,
      count: null,
    }));
}

/** A release's checks as they stand now. */
export async function readiness(designs: Designs, release: Release): Promise<Omit<ReadinessView, "can">> {
  const variables = await loadVariables(release.id);
  const missing = variables
    .map(({ name, label, missingRows, categories }) => {
      const coded = (categories ?? []).reduce((sum, { isMissing, respondents }) => sum + (isMissing ? respondents : 0), 0);
      return { variable: name, label, share: release.respondents === 0 ? 0 : (missingRows + coded) / release.respondents };
    })
    .sort((a, b) => b.share - a.share);
  const facts = await designs.facts(release);
  return {
    releaseId: release.id,
    respondents: release.respondents,
    sumOfWeights: facts?.sumOfWeights ?? null,
    strata: facts?.strata ?? 0,
    psus: facts?.psus ?? 0,
    degreesOfFreedom: facts?.degreesOfFreedom ?? 0,
    lonelyPsus: facts?.lonelyPsus ?? 0,
    weight: facts?.weight ?? null,
    missing,
    findings: [...(facts ? facts.findings : [NO_DESIGN]), ...missingRemarks(missing)],
  };
}
