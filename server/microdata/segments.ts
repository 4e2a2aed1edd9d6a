import { createHash } from "node:crypto";
import { Field, makeVector, Schema, Table, tableFromIPC, tableToIPC, Utf8, vectorFromArray, type Vector } from "apache-arrow";

/** Respondents in one segment. */
export const SEGMENT_ROWS = 65_536;

/**
 * How a segment holds its values. `code-…`: positions of categories, the type's greatest value standing for missing.
 * `int…`: whole numbers, the type's least value standing for missing; `float64`: numbers, NaN standing for missing.
 */
export type Encoding = "code-uint8" | "code-uint16" | "code-uint32" | "int8" | "int16" | "int32" | "float64" | "utf8";

/** A part of a column as it is kept: an Apache Arrow IPC stream of one column named `value`. */
export interface Segment {
  encoding: Encoding;
  rowCount: number;
  bytes: Uint8Array;
  /** SHA-256 of `bytes`, hexadecimal. */
  checksum: string;
}

/** Takes the segments of an import as they are made, each variable's in order. */
export interface SegmentSink {
  put(variableId: string, number: number, segment: Segment): Promise<void>;
}

type Numbers = Uint8Array | Uint16Array | Uint32Array | Int8Array | Int16Array | Int32Array | Float64Array;

const MISSING: Record<Exclude<Encoding, "utf8">, number> = {
  "code-uint8": 0xff,
  "code-uint16": 0xffff,
  "code-uint32": 0xffffffff,
  int8: -0x80,
  int16: -0x8000,
  int32: -0x80000000,
  float64: Number.NaN,
};

/** What stands for a missing value in a segment of numbers or codes. */
export const missingOf = (encoding: Exclude<Encoding, "utf8">): number => MISSING[encoding];

export const sha256 = (bytes: Uint8Array | string): string => createHash("sha256").update(bytes).digest("hex");

function seal(encoding: Encoding, rowCount: number, vector: Vector): Segment {
  const metadata = new Map(encoding === "utf8" ? [] : [["missing", String(MISSING[encoding])]]);
  const schema = new Schema([new Field("value", vector.type, false, metadata)]);
  const bytes = tableToIPC(new Table(schema, { value: vector }), "stream");
  return { encoding, rowCount, bytes, checksum: sha256(bytes) };
}

/** The narrowest type for positions of so many categories, its greatest value kept free for missing. */
export function codeEncoding(categories: number): "code-uint8" | "code-uint16" | "code-uint32" {
  if (categories <= 0xff) return "code-uint8";
  return categories <= 0xffff ? "code-uint16" : "code-uint32";
}

/** @param positions Category positions, 0xffffffff for missing. @param categories How many there are. */
export function encodeCodes(positions: Uint32Array, categories: number): Segment {
  const encoding = codeEncoding(categories);
  const values =
    encoding === "code-uint8"
      ? new Uint8Array(positions.length)
      : encoding === "code-uint16"
        ? new Uint16Array(positions.length)
        : new Uint32Array(positions.length);
  // Storing 0xffffffff in a narrower type leaves all its bits set: the type's own sign for missing.
  values.set(positions);
  return seal(encoding, positions.length, makeVector(values));
}

function wholeEncoding(values: Float64Array): "int8" | "int16" | "int32" | null {
  let low = 0;
  let high = 0;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    if (!Number.isInteger(value) || Object.is(value, -0)) return null;
    if (value < low) low = value;
    else if (value > high) high = value;
  }
  if (low > -0x80 && high <= 0x7f) return "int8";
  if (low > -0x8000 && high <= 0x7fff) return "int16";
  return low > -0x80000000 && high <= 0x7fffffff ? "int32" : null;
}

/** @param values NaN for missing. Kept exactly, in the narrowest type that can. */
export function encodeNumbers(values: Float64Array): Segment {
  const encoding = wholeEncoding(values);
  if (encoding === null) return seal("float64", values.length, makeVector(values.slice()));
  const missing = MISSING[encoding];
  const narrow =
    encoding === "int8"
      ? new Int8Array(values.length)
      : encoding === "int16"
        ? new Int16Array(values.length)
        : new Int32Array(values.length);
  for (let row = 0; row < values.length; row++) narrow[row] = Number.isNaN(values[row]!) ? missing : values[row]!;
  return seal(encoding, values.length, makeVector(narrow));
}

/** @param values Empty for missing. */
export function encodeTexts(values: readonly string[]): Segment {
  return seal("utf8", values.length, vectorFromArray(values, new Utf8()));
}

const ARRAYS: Record<Exclude<Encoding, "utf8">, new () => Numbers> = {
  "code-uint8": Uint8Array,
  "code-uint16": Uint16Array,
  "code-uint32": Uint32Array,
  int8: Int8Array,
  int16: Int16Array,
  int32: Int32Array,
  float64: Float64Array,
};

const holds = <Values extends Numbers>(values: unknown, type: new () => Values): values is Values => values instanceof type;

function open(segment: Segment): Vector {
  if (sha256(segment.bytes) !== segment.checksum)
    throw new Error("A segment of microdata isn't what was stored: its checksum differs. Restore the database from a backup.");
  // Arrow reads in place and wants its start on a multiple of eight; a driver's buffers may begin anywhere.
  const vector = tableFromIPC(Uint8Array.from(segment.bytes)).getChild("value");
  if (!vector || vector.length !== segment.rowCount) throw new Error("A segment of microdata doesn't hold the rows it should.");
  return vector;
}

/** Values of a segment of numbers or codes. @throws {Error} when its checksum or type isn't what was stored. */
export function decodeNumbers(segment: Segment): Numbers {
  const values: unknown = open(segment).toArray();
  if (segment.encoding === "utf8" || !holds(values, ARRAYS[segment.encoding]))
    throw new Error("A segment of microdata has another type than was stored.");
  return values;
}

/** Values of a segment of text; empty for missing. */
export function decodeTexts(segment: Segment): string[] {
  return Array.from(open(segment) as Iterable<string>);
}
