import type { RequestHandler } from "express";
import { pino } from "pino";
import { pinoHttp } from "pino-http";

export type Logger = ReturnType<typeof createLogger>;

/** A log of one JSON line an event on standard output. */
export function createLogger(level: string) {
  return pino({ level });
}

/** One line a request: method, path without its query (questions stand there), status, time. No headers, no bodies. */
export function logRequests(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    autoLogging: { ignore: (request) => request.url === "/api/health" },
    customLogLevel: (_request, response) => (response.statusCode >= 500 ? "error" : "debug"),
    serializers: {
      req: (request: { method: string; url: string }) => ({ method: request.method, path: request.url.split("?")[0] }),
      res: (response: { statusCode: number }) => ({ status: response.statusCode }),
    },
  });
}
