import type { Design } from "../../../shared/contracts/design.ts";

/** What each rule does to a stratum with a single PSU, in a sentence. */
export const LONELY_RULES: { value: Design["lonely"]; label: string; detail: string }[] = [
  {
    value: "centred",
    label: "Centred",
    detail: "Counts by how far it lies from the mean of all PSUs: careful, and the default.",
  },
  { value: "average", label: "Average", detail: "Counts as much as the other strata do on average." },
  {
    value: "certainty",
    label: "Certainty",
    detail: "Adds nothing: right only if that PSU was sure to be drawn. Otherwise errors come out too small.",
  },
  { value: "refuse", label: "Refuse", detail: "The release can't be published while there is one: join strata first." },
];
