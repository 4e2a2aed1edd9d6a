import { createReadStream } from "node:fs";
import { open } from "node:fs/promises";
import type { ImportProblem, ProblemLog } from "./problems.ts";

const CHUNK_BYTES = 1 << 20;

/** What the first bytes give away about files that are no CSV. */
const FOREIGN: { bytes: number[]; message: string }[] = [
  {
    bytes: [0x50, 0x4b, 0x03, 0x04],
    message: "This is a zip archive (or a spreadsheet). Unpack it, or save the sheet as CSV, and choose the CSV file.",
  },
  { bytes: [0x1f, 0x8b], message: "This file is compressed with gzip. Unpack it and choose the CSV file." },
  { bytes: [0xff, 0xfe], message: "This file is UTF-16. Save it as UTF-8 and choose it again." },
  { bytes: [0xfe, 0xff], message: "This file is UTF-16. Save it as UTF-8 and choose it again." },
  { bytes: [0x25, 0x50, 0x44, 0x46], message: "This is a PDF. Choose the CSV file." },
  {
    bytes: [0xd0, 0xcf, 0x11, 0xe0],
    message: "This is an old spreadsheet file. Save the sheet as CSV in UTF-8 and choose that.",
  },
];

async function refuseForeign(path: string, file: ImportProblem["file"], problems: ProblemLog): Promise<void> {
  const handle = await open(path);
  try {
    const { buffer, bytesRead } = await handle.read(Buffer.alloc(8), 0, 8, 0);
    if (bytesRead === 0)
      problems.stop({ kind: "empty-file", file, message: "The file is empty. Choose one with a header line and rows." });
    const foreign = FOREIGN.find(({ bytes }) => bytes.every((byte, i) => buffer[i] === byte));
    if (foreign) problems.stop({ kind: "not-csv", file, message: foreign.message }, { line: 1 });
  } finally {
    await handle.close();
  }
}

const countLines = (text: string) => {
  let lines = 0;
  for (let at = text.indexOf("\n"); at >= 0; at = text.indexOf("\n", at + 1)) lines += 1;
  return lines;
};

/** Line in which the bytes stop being UTF-8. */
function badLine(bytes: Uint8Array, linesBefore: number): number {
  const text = new TextDecoder("utf-8").decode(bytes);
  return linesBefore + countLines(text.slice(0, Math.max(0, text.indexOf("\uFFFD")))) + 1;
}

/**
 * Text of a file in pieces of about a million characters, strictly UTF-8, a byte order mark left out, every line break as "\n".
 * @throws {UnreadableFile} with the reason and the line in `problems`: empty, another kind of file, another encoding, NUL bytes.
 */
export async function* readText(
  path: string,
  file: ImportProblem["file"],
  problems: ProblemLog,
  options: { signal: AbortSignal; onBytes?: (bytes: number) => void },
): AsyncGenerator<string> {
  await refuseForeign(path, file, problems);
  const decoder = new TextDecoder("utf-8", { fatal: true });
  let lines = 0;
  let endsInReturn = false;
  const decode = (bytes: Uint8Array | null) => {
    try {
      return bytes ? decoder.decode(bytes, { stream: true }) : decoder.decode();
    } catch {
      const message = "The file isn't UTF-8 (perhaps Windows-1252 or another encoding). Save it as UTF-8 and choose it again.";
      return problems.stop({ kind: "not-utf8", file, message }, { line: bytes ? badLine(bytes, lines) : lines + 1 });
    }
  };
  const clean = (raw: string) => {
    // A return at the end of a piece may be the first half of a break.
    const text = endsInReturn && raw.startsWith("\n") ? raw.slice(1) : raw;
    if (raw !== "") endsInReturn = raw.endsWith("\r");
    const broken = text.includes("\r") ? text.replace(/\r\n?/g, "\n") : text;
    const nul = broken.indexOf("\0");
    if (nul >= 0) {
      const message = "There is a NUL byte in the file: it is no plain text, or it was damaged. Export it again as CSV in UTF-8.";
      problems.stop({ kind: "nul-byte", file, message }, { line: lines + countLines(broken.slice(0, nul)) + 1 });
    }
    lines += countLines(broken);
    return broken;
  };
  for await (const chunk of createReadStream(path, {
    highWaterMark: CHUNK_BYTES,
    signal: options.signal,
  }) as AsyncIterable<Buffer>) {
    const text = clean(decode(chunk));
    options.onBytes?.(chunk.length);
    if (text !== "") yield text;
  }
  const rest = clean(decode(null));
  if (rest !== "") yield rest;
}
