import type { VariableView } from "../../../shared/contracts/codebook.ts";
import { Chooser } from "../../components/Chooser.tsx";
import { variableWords } from "./variableWords.ts";

export interface VariableFieldProps {
  label: string;
  variables: readonly VariableView[];
  value: string | null;
  onChange: (name: string | null) => void;
  description?: string;
  error?: string | undefined;
}

/** A variable to choose, each with what it holds. */
export function VariableField({ variables, ...props }: VariableFieldProps) {
  return (
    <Chooser
      {...props}
      placeholder="None"
      choices={variables.map((variable) => ({
        id: variable.name,
        label: variable.name,
        detail: [variable.label, variableWords(variable)].filter((part) => part !== "").join(": "),
      }))}
    />
  );
}
