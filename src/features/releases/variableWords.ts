import type { VariableView } from "../../../shared/contracts/codebook.ts";
import { formatCount, formatCounted, formatNumber, formatPercent, formatSignificant } from "../../../shared/format.ts";

const KIND_WORDS = { categorical: "categories", numeric: "numbers", text: "text" } as const;

/** What a variable holds, in a line: kind, range or categories, distinct values, missing share. */
export function variableWords(variable: VariableView): string {
  const named = variable.categories.filter(({ isMissing }) => !isMissing).length;
  const { minimum, maximum } = variable;
  const write = (value: number) => (variable.isWhole ? formatNumber(value) : formatSignificant(value, 4));
  const range = minimum === null || maximum === null ? "" : `${write(minimum)} to ${write(maximum)}`;
  const holds =
    variable.kind === "categorical"
      ? formatCounted(named, "category", "categories")
      : `${KIND_WORDS[variable.kind]}${range === "" ? "" : ` ${range}`}`;
  const missing = variable.missingShare === 0 ? "none missing" : `${formatPercent(variable.missingShare)} missing`;
  return `${holds}, ${formatCount(variable.distinct)} different, ${missing}`;
}
