import { useState } from "react";
import type { VariableView } from "../../../shared/contracts/codebook.ts";
import type { Rule } from "../../../shared/rules.ts";
import { Button } from "../../components/Button.tsx";
import { CheckboxGroup } from "../../components/Checkbox.tsx";
import { TextField } from "../../components/TextField.tsx";
import { answers } from "./variables.ts";

export type Condition = Extract<Rule, { variable: string }>;

export interface ConditionEditorProps {
  variable: VariableView;
  /** What it was; starts empty without one. */
  condition: Condition | null;
  /** Heading of the choice: what it means to be ticked or in the range. */
  label: string;
  action: string;
  onUse: (condition: Condition) => void;
}

const readEnd = (text: string): number | null | undefined => {
  const plain = text.trim().replace("−", "-").replace(",", ".");
  if (plain === "") return null;
  const value = Number(plain);
  return Number.isFinite(value) ? value : undefined;
};

/** A range of a number, both ends in; one end may stay open. */
function RangeEditor({ variable, condition, label, action, onUse }: ConditionEditorProps) {
  const [start, end] = condition && "between" in condition ? condition.between : [null, null];
  const [from, setFrom] = useState(start === null ? "" : String(start));
  const [to, setTo] = useState(end === null ? "" : String(end));
  const [problem, setProblem] = useState<string>();
  const use = () => {
    const [low, high] = [readEnd(from), readEnd(to)];
    if (low === undefined || high === undefined) setProblem("Write plain numbers, such as 18 or 7.5.");
    else if (low === null && high === null) setProblem("Give at least one end.");
    else if (low !== null && high !== null && low > high) setProblem("The low end is above the high end.");
    else onUse({ variable: variable.name, between: [low, high] });
  };
  return (
    <form
      className="space-y-4 px-4 pb-4"
      onSubmit={(event) => {
        event.preventDefault();
        use();
      }}
    >
      <p className="text-sm text-muted">{label}</p>
      <div className="grid grid-cols-2 gap-3">
        <TextField label="From" inputMode="decimal" value={from} onChange={setFrom} autoFocus error={problem} />
        <TextField label="To" inputMode="decimal" value={to} onChange={setTo} />
      </div>
      <p className="text-sm text-muted">Both ends are in. Leave one empty for no limit.</p>
      <Button kind="primary" type="submit">
        {action}
      </Button>
    </form>
  );
}

/** Which answers of a categorical variable are meant. */
function CodesEditor({ variable, condition, label, action, onUse }: ConditionEditorProps) {
  const [codes, setCodes] = useState<string[]>(condition && "in" in condition ? condition.in : []);
  const [problem, setProblem] = useState<string>();
  const choices = answers(variable).map(({ code, label }) => ({ value: code, label: label || code }));
  const use = () => {
    if (codes.length === 0) setProblem("Tick at least one answer.");
    else onUse({ variable: variable.name, in: codes });
  };
  return (
    <form
      className="space-y-4 px-4 pb-4"
      onSubmit={(event) => {
        event.preventDefault();
        use();
      }}
    >
      <CheckboxGroup label={label} choices={choices} value={codes} onChange={setCodes} error={problem} />
      <Button kind="primary" type="submit">
        {action}
      </Button>
    </form>
  );
}

/** One condition on one variable: answers to tick, or a range. */
export function ConditionEditor(props: ConditionEditorProps) {
  return props.variable.kind === "numeric" ? <RangeEditor {...props} /> : <CodesEditor {...props} />;
}
