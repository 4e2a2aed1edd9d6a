import { SessionView } from "../../shared/contracts/session.ts";

/** An answer of the API: its status and, where it is JSON, its body. */
export interface Answer {
  status: number;
  body: unknown;
  text: string;
  headers: Headers;
}

/** A browser as far as the API is concerned: keeps cookies, sends the CSRF token with every change. */
export interface Client {
  /** @throws {Error} when the sign-in is refused. */
  signIn(email: string, password?: string): Promise<SessionView>;
  get(path: string): Promise<Answer>;
  post(path: string, body?: unknown): Promise<Answer>;
  put(path: string, body: unknown): Promise<Answer>;
  patch(path: string, body: unknown): Promise<Answer>;
  delete(path: string): Promise<Answer>;
  /** Multipart upload. */
  upload(path: string, form: FormData): Promise<Answer>;
  /** Any request, with headers of one's own; no token unless given. */
  send(method: string, path: string, options?: { body?: BodyInit; headers?: Record<string, string> }): Promise<Answer>;
  cookies: Map<string, string>;
  csrfToken: string;
}

/** Password of people made by `tests/factories/people.ts`. */
export const TEST_PASSWORD = "correct horse battery staple";

/** A client of the API at an address. */
export function createClient(address: string): Client {
  const cookies = new Map<string, string>();
  let csrfToken = "";

  async function send(
    method: string,
    path: string,
    options: { body?: BodyInit; headers?: Record<string, string> } = {},
  ): Promise<Answer> {
    const cookie = [...cookies].map(([name, value]) => `${name}=${value}`).join("; ");
    const response = await fetch(`${address}${path}`, {
      method,
      headers: { ...(cookie ? { cookie } : {}), ...options.headers },
      redirect: "manual",
      ...(options.body === undefined ? {} : { body: options.body }),
    });
    for (const line of response.headers.getSetCookie()) {
      const [pair = ""] = line.split(";");
      const at = pair.indexOf("=");
      cookies.set(pair.slice(0, at), pair.slice(at + 1));
    }
    const text = await response.text();
    const isJson = /json/.test(response.headers.get("content-type") ?? "");
    const body: unknown = isJson && text !== "" ? JSON.parse(text) : null;
    return { status: response.status, body, text, headers: response.headers };
  }

  const change = (method: string) => (path: string, body?: unknown) =>
    send(method, path, {
      headers: { "x-csrf-token": csrfToken, ...(body === undefined ? {} : { "content-type": "application/json" }) },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });

  return {
    cookies,
    get csrfToken() {
      return csrfToken;
    },
    set csrfToken(token) {
      csrfToken = token;
    },
    async signIn(email, password = TEST_PASSWORD) {
      const answer = await change("POST")("/api/session", { email, password });
      if (answer.status !== 200) throw new Error(`The sign-in of ${email} was refused: ${answer.text}`);
      const view = SessionView.parse(answer.body);
      csrfToken = view.csrfToken;
      return view;
    },
    get: (path) => send("GET", path),
    post: change("POST"),
    put: change("PUT"),
    patch: change("PATCH"),
    delete: (path) => change("DELETE")(path),
    upload: (path, form) => send("POST", path, { headers: { "x-csrf-token": csrfToken }, body: form }),
    send,
  };
}
