import { z } from "zod";
import { AppError } from "./errors.ts";

/** Reads outside input with a contract, or throws `invalid` naming every bad field by its path. */
export function parse<Schema extends z.ZodType>(schema: Schema, input: unknown): z.output<Schema> {
  const result = schema.safeParse(input);
  if (result.success) return result.data;
  const fields: Record<string, string> = {};
  for (const issue of result.error.issues) {
    const path = issue.path.map(String).join(".");
    fields[path] ??= issue.message;
  }
  const [first] = Object.entries(fields);
  const detail = first ? `${first[0] ? `${first[0]}: ` : ""}${first[1]}` : "The input doesn't fit.";
  throw new AppError("invalid", `${detail} Nothing was changed.`, fields);
}

/** `:id` of a path; a malformed one is a 404 like a missing thing, so ids can't be probed by shape. */
export function parseId(value: unknown): string {
  const result = z.uuid().safeParse(value);
  if (!result.success) throw new AppError("notFound", "There is nothing here, or you may not see it.");
  return result.data;
}
