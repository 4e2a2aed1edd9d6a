import connectSessionSequelize from "connect-session-sequelize";
import cookieParser from "cookie-parser";
import { doubleCsrf } from "csrf-csrf";
import { json, Router, type Request, type RequestHandler, type Response } from "express";
import session, { type SessionData } from "express-session";
import type { Services } from "../app.ts";
import { AppError } from "../errors.ts";

declare module "express-session" {
  interface SessionData {
    personId?: string;
    /** Milliseconds since 1970, set at sign-in. */
    startedAt?: number;
  }
}

export const IDLE_LIMIT_MS = 2 * 60 * 60 * 1000;
export const ABSOLUTE_LIMIT_MS = 12 * 60 * 60 * 1000;
const BODY_LIMIT = "2mb";
/** Calls that come before anyone is signed in have no token; they must be JSON from our own pages or from no page at all. */
const BEFORE_SIGN_IN = [/^\/session$/, /^\/sign-in-links\/[^/]+$/];

const issuers = new WeakMap<Request, (request: Request, response: Response) => string>();

/** A token for the present session, to be sent back as `x-csrf-token`. */
export function issueCsrfToken(request: Request, response: Response): string {
  const issue = issuers.get(request);
  if (!issue) throw new Error("issueCsrfToken needs the session middleware before it.");
  return issue(request, response);
}

/** Host and port of an origin; null for one that is no address, such as "null". */
const hostOf = (origin: string) => (URL.canParse(origin) ? new URL(origin).host : null);

function checkOrigin(publicUrl: string): RequestHandler {
  return (request, _response, next) => {
    const isAnonymousChange = request.method === "POST" && BEFORE_SIGN_IN.some((path) => path.test(request.path));
    if (!isAnonymousChange) {
      next();
      return;
    }
    const origin = request.get("origin");
    const isOurs = origin === undefined || origin === publicUrl || hostOf(origin) === request.get("host");
    const isForeign = request.get("sec-fetch-site") === "cross-site" || !isOurs;
    if (isForeign || !request.is("json"))
      throw new AppError("forbidden", "This can only be sent from Perhundred's own pages. Nothing was changed.");
    next();
  };
}

/** Cookies, sessions kept in MariaDB, JSON bodies, and protection against requests forged by other sites. */
export function sessions({ config, sequelize, sessionSecret }: Services): Router {
  const isSecure = config.publicUrl.startsWith("https:");
  const Store = connectSessionSequelize(session.Store);
  const store = new Store({
    db: sequelize,
    table: "SessionRow",
    expiration: IDLE_LIMIT_MS,
    // The test process and stateless app processes end by themselves; expired rows are also skipped when read.
    checkExpirationInterval: 15 * 60 * 1000,
    extendDefaultFields: (defaults: object, data: SessionData) => ({ ...defaults, personId: data.personId ?? null }),
  });
  const csrf = doubleCsrf({
    getSecret: () => sessionSecret,
    getSessionIdentifier: (request) => request.sessionID,
    cookieName: isSecure ? "__Host-perhundred.csrf" : "perhundred.csrf",
    cookieOptions: { sameSite: "lax", secure: isSecure, httpOnly: true, path: "/" },
    getCsrfTokenFromRequest: (request) => request.get("x-csrf-token"),
    skipCsrfProtection: (request) => BEFORE_SIGN_IN.some((path) => path.test(request.path)) && request.method === "POST",
  });
  const router = Router();
  router.use(cookieParser(sessionSecret));
  router.use(
    session({
      name: isSecure ? "__Host-perhundred" : "perhundred",
      secret: sessionSecret,
      store,
      resave: false,
      saveUninitialized: false,
      rolling: true,
      cookie: { httpOnly: true, sameSite: "lax", secure: isSecure, maxAge: IDLE_LIMIT_MS, path: "/" },
    }),
  );
  router.use((request, _response, next) => {
    issuers.set(request, (from, to) => csrf.generateCsrfToken(from, to));
    next();
  });
  router.use(checkOrigin(config.publicUrl));
  router.use((request, response, next) => {
    csrf.doubleCsrfProtection(request, response, (error?: unknown) => {
      if (!error) return next();
      // Nobody signed in: the missing session is what to mend, not the token.
      if (request.session.personId === undefined)
        return next(new AppError("unauthenticated", "Sign in to go on. What you had is as it was."));
      next(new AppError("forbidden", "This page's pass has run out. Nothing was changed; reload the page and try again."));
    });
  });
  router.use(json({ limit: BODY_LIMIT }));
  return router;
}
