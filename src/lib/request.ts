import type { z } from "zod";
import { Problem } from "../../shared/contracts/problem.ts";

/** The server said no, or couldn't be reached (status 0). `problem.detail` is fit to be read by a person. */
export class ApiError extends Error {
  readonly problem: Problem;
  constructor(problem: Problem) {
    super(problem.detail);
    this.name = "ApiError";
    this.problem = problem;
  }
}

const unreachable: Problem = {
  type: "about:blank",
  title: "The server can't be reached",
  status: 0,
  detail:
    "The connection failed, so it isn't known whether anything was changed. Check the network, then look again before you repeat it.",
};

const unreadable = (status: number): Problem => ({
  type: "about:blank",
  title: "An answer that can't be read",
  status,
  detail:
    "The server answered in a form this page doesn't know. Reload the page to get its newest version; if that doesn't help, tell your administrator.",
});

export interface RequestOptions {
  signal?: AbortSignal | undefined;
  /** Sent as JSON, unless it is a form with files. */
  body?: unknown;
  csrfToken?: string | undefined;
}

async function readJson(response: Response): Promise<unknown> {
  if (response.status === 204) return null;
  try {
    return await response.json();
  } catch {
    return undefined;
  }
}

/** One exchange with the API, its answer checked against the contract. @throws {ApiError} */
export async function request<Schema extends z.ZodType>(
  method: string,
  path: string,
  schema: Schema,
  { signal, body, csrfToken }: RequestOptions = {},
): Promise<z.output<Schema>> {
  const isForm = body instanceof FormData;
  const headers: Record<string, string> = { accept: "application/json" };
  if (body !== undefined && !isForm) headers["content-type"] = "application/json";
  if (csrfToken !== undefined) headers["x-csrf-token"] = csrfToken;
  let response: Response;
  try {
    response = await fetch(path, {
      method,
      headers,
      credentials: "same-origin",
      signal: signal ?? null,
      body: body === undefined ? null : isForm ? body : JSON.stringify(body),
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw new ApiError(unreachable);
  }
  const content = await readJson(response);
  if (!response.ok) {
    const problem = Problem.safeParse(content);
    throw new ApiError(problem.success ? problem.data : unreadable(response.status));
  }
  const parsed = schema.safeParse(content);
  if (!parsed.success) throw new ApiError(unreadable(response.status));
  return parsed.data;
}
