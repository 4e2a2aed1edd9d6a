import type { VariableKind } from "../../shared/contracts/codebook.ts";

/** What a column holds: positions of categories, numbers, or text. */
export type Storage = "code" | "number" | "text";

/** A variable of a release as questions and designs see it. */
export interface CodebookVariable {
  id: string;
  name: string;
  label: string;
  kind: VariableKind;
  storage: Storage;
  isWhole: boolean;
  /** Least and greatest number, missing codes left out; null where there is none. */
  minimum: number | null;
  maximum: number | null;
  categories: { position: number; code: string; label: string; isMissing: boolean }[];
}

/** What an import counted of a variable, beside what the codebook says of it. */
export interface ImportedVariable extends CodebookVariable {
  position: number;
  /** Rows with an empty field. */
  missingRows: number;
  /** Distinct values, counted up to a limit. */
  distinctValues: number;
  /** Respondents with each category's code, by index of `categories`. */
  categoryRows: number[];
}

/** A variable as a codebook file describes it. */
export interface CodebookEntry {
  name: string;
  label: string;
  kind: VariableKind;
  categories: { code: string; label: string; isMissing: boolean }[];
}

/** Number that a code spells; NaN where it spells none. */
export const numberOfCode = (code: string): number => (code.trim() === "" ? Number.NaN : Number(code));
