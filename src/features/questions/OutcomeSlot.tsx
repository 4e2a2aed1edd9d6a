import { ChevronLeft } from "lucide-react";
import { useState } from "react";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Outcome } from "../../../shared/contracts/questions.ts";
import { outcomeWords } from "../../../shared/wording.ts";
import { Button } from "../../components/Button.tsx";
import { RadioChoices } from "../../components/RadioChoices.tsx";
import { Select } from "../../components/Select.tsx";
import { ConditionEditor, type Condition } from "./ConditionEditor.tsx";
import { SearchList } from "./SearchList.tsx";
import { Slot } from "./Slot.tsx";
import { variableChoice } from "./variables.ts";

/** The variable an outcome is about, where it is about one. */
function outcomeVariable(outcome: Outcome | null): string | null {
  if (!outcome) return null;
  if ("variable" in outcome) return outcome.variable;
  return "variable" in outcome.rule ? outcome.rule.variable : null;
}

const conditionOf = (outcome: Outcome | null, variable: string): Condition | null =>
  outcome && "rule" in outcome && "variable" in outcome.rule && outcome.rule.variable === variable ? outcome.rule : null;

/** Shared by choosers that go from a list of variables to one of them. */
export function BackToVariables({ variable, onBack }: { variable: VariableView; onBack: () => void }) {
  return (
    <div className="flex flex-wrap items-center gap-x-2 px-4 pb-3">
      <Button kind="plain" onPress={onBack} autoFocus>
        <ChevronLeft aria-hidden="true" className="size-4" />
        Variables
      </Button>
      <span className="font-medium">{variable.label || variable.name}</span>
    </div>
  );
}

interface EditorProps {
  variable: VariableView;
  outcome: Outcome | null;
  onUse: (outcome: Outcome) => void;
}

const QUANTILES = [
  { id: "0.1", label: "10th percentile" },
  { id: "0.25", label: "Lower quartile" },
  { id: "0.5", label: "Median" },
  { id: "0.75", label: "Upper quartile" },
  { id: "0.9", label: "90th percentile" },
];

function OutcomeEditor({ variable, outcome, onUse }: EditorProps) {
  const condition = conditionOf(outcome, variable.name);
  const quantile = outcome && "variable" in outcome && outcome.variable === variable.name ? outcome.quantile : undefined;
  const [as, setAs] = useState<"mean" | "quantile" | "share">(condition ? "share" : quantile === undefined ? "mean" : "quantile");
  const [at, setAt] = useState(String(quantile ?? 0.5));
  const editor = (
    <ConditionEditor
      variable={variable}
      condition={condition}
      label={variable.kind === "numeric" ? "Affected are those with a value in this range." : "Affected are those who answered"}
      action="Count these"
      onUse={(rule) => onUse({ rule })}
    />
  );
  if (variable.kind !== "numeric") return editor;
  return (
    <>
      <div className="px-4 pb-4">
        <RadioChoices
          label="What to work out"
          choices={[
            { value: "mean", label: "Its mean", detail: "The average in the variable's own units." },
            {
              value: "quantile",
              label: "Its median or another quantile",
              detail: "The value that half of the people, say, lie below; not moved by a few extreme ones.",
            },
            { value: "share", label: "How many are in a range", detail: "Of every 100, such as those at 13 or above." },
          ]}
          value={as}
          onChange={setAs}
        />
      </div>
      {as === "share" && editor}
      {as === "quantile" && (
        <div className="space-y-4 px-4 pb-4">
          <Select label="Quantile" choices={QUANTILES} value={at} onChange={setAt} />
          <Button kind="primary" onPress={() => onUse({ variable: variable.name, quantile: Number(at) })}>
            Take the quantile
          </Button>
        </div>
      )}
      {as === "mean" && (
        <div className="px-4 pb-4">
          <Button kind="primary" onPress={() => onUse({ variable: variable.name })}>
            Take the mean
          </Button>
        </div>
      )}
    </>
  );
}

function OutcomeChooser({ variables, outcome, onUse }: { variables: readonly VariableView[] } & Omit<EditorProps, "variable">) {
  const [name, setName] = useState(outcomeVariable(outcome));
  const variable = variables.find((variable) => variable.name === name);
  if (!variable) return <SearchList label="Variables" choices={variables.map(variableChoice)} onChoose={setName} />;
  return (
    <>
      <BackToVariables variable={variable} onBack={() => setName(null)} />
      <OutcomeEditor key={variable.name} variable={variable} outcome={outcome} onUse={onUse} />
    </>
  );
}

/** Who counts as affected, or what is averaged. */
export function OutcomeSlot({
  variables,
  outcome,
  onChange,
}: {
  variables: readonly VariableView[];
  outcome: Outcome | null;
  onChange: (outcome: Outcome) => void;
}) {
  return (
    <Slot
      title="Who counts as affected?"
      value={outcome ? outcomeWords(outcome, variables) : "choose an outcome"}
      isEmpty={!outcome}
    >
      {(close) => (
        <OutcomeChooser
          variables={variables}
          outcome={outcome}
          onUse={(chosen) => {
            onChange(chosen);
            close();
          }}
        />
      )}
    </Slot>
  );
}
