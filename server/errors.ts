/** What we expect to go wrong, each with its HTTP status and title. */
const CODES = {
  invalid: [400, "That can't be read"],
  unauthenticated: [401, "Not signed in"],
  forbidden: [403, "Not allowed"],
  notFound: [404, "Not found"],
  conflict: [409, "Not possible in this state"],
  tooLarge: [413, "Too large"],
  unsupported: [415, "Not a kind of file taken here"],
  unprocessable: [422, "That can't be worked out"],
  tooMany: [429, "Too many tries"],
  unavailable: [503, "Not ready"],
} as const;

export type AppErrorCode = keyof typeof CODES;

/**
 * A failure that a reader can act on. `message` says what happened, what is untouched and what to do next;
 * `fields` names what is wrong with which field of a form (path with dots between levels).
 */
export class AppError extends Error {
  readonly code: AppErrorCode;
  readonly status: number;
  readonly title: string;
  readonly fields: Record<string, string> | undefined;
  constructor(code: AppErrorCode, message: string, fields?: Record<string, string>) {
    super(message);
    this.name = "AppError";
    this.code = code;
    [this.status, this.title] = CODES[code];
    this.fields = fields;
  }
}
