import { vi } from "vitest";
import type { Problem } from "../../shared/contracts/problem.ts";
import type { SessionView } from "../../shared/contracts/session.ts";
import type { Role } from "../../shared/roles.ts";

export interface SeenRequest {
  method: string;
  path: string;
  params: Record<string, string>;
  query: URLSearchParams;
  /** Parsed JSON, or the form as it was sent. */
  body: unknown;
  headers: Headers;
}
type Answer = { status?: number; body: unknown };
type Handler = (request: SeenRequest) => Answer | Promise<Answer>;
/** `"GET /api/releases/:id"` to a body, or to a function that makes the answer. */
export type ApiTable = Record<string, object | Handler>;

/** A refusal as the server words it. */
export const refuse = (status: number, detail: string, fields?: Record<string, string>): Answer => ({
  status,
  body: { type: "about:blank", title: "Refused", status, detail, ...(fields ? { fields } : {}) } satisfies Problem,
});

/** A session of an invented person. */
export function sessionOf(...roles: Role[]): SessionView {
  return {
    person: { id: "0b0e5f5e-6f2a-4c39-9f0a-000000000001", name: "Robin Vale", email: "robin@perhundred.example", roles },
    permissions: {
      createSurvey: roles.includes("steward"),
      ask: roles.some((role) => role !== "administrator"),
      managePeople: roles.includes("administrator"),
      readLedger: true,
    },
    csrfToken: "csrf-of-the-test",
  };
}

/** Nobody signed in. */
export const signedOut: SessionView = {
  ...sessionOf(),
  person: null,
  permissions: { createSurvey: false, ask: false, managePeople: false, readLedger: false },
};

function match(pattern: string, path: string): Record<string, string> | null {
  const [wanted, given] = [pattern.split("/"), path.split("/")];
  if (wanted.length !== given.length) return null;
  const params: Record<string, string> = {};
  for (const [i, part] of wanted.entries()) {
    const value = decodeURIComponent(given[i] ?? "");
    if (part.startsWith(":")) params[part.slice(1)] = value;
    else if (part !== value) return null;
  }
  return params;
}

function readBody(body: unknown): unknown {
  return typeof body === "string" ? JSON.parse(body) : body;
}

/**
 * Stands in for the API: answers `fetch` from a table of routes and remembers what was asked. A route that isn't in
 * the table answers 404, as the server would. The table may be changed while the test runs.
 */
export function serveApi(table: ApiTable): { requests: SeenRequest[]; table: ApiTable } {
  const requests: SeenRequest[] = [];
  vi.stubGlobal("fetch", async (input: string | URL, init: RequestInit = {}) => {
    const url = new URL(String(input), "http://localhost");
    const method = init.method ?? "GET";
    for (const [route, answer] of Object.entries(table)) {
      const [routeMethod, pattern] = route.split(" ");
      const params = routeMethod === method && pattern !== undefined ? match(pattern, url.pathname) : null;
      if (params === null) continue;
      const request: SeenRequest = {
        method,
        path: url.pathname,
        params,
        query: url.searchParams,
        body: readBody(init.body),
        headers: new Headers(init.headers),
      };
      requests.push(request);
      const { status = 200, body } = typeof answer === "function" ? await (answer as Handler)(request) : { body: answer };
      init.signal?.throwIfAborted();
      return new Response(status === 204 ? null : JSON.stringify(body), {
        status,
        headers: { "content-type": "application/json" },
      });
    }
    const { status, body } = refuse(404, `There is nothing at ${method} ${url.pathname}.`);
    return new Response(JSON.stringify(body), { status: status ?? 404 });
  });
  return { requests, table };
}
