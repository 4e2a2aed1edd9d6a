import { z } from "zod";
import { queryClient } from "./queryClient.ts";
import { ApiError, request } from "./request.ts";
import { forgetPerson, sessionQuery } from "./sessionQuery.ts";

export { ApiError };

/** For answers without content. */
export const Nothing = z.null();

async function guarded<Answer>(exchange: Promise<Answer>): Promise<Answer> {
  try {
    return await exchange;
  } catch (error) {
    if (error instanceof ApiError && error.problem.status === 401) forgetPerson();
    throw error;
  }
}

async function change<Schema extends z.ZodType>(method: string, path: string, schema: Schema, body?: unknown) {
  const { csrfToken } = await queryClient.query({ ...sessionQuery, staleTime: "static" });
  return guarded(request(method, path, schema, { body, csrfToken }));
}

/** The API as pages use it: answers are parsed by their contract, refusals thrown as `ApiError`. */
export const api = {
  get: <Schema extends z.ZodType>(path: string, schema: Schema, options: { signal?: AbortSignal } = {}) =>
    guarded(request("GET", path, schema, options)),
  post: <Schema extends z.ZodType>(path: string, body: unknown, schema: Schema) => change("POST", path, schema, body),
  put: <Schema extends z.ZodType>(path: string, body: unknown, schema: Schema) => change("PUT", path, schema, body),
  patch: <Schema extends z.ZodType>(path: string, body: unknown, schema: Schema) => change("PATCH", path, schema, body),
  delete: <Schema extends z.ZodType>(path: string, schema: Schema) => change("DELETE", path, schema),
};
