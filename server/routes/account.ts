import { Router } from "express";
import { ChangePasswordInput } from "../../shared/contracts/session.ts";
import type { Services } from "../app.ts";
import { currentReader, requirePerson } from "../middleware/signedIn.ts";
import { parse } from "../parse.ts";
import { changePassword } from "../services/signIn.ts";

/** One's own account. */
export function accountRoutes({ sequelize }: Services): Router {
  const router = Router();
  router.put("/account/password", requirePerson, async (request, response) => {
    const input = parse(ChangePasswordInput, request.body);
    await changePassword(sequelize, currentReader(request).id, request.sessionID, input);
    response.status(204).end();
  });
  return router;
}
