import type { CodebookEntry } from "./codebook.ts";
import { parseNumber } from "./numbers.ts";

/** Words that stand for "no answer" in files that other programs wrote. */
const MISSING_WORDS = new Set(["NA", "N/A", "NAN", "NULL", "NONE", ".", "-", "#N/A", "MISSING"]);
const WHOLE_CATEGORIES = 20;
const WORD_CATEGORIES = 200;
const WORD_LENGTH = 100;

/** Codes in the order a reader expects: numbers by value, then words. */
const BY_CODE = new Intl.Collator("en", { numeric: true });

/** Gathers what is in one column, in order to guess its kind. Distinct values are kept up to `limit`. */
export class ColumnGuess {
  readonly #values = new Map<string, number>();
  readonly #limit: number;
  readonly #takesComma: boolean;
  #isOverLimit = false;
  #filled = 0;
  #words = 0;
  #isWhole = true;
  #longest = 0;
  readonly #missingWords = new Set<string>();

  constructor(limit: number, takesComma: boolean) {
    this.#limit = limit;
    this.#takesComma = takesComma;
  }

  add(cell: string): void {
    const text = cell.trim();
    if (text === "") return;
    this.#filled += 1;
    const known = this.#values.get(text);
    if (known !== undefined) {
      this.#values.set(text, known + 1);
      if (known > 0 && !this.#isOverLimit) return;
    } else if (this.#values.size < this.#limit) this.#values.set(text, 1);
    else this.#isOverLimit = true;
    this.#longest = Math.max(this.#longest, text.length);
    const number = parseNumber(text, this.#takesComma);
    if (number !== null) this.#isWhole &&= Number.isInteger(number);
    else if (MISSING_WORDS.has(text.toUpperCase())) this.#missingWords.add(text);
    else this.#words += 1;
  }

  /** The most likely description of the column. Every value seen is in it where it comes out as categorical. */
  entry(name: string): CodebookEntry {
    const missing = [...this.#missingWords].sort().map((code) => ({ code, label: "", isMissing: true }));
    const isMissing = (code: string) => this.#missingWords.has(code);
    const codes = [...this.#values.keys()].filter((code) => !isMissing(code));
    const categorical = (): CodebookEntry => ({
      name,
      label: "",
      kind: "categorical",
      categories: [...codes.sort(BY_CODE.compare).map((code) => ({ code, label: "", isMissing: false })), ...missing],
    });
    if (this.#words === 0) {
      const isCodeList = this.#isWhole && !this.#isOverLimit && codes.length <= WHOLE_CATEGORIES;
      if (isCodeList && codes.length > 0 && new Set(codes.map(Number)).size === codes.length) return categorical();
      return { name, label: "", kind: "numeric", categories: missing };
    }
    const isRepeated = this.#filled >= 2 * codes.length || this.#filled < 20;
    const isShort = !this.#isOverLimit && codes.length <= WORD_CATEGORIES && this.#longest <= WORD_LENGTH;
    return isShort && isRepeated ? categorical() : { name, label: "", kind: "text", categories: [] };
  }

  get missingWords(): readonly string[] {
    return [...this.#missingWords];
  }
}
