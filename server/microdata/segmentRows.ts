import { ColumnSegment } from "../models/Column.ts";
import type { Encoding, Segment } from "./segments.ts";

/** Segments of one variable in order. */
export async function readSegments(variableId: string): Promise<Segment[]> {
  const rows = await ColumnSegment.findAll({ where: { variableId }, order: [["segment", "ASC"]], raw: true });
  // The encoding is what this product wrote; decoding checks it against the bytes.
  return rows.map(({ encoding, rowCount, bytes, checksum }) => ({ encoding: encoding as Encoding, rowCount, bytes, checksum }));
}
