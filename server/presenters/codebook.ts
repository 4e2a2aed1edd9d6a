import type { CodebookView, VariableView } from "../../shared/contracts/codebook.ts";
import { designVariables } from "../microdata/designData.ts";
import type { Release } from "../models/Release.ts";
import type { Variable } from "../models/Variable.ts";
import type { Reader } from "../policies/policy.ts";
import { releasePolicy, type SurveyAccess } from "../policies/survey.ts";

/** Share of respondents without a value: empty fields and missing codes. */
function missingShare(variable: Variable, respondents: number): number {
  const coded = (variable.categories ?? [])
    .filter(({ isMissing }) => isMissing)
    .reduce((sum, category) => sum + category.respondents, 0);
  return respondents === 0 ? 0 : (variable.missingRows + coded) / respondents;
}

/** A variable; unweighted counts and extremes are for stewards, since they may single a respondent out. */
export function presentVariable(variable: Variable, release: Release, isSteward: boolean): VariableView {
  return {
    id: variable.id,
    name: variable.name,
    label: variable.label,
    kind: variable.kind,
    categories: (variable.categories ?? []).map(({ code, label, isMissing, respondents }) => ({
      code,
      label,
      isMissing,
      respondents: isSteward ? respondents : null,
    })),
    missingShare: missingShare(variable, release.respondents),
    minimum: isSteward ? variable.minimum : null,
    maximum: isSteward ? variable.maximum : null,
    isWhole: variable.isWhole,
    distinct: variable.distinctValues,
  };
}

/** A release's codebook as the reader may see it. */
export function presentCodebook(
  release: Release,
  variables: readonly Variable[],
  access: SurveyAccess,
  reader: Reader,
): CodebookView {
  const isSteward = releasePolicy.updateCodebook(reader, access);
  const names = variables.map(({ name }) => name);
  return {
    releaseId: release.id,
    respondents: release.respondents,
    designVariables: release.design ? designVariables(release.design, names) : [],
    variables: variables.map((variable) => presentVariable(variable, release, isSteward)),
    can: { update: isSteward && release.status === "draft" },
  };
}
