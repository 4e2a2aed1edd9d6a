import { randomUUID } from "node:crypto";
import { createWriteStream } from "node:fs";
import { rm } from "node:fs/promises";
import path from "node:path";
import { Transform } from "node:stream";
import { pipeline } from "node:stream/promises";
import busboy from "busboy";
import type { Request } from "express";
import { AppError } from "../errors.ts";

const FILE_LIMIT = 2 * 2 ** 30;
const FILES = ["microdata", "codebook"] as const;
type FileField = (typeof FILES)[number];

/** What arrived: the text fields, and each file's place on disk. */
export interface Upload {
  fields: Record<string, string>;
  files: Partial<Record<FileField, string>>;
  /** Removes the files. */
  discard(): Promise<void>;
}

const isFileField = (name: string): name is FileField => FILES.some((known) => known === name);

function meter(): Transform {
  let bytes = 0;
  return new Transform({
    transform(chunk: Buffer, _encoding, done) {
      bytes += chunk.length;
      if (bytes > FILE_LIMIT)
        done(new AppError("tooLarge", "A file is larger than 2 GB. Nothing was kept; split the release or leave variables out."));
      else done(null, chunk);
    },
  });
}

/**
 * Streams a multipart request's files to `folder`, never to memory.
 * @throws {AppError} when it isn't multipart, holds an unknown or a second file, a file is too large, or the connection was lost; nothing stays then.
 */
export async function receiveUpload(request: Request, folder: string): Promise<Upload> {
  const fields: Record<string, string> = {};
  const files: Upload["files"] = {};
  const arriving = new Set<string>();
  const discard = async () => {
    for (const file of [...Object.values(files), ...arriving]) await rm(file, { force: true });
  };
  let parser: busboy.Busboy;
  try {
    parser = busboy({ headers: request.headers, defParamCharset: "utf8", limits: { fieldSize: 10_000, fields: 20, files: 3 } });
  } catch {
    throw new AppError("unsupported", "Send the files as multipart/form-data with the fields wave, microdata and codebook.");
  }
  const writes: Promise<void>[] = [];
  let failure: Error | null = null;
  parser.on("field", (name, value) => (fields[name] = value));
  parser.on("file", (name, stream) => {
    if (!isFileField(name) || files[name] !== undefined) {
      failure ??= new AppError("invalid", `The file field “${name}” isn't known or comes twice. Nothing was kept.`, {
        [name]: "This file isn't expected.",
      });
      stream.resume();
      return;
    }
    const temporary = path.join(folder, `${randomUUID()}.arriving`);
    arriving.add(temporary);
    files[name] = temporary;
    // An empty choice of file in a form still arrives as a file without content or name.
    writes.push(
      pipeline(stream, meter(), createWriteStream(temporary, { mode: 0o600 })).catch((error: unknown) => {
        failure ??= error instanceof Error ? error : new Error(String(error));
        stream.resume();
      }),
    );
  });
  try {
    await pipeline(request, parser);
    await Promise.all(writes);
    // Assigned in handlers, which the type checker doesn't see.
    const failed = failure as Error | null;
    if (failed) throw failed;
    return { fields, files, discard };
  } catch (error) {
    await Promise.allSettled(writes);
    await discard();
    if (error instanceof AppError) throw error;
    throw new AppError("invalid", "The files didn't arrive whole. Nothing was kept; send them again.");
  }
}
