import type { FieldPath, FieldValues, UseFormSetError } from "react-hook-form";
import { ApiError } from "./request.ts";

/** What a failure says to a person. */
export const messageOf = (error: unknown): string =>
  error instanceof ApiError
    ? error.problem.detail
    : "Something went wrong on this page. Nothing was sent. Reload the page and try again.";

/**
 * Puts what the server found wrong onto the form: each named field gets its message, anything else stands above
 * the form as `root.server`.
 */
export function showServerErrors<Values extends FieldValues>(
  error: unknown,
  setError: UseFormSetError<Values>,
  fieldNames: readonly FieldPath<Values>[],
): void {
  const fields = error instanceof ApiError ? (error.problem.fields ?? {}) : {};
  const known = fieldNames.filter((name) => fields[name] !== undefined);
  for (const [index, name] of known.entries())
    setError(name, { type: "server", message: fields[name] ?? "" }, { shouldFocus: index === 0 });
  if (known.length === 0) setError("root.server", { type: "server", message: messageOf(error) });
}
