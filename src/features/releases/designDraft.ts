import { DesignInput, type Design } from "../../../shared/contracts/design.ts";

/** A design as it stands in the form: every choice as the text of its field, null where nothing is chosen. */
export interface DesignDraft {
  weight: string | null;
  strata: string | null;
  psu: string | null;
  secondStage: string | null;
  psuLabelsAreUnique: boolean;
  populationSize: string | null;
  secondPopulationSize: string | null;
  lonely: Design["lonely"];
  variance: "strata" | "replicates";
  pattern: string;
  method: NonNullable<Design["replicates"]>["method"];
  fay: string;
  scale: string;
  replicateScales: string;
  mse: boolean;
  degreesOfFreedom: string;
  respondents: string;
  affected: string;
  unaffected: string;
}

const pair = (names: string | string[] | null) => (Array.isArray(names) ? names : [names]);
const textOf = (value: number | number[] | null) =>
  value === null ? "" : Array.isArray(value) ? value.join(" ") : String(value);

/** The form's start: the declared design, or the contract's own defaults. */
export function draftOf(design: Design | null): DesignDraft {
  const known = design ?? DesignInput.parse({});
  const [psu = null, secondStage = null] = pair(known.psu);
  const [populationSize = null, secondPopulationSize = null] = pair(known.populationSize);
  const { replicates, minimums } = known;
  return {
    weight: known.weight,
    strata: known.strata,
    psu,
    secondStage,
    psuLabelsAreUnique: known.psuLabelsAreUnique,
    populationSize,
    secondPopulationSize,
    lonely: known.lonely,
    variance: replicates ? "replicates" : "strata",
    pattern: replicates?.pattern ?? "",
    method: replicates?.method ?? "BRR",
    fay: textOf(replicates?.fay ?? null),
    scale: textOf(replicates?.scale ?? null),
    replicateScales: textOf(replicates?.replicateScales ?? null),
    mse: replicates?.mse ?? true,
    degreesOfFreedom: textOf(replicates?.degreesOfFreedom ?? null),
    respondents: String(minimums.respondents),
    affected: String(minimums.affected),
    unaffected: String(minimums.unaffected),
  };
}

const stages = (first: string | null, second: string | null) =>
  first === null ? null : second === null ? first : [first, second];
/** What doesn't read as a number goes on as it is, so that the contract names its field. */
const numberOf = (text: string): unknown => (text.trim() === "" ? null : Number(text));

function scalesOf(text: string): unknown {
  const parts = text.split(/[\s;]+/).filter((part) => part !== "");
  if (parts.length === 0) return null;
  return parts.length === 1 ? Number(parts[0]) : parts.map(Number);
}

/** What is wrong with a form, by field path as the API names it. */
export type FieldErrors = Record<string, string>;

/** The form as a design, or what keeps it from being one. */
export function designOf(draft: DesignDraft): { design: Design } | { errors: FieldErrors } {
  const parsed = DesignInput.safeParse({
    weight: draft.weight,
    strata: draft.strata,
    psu: stages(draft.psu, draft.secondStage),
    psuLabelsAreUnique: draft.psuLabelsAreUnique,
    populationSize: stages(draft.populationSize, draft.secondPopulationSize),
    lonely: draft.lonely,
    replicates:
      draft.variance === "strata"
        ? null
        : {
            pattern: draft.pattern,
            method: draft.method,
            fay: draft.method === "Fay" ? numberOf(draft.fay) : null,
            scale: numberOf(draft.scale),
            replicateScales: scalesOf(draft.replicateScales),
            mse: draft.mse,
            degreesOfFreedom: numberOf(draft.degreesOfFreedom),
          },
    minimums: {
      respondents: numberOf(draft.respondents),
      affected: numberOf(draft.affected),
      unaffected: numberOf(draft.unaffected),
    },
  });
  if (parsed.success) return { design: parsed.data };
  const errors: FieldErrors = {};
  for (const issue of parsed.error.issues)
    errors[issue.path.join(".")] ??= issue.path[0] === "minimums" ? "A whole number from 0 to 1,000." : issue.message;
  return { errors };
}
