import type { ErrorRequestHandler, Request, RequestHandler } from "express";
import type { Sequelize } from "sequelize";
import type { Problem } from "../../shared/contracts/problem.ts";
import { AppError } from "../errors.ts";
import { record } from "../services/ledger.ts";
import type { Logger } from "./requestLog.ts";
import { knownReader } from "./signedIn.ts";

/** Answers any path under /api that no route took. */
export const notFound: RequestHandler = () => {
  throw new AppError("notFound", "There is nothing at this address.");
};

function statusOf(error: unknown): number | null {
  if (typeof error !== "object" || error === null || !("status" in error)) return null;
  const { status } = error;
  return typeof status === "number" && status >= 400 && status < 500 ? status : null;
}

function problemOf(error: unknown): Problem {
  if (error instanceof AppError) {
    return {
      type: `urn:perhundred:${error.code}`,
      title: error.title,
      status: error.status,
      detail: error.message,
      fields: error.fields,
    };
  }
  const status = statusOf(error);
  if (status !== null) {
    const detail =
      status === 413
        ? "The request is larger than taken here. Nothing was changed."
        : "The request can't be read. Nothing was changed.";
    return { type: "urn:perhundred:request", title: "That can't be read", status, detail };
  }
  return {
    type: "urn:perhundred:fault",
    title: "Something went wrong here",
    status: 500,
    detail: "The fault is ours and was noted. What you had is as it was; try again, and tell your administrator if it stays.",
  };
}

/** A refusal to somebody signed in stands in the ledger: who tried what. Nobody is kept waiting by a ledger that can't be written. */
async function noteRefusal(request: Request, { logger, sequelize }: ErrorServices): Promise<void> {
  const reader = knownReader(request);
  if (!reader) return;
  const summary = `${reader.name} was refused: ${request.method} ${request.originalUrl.split("?")[0] ?? ""}`;
  try {
    await sequelize.transaction((transaction) => record(transaction, reader, { action: "access.refused", summary }));
  } catch (error) {
    logger.error({ err: error }, "a refusal wasn't noted");
  }
}

type ErrorServices = { logger: Logger; sequelize: Sequelize };

/** Turns whatever was thrown into a problem document; only faults of ours are logged as errors, and none of their detail leaves. */
export function handleErrors(services: ErrorServices): ErrorRequestHandler {
  const { logger } = services;
  return async (error: unknown, request, response, next) => {
    const problem = problemOf(error);
    if (problem.status >= 500) logger.error({ err: error, path: request.path }, "request failed");
    if (response.headersSent) {
      next(error);
      return;
    }
    if (error instanceof AppError && error.code === "forbidden") await noteRefusal(request, services);
    response.status(problem.status).type("application/problem+json").send(JSON.stringify(problem));
  };
}
