import type { VariableView } from "../../../shared/contracts/codebook.ts";
import { Checkbox } from "../../components/Checkbox.tsx";
import { RadioChoices } from "../../components/RadioChoices.tsx";
import type { DesignDraft, FieldErrors } from "./designDraft.ts";
import type { ChangeDraft } from "./DesignTab.tsx";
import { LONELY_RULES } from "./lonelyRules.ts";
import { VariableField } from "./VariableField.tsx";

/** Strata, PSUs and population sizes. */
export function SampleFields({
  draft,
  change,
  errors,
  variables,
}: {
  draft: DesignDraft;
  change: ChangeDraft;
  errors: FieldErrors;
  variables: readonly VariableView[];
}) {
  const numbers = variables.filter(({ kind }) => kind !== "text");
  const hasPsu = draft.psu !== null;
  return (
    <>
      <VariableField
        label="Stratum"
        variables={variables}
        value={draft.strata}
        onChange={(strata) => change({ strata })}
        error={errors.strata}
        description="The parts of the population that were sampled by themselves."
      />
      <VariableField
        label="PSU"
        variables={variables}
        value={draft.psu}
        onChange={(psu) => change({ psu, secondStage: psu === null ? null : draft.secondStage })}
        error={errors.psu ?? errors["psu.0"]}
        description="What was drawn first, such as villages or town blocks. Empty: each respondent was drawn by themselves."
      />
      {hasPsu && (
        <Checkbox isSelected={draft.psuLabelsAreUnique} onChange={(psuLabelsAreUnique) => change({ psuLabelsAreUnique })}>
          PSU labels are unique in the whole file
          <span className="block text-sm text-muted">
            Then the same label in two strata is a fault. Otherwise it means two PSUs.
          </span>
        </Checkbox>
      )}
      <RadioChoices
        label="A stratum with a single PSU"
        choices={LONELY_RULES}
        value={draft.lonely}
        onChange={(lonely) => change({ lonely })}
      />
      <details className="group">
        <summary className="link cursor-pointer">Second stage and population sizes</summary>
        <div className="mt-4 space-y-6">
          <VariableField
            label="Population size of the stratum"
            variables={numbers}
            value={draft.populationSize}
            onChange={(populationSize) => change({ populationSize })}
            error={errors.populationSize ?? errors["populationSize.0"]}
            description="How many PSUs there were to draw from. Makes errors smaller when a good part of them was drawn."
          />
          {hasPsu && (
            <>
              <VariableField
                label="Second-stage unit"
                variables={variables}
                value={draft.secondStage}
                onChange={(secondStage) => change({ secondStage })}
                error={errors["psu.1"]}
                description="What was drawn within a PSU, such as households."
              />
              <VariableField
                label="Population size of the PSU"
                variables={numbers}
                value={draft.secondPopulationSize}
                onChange={(secondPopulationSize) => change({ secondPopulationSize })}
                error={errors["populationSize.1"]}
                description="How many second-stage units the PSU has; used together with the stratum's size."
              />
            </>
          )}
        </div>
      </details>
    </>
  );
}
