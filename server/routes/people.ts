import { Router, type RequestHandler } from "express";
import { PersonChange, PersonInput } from "../../shared/contracts/people.ts";
import type { Services } from "../app.ts";
import { AppError } from "../errors.ts";
import { currentReader, requirePerson } from "../middleware/signedIn.ts";
import { parse, parseId } from "../parse.ts";
import { personPolicy } from "../policies/person.ts";
import { presentPerson } from "../presenters/person.ts";
import { addPerson, allPeople, changePerson, renewSignInLink } from "../services/people.ts";

const requireAdministrator: RequestHandler = (request, _response, next) => {
  if (!personPolicy.read(currentReader(request)))
    throw new AppError("forbidden", "Only administrators keep accounts. Nothing was changed.");
  next();
};

/** People's accounts, for administrators. */
export function peopleRoutes({ sequelize, config }: Services): Router {
  const router = Router();

  router.get("/people", requirePerson, requireAdministrator, async (request, response) => {
    const reader = currentReader(request);
    response.json({ people: (await allPeople()).map((person) => presentPerson(person, reader)) });
  });

  router.post("/people", requirePerson, requireAdministrator, async (request, response) => {
    const reader = currentReader(request);
    const { person, link, expiresAt } = await addPerson(sequelize, reader, parse(PersonInput, request.body), config.publicUrl);
    response
      .status(201)
      .set("Cache-Control", "no-store")
      .json({ person: presentPerson(person, reader), link, expiresAt: expiresAt.toISOString() });
  });

  router.patch("/people/:id", requirePerson, requireAdministrator, async (request, response) => {
    const reader = currentReader(request);
    const id = parseId(request.params.id);
    const change = parse(PersonChange, request.body);
    if (change.isActive === false && !personPolicy.deactivate(reader, { id })) {
      throw new AppError("forbidden", "You can't deactivate your own account. Ask another administrator.");
    }
    response.json(presentPerson(await changePerson(sequelize, reader, id, change), reader));
  });

  router.post("/people/:id/sign-in-link", requirePerson, requireAdministrator, async (request, response) => {
    const reader = currentReader(request);
    const { person, link, expiresAt } = await renewSignInLink(sequelize, reader, parseId(request.params.id), config.publicUrl);
    response
      .status(201)
      .set("Cache-Control", "no-store")
      .json({ person: presentPerson(person, reader), link, expiresAt: expiresAt.toISOString() });
  });

  return router;
}
