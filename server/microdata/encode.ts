import { randomUUID } from "node:crypto";
import { numberOfCode, type CodebookEntry, type ImportedVariable, type Storage } from "./codebook.ts";
import { parseNumber } from "./numbers.ts";
import type { Place, ProblemLog } from "./problems.ts";
import { encodeCodes, encodeNumbers, encodeTexts, SEGMENT_ROWS, type Segment } from "./segments.ts";

const ABSENT = 0xffffffff;
const STORAGE = { categorical: "code", numeric: "number", text: "text" } as const;

/** Encodes one variable cell by cell into segments, and counts what is in it. */
export class ColumnEncoder {
  readonly id = randomUUID();
  readonly #entry: CodebookEntry;
  readonly #position: number;
  readonly #takesComma: boolean;
  readonly #distinctLimit: number;
  readonly #storage: Storage;
  readonly #problems: ProblemLog;
  readonly #positionOf = new Map<string, number>();
  readonly #categoryRows: number[];
  readonly #missingNumbers: Set<number>;
  readonly #distinct = new Set<string | number>();
  #codes: Uint32Array<ArrayBuffer> | null = null;
  #numbers: Float64Array<ArrayBuffer> | null = null;
  #texts: string[] = [];
  #filled = 0;
  #missingRows = 0;
  #isWhole = true;
  #minimum: number | null = null;
  #maximum: number | null = null;

  constructor(
    entry: CodebookEntry,
    position: number,
    options: { takesComma: boolean; distinctLimit: number; problems: ProblemLog },
  ) {
    this.#entry = entry;
    this.#position = position;
    this.#takesComma = options.takesComma;
    this.#distinctLimit = options.distinctLimit;
    this.#problems = options.problems;
    this.#storage = STORAGE[entry.kind];
    this.#categoryRows = entry.categories.map(() => 0);
    entry.categories.forEach(({ code }, i) => this.#positionOf.set(code, i));
    this.#missingNumbers = new Set(entry.categories.filter(({ isMissing }) => isMissing).map(({ code }) => numberOfCode(code)));
    if (this.#storage === "code") this.#codes = new Uint32Array(SEGMENT_ROWS);
    if (this.#storage === "number") this.#numbers = new Float64Array(SEGMENT_ROWS);
  }

  get name(): string {
    return this.#entry.name;
  }

  /** Takes the next row's cell. What can't be read is noted and counts as missing; the import won't be kept then. */
  add(cell: string, line: number): void {
    if (this.#codes) this.#codes[this.#filled] = this.#code(cell, line);
    else if (this.#numbers) this.#numbers[this.#filled] = this.#number(cell, line);
    else this.#texts.push(this.#text(cell));
    this.#filled += 1;
  }

  /** Whether a segment is complete. */
  get isFull(): boolean {
    return this.#filled === SEGMENT_ROWS;
  }

  /** The rows since the last segment as a segment; null where there are none. */
  take(): Segment | null {
    const rows = this.#filled;
    if (rows === 0) return null;
    this.#filled = 0;
    if (this.#codes) return encodeCodes(this.#codes.subarray(0, rows), this.#entry.categories.length);
    if (this.#numbers) return encodeNumbers(this.#numbers.subarray(0, rows));
    const texts = this.#texts;
    this.#texts = [];
    return encodeTexts(texts);
  }

  /** The variable with everything that was counted. */
  variable(): ImportedVariable {
    const { name, label, kind, categories } = this.#entry;
    return {
      id: this.id,
      position: this.#position,
      name,
      label,
      kind,
      storage: this.#storage,
      isWhole: this.#isWhole,
      minimum: this.#minimum,
      maximum: this.#maximum,
      categories: categories.map((category, position) => ({ ...category, position })),
      categoryRows: this.#categoryRows,
      missingRows: this.#missingRows,
      distinctValues: this.#distinct.size,
    };
  }

  #report(kind: string, message: string, place: Place): void {
    this.#problems.add({ kind, severity: "error", file: "microdata", message }, { ...place, column: this.name });
  }

  #count(value: string | number): void {
    if (this.#distinct.size < this.#distinctLimit) this.#distinct.add(value);
  }

  #see(number: number): void {
    if (!Number.isInteger(number)) this.#isWhole = false;
    if (this.#minimum === null || number < this.#minimum) this.#minimum = number;
    if (this.#maximum === null || number > this.#maximum) this.#maximum = number;
  }

  #code(cell: string, line: number): number {
    if (cell === "" || cell.trim() === "") {
      this.#missingRows += 1;
      return ABSENT;
    }
    const position = this.#positionOf.get(cell) ?? this.#likeCode(cell);
    if (position === undefined) {
      this.#report("unknown-code", "A code isn't in the codebook. Add it to the codebook's categories, or correct the file.", {
        line,
        value: cell,
      });
      return ABSENT;
    }
    this.#categoryRows[position]! += 1;
    this.#count(position);
    return position;
  }

  /** The category that a cell means although it is spelt otherwise: blanks around it, or the same number, such as 1.0 for 1. */
  #likeCode(cell: string): number | undefined {
    const text = cell.trim();
    const number = parseNumber(text, this.#takesComma);
    const position =
      this.#positionOf.get(text) ??
      (number === null ? undefined : this.#entry.categories.findIndex(({ code }) => numberOfCode(code) === number));
    if (position === undefined || position < 0) return undefined;
    this.#positionOf.set(cell, position);
    return position;
  }

  #number(cell: string, line: number): number {
    const number = parseNumber(cell, this.#takesComma);
    if (number !== null) {
      this.#count(number);
      if (this.#entry.categories.length > 0) this.#countNumberedCategory(number);
      if (!this.#missingNumbers.has(number)) this.#see(number);
      return number;
    }
    const text = cell.trim();
    const position = this.#positionOf.get(text);
    if (position !== undefined && this.#entry.categories[position]?.isMissing === true) {
      this.#categoryRows[position]! += 1;
      return Number.NaN;
    }
    if (text === "") this.#missingRows += 1;
    else
      this.#report(
        "not-a-number",
        "A numeric variable holds something that is no number. Correct it, or name it as a missing code in the codebook.",
        {
          line,
          value: cell,
        },
      );
    return Number.NaN;
  }

  #countNumberedCategory(number: number): void {
    const position = this.#entry.categories.findIndex(({ code }) => numberOfCode(code) === number);
    if (position >= 0) this.#categoryRows[position]! += 1;
  }

  #text(cell: string): string {
    const text = cell.trim();
    if (text === "") this.#missingRows += 1;
    else this.#count(text);
    return text;
  }
}
