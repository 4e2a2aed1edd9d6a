import { rateLimit } from "express-rate-limit";
import type { Request, RequestHandler } from "express";
import { AppError } from "../errors.ts";

/** Tries at signing in within a window. A person is never locked out from elsewhere: the count goes by e-mail and address together. */
export interface SignInLimits {
  perPerson: number;
  perAddress: number;
  windowMs: number;
}

export const SIGN_IN_LIMITS: SignInLimits = { perPerson: 10, perAddress: 100, windowMs: 15 * 60 * 1000 };

const emailOf = (request: Request) => {
  const body: unknown = request.body;
  const email = typeof body === "object" && body !== null && "email" in body ? body.email : "";
  return typeof email === "string" ? email.toLowerCase().slice(0, 254) : "";
};

/** Refused sign-ins only are counted. */
export function limitSignIns(limits: SignInLimits): RequestHandler[] {
  const common = {
    windowMs: limits.windowMs,
    skipSuccessfulRequests: true,
    standardHeaders: "draft-8" as const,
    legacyHeaders: false,
    handler: () => {
      const minutes = Math.ceil(limits.windowMs / 60_000);
      throw new AppError(
        "tooMany",
        `Too many sign-ins were refused. Wait ${minutes} minutes and try again, or ask your administrator for a new sign-in link.`,
      );
    },
  };
  return [
    rateLimit({
      ...common,
      limit: limits.perAddress,
      keyGenerator: (request) => request.ip ?? "",
      validate: { keyGeneratorIpFallback: false },
    }),
    rateLimit({
      ...common,
      limit: limits.perPerson,
      keyGenerator: (request) => `${request.ip ?? ""} ${emailOf(request)}`,
      validate: { keyGeneratorIpFallback: false },
    }),
  ];
}
