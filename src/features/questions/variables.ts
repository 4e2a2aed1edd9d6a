import type { CodebookView, VariableView } from "../../../shared/contracts/codebook.ts";
import { formatPercent } from "../../../shared/format.ts";
import type { Choice } from "../../components/Chooser.tsx";

/** The variables that a question may name: those that can be tabulated, without those that only describe the design. */
export const askable = (codebook: CodebookView): VariableView[] =>
  codebook.variables.filter(({ kind, name }) => kind !== "text" && !codebook.designVariables.includes(name));

const missingWords = (share: number) => (share === 0 ? "none missing" : `${formatPercent(share)} missing`);

/** A variable as choosers show it: label, then name, kind and missing share. */
export const variableChoice = ({ name, label, kind, missingShare }: VariableView): Choice => ({
  id: name,
  label: label || name,
  detail: `${label ? `${name} · ` : ""}${kind === "numeric" ? "number · " : ""}${missingWords(missingShare)}`,
});

/** Categories that stand for an answer. */
export const answers = (variable: VariableView) => variable.categories.filter(({ isMissing }) => !isMissing);
