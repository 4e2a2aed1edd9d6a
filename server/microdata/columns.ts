import { numberOfCode, type CodebookVariable, type Storage } from "./codebook.ts";
import { decodeNumbers, decodeTexts, missingOf, type Segment } from "./segments.ts";

/**
 * One variable's values. `code`: positions of categories, the array type's greatest value for missing. `number`: NaN for missing.
 * `text`: distinct texts numbered by first appearance, the greatest value for missing.
 */
export interface LoadedColumn {
  storage: Storage;
  values: Uint8Array | Uint16Array | Uint32Array | Float64Array;
  /** Of a `text` column, the text of each number; empty otherwise. */
  texts: string[];
}

/** What stands for a missing value in a column of codes or texts. */
export function missingCode(values: LoadedColumn["values"]): number {
  return values instanceof Float64Array ? Number.NaN : 2 ** (8 * values.BYTES_PER_ELEMENT) - 1;
}

const shared = (bytes: number) => new SharedArrayBuffer(bytes);

function codes(segments: readonly Segment[], rows: number): LoadedColumn["values"] {
  const widest = segments.some(({ encoding }) => encoding === "code-uint32")
    ? 4
    : segments.some(({ encoding }) => encoding === "code-uint16")
      ? 2
      : 1;
  const values =
    widest === 4
      ? new Uint32Array(shared(4 * rows))
      : widest === 2
        ? new Uint16Array(shared(2 * rows))
        : new Uint8Array(shared(rows));
  fill(segments, values, missingCode(values));
  return values;
}

function fill(segments: readonly Segment[], values: LoadedColumn["values"], missing: number): void {
  let row = 0;
  for (const segment of segments) {
    if (segment.encoding === "utf8") throw new Error("A column of numbers has a segment of text.");
    const part = decodeNumbers(segment);
    const partMissing = missingOf(segment.encoding);
    if (Number.isNaN(partMissing) || partMissing === missing) values.set(part, row);
    else for (let i = 0; i < part.length; i++) values[row + i] = part[i] === partMissing ? missing : part[i]!;
    row += part.length;
  }
}

function texts(segments: readonly Segment[], rows: number): LoadedColumn {
  const values = new Uint32Array(shared(4 * rows));
  const numbers = new Map<string, number>();
  let row = 0;
  for (const segment of segments) {
    for (const text of decodeTexts(segment)) {
      if (text !== "" && !numbers.has(text)) numbers.set(text, numbers.size);
      values[row++] = numbers.get(text) ?? 0xffffffff;
    }
  }
  return { storage: "text", values, texts: [...numbers.keys()] };
}

/** Puts the segments of a variable together, in file order, over shared memory. Checksums are verified. */
export function assembleColumn(storage: Storage, segments: readonly Segment[], rows: number): LoadedColumn {
  const total = segments.reduce((sum, { rowCount }) => sum + rowCount, 0);
  if (total !== rows) throw new Error(`A column holds ${total} values where the release has ${rows} respondents.`);
  if (storage === "text") return texts(segments, rows);
  if (storage === "code") return { storage, values: codes(segments, rows), texts: [] };
  const values = new Float64Array(shared(8 * rows));
  fill(segments, values, Number.NaN);
  return { storage, values, texts: [] };
}

/** The same column with its rows in another order: row i of the answer is row `order[i]`. */
export function permuteColumn(column: LoadedColumn, order: Uint32Array): LoadedColumn {
  const { values } = column;
  const buffer = shared(values.byteLength);
  const moved =
    values instanceof Float64Array
      ? new Float64Array(buffer)
      : values instanceof Uint8Array
        ? new Uint8Array(buffer)
        : values instanceof Uint16Array
          ? new Uint16Array(buffer)
          : new Uint32Array(buffer);
  for (let row = 0; row < order.length; row++) moved[row] = values[order[row]!]!;
  return { ...column, values: moved };
}

/** A column as numbers over shared memory: codes as the numbers they spell; NaN for missing codes, empty fields and words. */
export function asNumbers(column: LoadedColumn, variable: Pick<CodebookVariable, "categories">): Float64Array {
  const { values } = column;
  const numbers = new Float64Array(shared(8 * values.length));
  if (column.storage === "code") {
    const byPosition = new Map(
      variable.categories.map(({ position, code, isMissing }) => [position, isMissing ? Number.NaN : numberOfCode(code)]),
    );
    for (let row = 0; row < values.length; row++) numbers[row] = byPosition.get(values[row]!) ?? Number.NaN;
    return numbers;
  }
  if (column.storage === "text") {
    const byNumber = column.texts.map(numberOfCode);
    for (let row = 0; row < values.length; row++) numbers[row] = byNumber[values[row]!] ?? Number.NaN;
    return numbers;
  }
  const missing = new Set(variable.categories.filter(({ isMissing }) => isMissing).map(({ code }) => numberOfCode(code)));
  for (let row = 0; row < values.length; row++)
    numbers[row] = missing.size > 0 && missing.has(values[row]!) ? Number.NaN : values[row]!;
  return numbers;
}

const UNLABELLED = 0xffffffff;

/**
 * A column as labels of groups: each distinct value a number, in the order of the values, `UNLABELLED` where there is none.
 * @returns `labels` by row and how many there are.
 */
export function asLabels(
  column: LoadedColumn,
  variable: Pick<CodebookVariable, "categories">,
): { labels: Uint32Array; count: number } {
  const { values } = column;
  const missing = missingCode(values);
  const missingPositions = new Set(
    column.storage === "code" ? variable.categories.filter(({ isMissing }) => isMissing).map(({ position }) => position) : [],
  );
  const isAbsent = (value: number) => value === missing || Number.isNaN(value) || missingPositions.has(value);
  const distinct = [...new Set<number>(values)].filter((value) => !isAbsent(value));
  if (column.storage === "text")
    distinct.sort((a, b) => column.texts[a]!.localeCompare(column.texts[b]!, "en", { numeric: true }));
  else distinct.sort((a, b) => a - b);
  const labelOf = new Map(distinct.map((value, label) => [value, label]));
  return { labels: Uint32Array.from(values, (value) => labelOf.get(value) ?? UNLABELLED), count: distinct.length };
}

/** Whether a label says that the row has none. */
export const isUnlabelled = (label: number): boolean => label === UNLABELLED;
