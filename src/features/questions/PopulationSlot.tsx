import { X } from "lucide-react";
import { useState } from "react";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Rule } from "../../../shared/rules.ts";
import { populationWords, ruleWords } from "../../../shared/wording.ts";
import { Button } from "../../components/Button.tsx";
import { ConditionEditor } from "./ConditionEditor.tsx";
import { BackToVariables } from "./OutcomeSlot.tsx";
import { SearchList } from "./SearchList.tsx";
import { Slot } from "./Slot.tsx";
import { variableChoice } from "./variables.ts";

/** The conditions that all have to hold. A rule of another shape, from an address, is one of them. */
const conditionsOf = (among: Rule | undefined): Rule[] => (!among ? [] : "all" in among ? among.all : [among]);

function rulesTogether(conditions: readonly Rule[]): Rule | undefined {
  const [only] = conditions;
  return conditions.length > 1 ? { all: [...conditions] } : only;
}

interface PopulationProps {
  variables: readonly VariableView[];
  among: Rule | undefined;
  onChange: (among: Rule | undefined) => void;
}

function PopulationChooser({ variables, among, onChange, onDone }: PopulationProps & { onDone: () => void }) {
  const conditions = conditionsOf(among);
  const [isAdding, setIsAdding] = useState(conditions.length === 0);
  const [name, setName] = useState<string | null>(null);
  const variable = variables.find((variable) => variable.name === name);
  if (variable) {
    const index = conditions.findIndex((rule) => "variable" in rule && rule.variable === variable.name);
    const condition = conditions[index];
    return (
      <>
        <BackToVariables variable={variable} onBack={() => setName(null)} />
        <ConditionEditor
          key={variable.name}
          variable={variable}
          condition={condition && "variable" in condition ? condition : null}
          label={variable.kind === "numeric" ? "Only people with a value in this range." : "Only people who answered"}
          action="Ask about these"
          onUse={(rule) => {
            onChange(rulesTogether(index < 0 ? [...conditions, rule] : conditions.with(index, rule)));
            onDone();
          }}
        />
      </>
    );
  }
  if (isAdding)
    return (
      <>
        <p className="px-4 pb-2 text-sm text-muted">
          Everyone is in until a condition is set. Everyone outside stays part of the design.
        </p>
        <SearchList label="Variables" choices={variables.map(variableChoice)} onChoose={setName} />
      </>
    );
  return (
    <div className="space-y-4 px-4 pb-4">
      <ul className="border-t border-line">
        {conditions.map((rule, index) => {
          const words = ruleWords(rule, variables);
          return (
            <li key={words} className="flex items-center justify-between gap-3 border-b border-line py-1.5">
              <span>{words}</span>
              <span className="flex items-center">
                {"variable" in rule && (
                  <Button kind="plain" aria-label={`Change ${words}`} onPress={() => setName(rule.variable)}>
                    Change
                  </Button>
                )}
                <Button
                  kind="plain"
                  aria-label={`Remove ${words}`}
                  onPress={() => onChange(rulesTogether(conditions.toSpliced(index, 1)))}
                >
                  <X aria-hidden="true" className="size-4" />
                </Button>
              </span>
            </li>
          );
        })}
        {conditions.length === 0 && <li className="border-b border-line py-2 text-muted">No condition: everyone.</li>}
      </ul>
      <div className="flex flex-wrap gap-3">
        <Button onPress={() => setIsAdding(true)}>Add a condition</Button>
        {conditions.length > 0 && (
          <Button
            onPress={() => {
              onChange(undefined);
              onDone();
            }}
          >
            Ask about everyone
          </Button>
        )}
      </div>
    </div>
  );
}

/** Whom the question is about: several conditions that all have to hold. */
export function PopulationSlot(props: PopulationProps) {
  return (
    <Slot title="Of whom?" value={populationWords(props.among, props.variables)}>
      {(close) => <PopulationChooser {...props} onDone={close} />}
    </Slot>
  );
}
