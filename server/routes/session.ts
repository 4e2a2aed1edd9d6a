import { Router, type RequestHandler } from "express";
import passport from "passport";
import { Strategy } from "passport-local";
import { AcceptLinkInput, SignInInput, type SignInLinkView } from "../../shared/contracts/session.ts";
import type { Services } from "../app.ts";
import { AppError } from "../errors.ts";
import { limitSignIns } from "../middleware/limits.ts";
import { issueCsrfToken } from "../middleware/session.ts";
import { findReader } from "../middleware/signedIn.ts";
import { Person } from "../models/Person.ts";
import { parse } from "../parse.ts";
import { presentSession } from "../presenters/session.ts";
import { acceptSignInLink, endSession, findByPassword, noteRefusal, startSession } from "../services/signIn.ts";
import { findSignInLink } from "../services/signInLinks.ts";

const REFUSED =
  "E-mail address and password don't fit an active account. Check both, or ask your administrator for a new sign-in link.";

/** Signing in and out, and one-time links. */
export function sessionRoutes({ sequelize, signInLimits }: Services): Router {
  const router = Router();
  const authenticator = new passport.Passport();
  authenticator.use(
    new Strategy({ usernameField: "email", session: false }, (email, password, done) => {
      findByPassword(email, password).then(
        (person) => done(null, person ?? false),
        (error: unknown) => done(error),
      );
    }),
  );

  /** Who the credentials belong to; null for nobody. */
  const authenticate = (...[request, response]: Parameters<RequestHandler>) =>
    new Promise<Person | null>((resolve, reject) => {
      const finish = (error: unknown, person: unknown) => {
        if (error) reject(error instanceof Error ? error : new Error("The sign-in check failed.", { cause: error }));
        else resolve(person instanceof Person ? person : null);
      };
      const handler = authenticator.authenticate("local", { session: false }, finish) as RequestHandler;
      void handler(request, response, reject);
    });

  router.get("/session", async (request, response) => {
    const reader = await findReader(request);
    response.set("Cache-Control", "no-store").json(presentSession(reader, reader ? issueCsrfToken(request, response) : ""));
  });

  router.post("/session", ...limitSignIns(signInLimits), async (request, response, next) => {
    const { email } = parse(SignInInput, request.body);
    const person = await authenticate(request, response, next);
    if (!person) {
      await noteRefusal(sequelize, email);
      throw new AppError("unauthenticated", REFUSED);
    }
    await startSession(request, person, sequelize);
    response.set("Cache-Control", "no-store").json(presentSession(await findReader(request), issueCsrfToken(request, response)));
  });

  router.delete("/session", async (request, response) => {
    await endSession(request, await findReader(request), sequelize);
    response.status(204).end();
  });

  router.get("/sign-in-links/:token", async (request, response) => {
    const link = await findSignInLink(request.params.token);
    const person = await Person.findByPk(link.personId);
    if (!person?.isActive) throw new AppError("notFound", "This account isn't active. Ask your administrator.");
    const view: SignInLinkView = { name: person.name, email: person.email, expiresAt: link.expiresAt.toISOString() };
    response.set("Cache-Control", "no-store").json(view);
  });

  router.post("/sign-in-links/:token", ...limitSignIns(signInLimits), async (request, response) => {
    const { password } = parse(AcceptLinkInput, request.body);
    const { token } = request.params;
    const person = await acceptSignInLink(sequelize, typeof token === "string" ? token : "", password);
    await startSession(request, person, sequelize);
    response.set("Cache-Control", "no-store").json(presentSession(await findReader(request), issueCsrfToken(request, response)));
  });

  return router;
}
