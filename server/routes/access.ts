import { Router } from "express";
import { GrantInput } from "../../shared/contracts/access.ts";
import type { Services } from "../app.ts";
import { currentReader, requirePerson } from "../middleware/signedIn.ts";
import { parse, parseId } from "../parse.ts";
import { surveyPolicy } from "../policies/survey.ts";
import { presentGrant } from "../presenters/grant.ts";
import { giveGrant, grantsOf, loadGrant, revokeGrant } from "../services/grants.ts";
import { authorize, loadSurvey } from "../services/surveyAccess.ts";

/** Grants of a survey. */
export function accessRoutes({ sequelize }: Services): Router {
  const router = Router();

  router.get("/surveys/:id/grants", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { survey, access } = await loadSurvey(reader, parseId(request.params.id));
    authorize(surveyPolicy, "manageAccess", reader, access);
    response.json({ surveyId: survey.id, surveyTitle: survey.title, grants: (await grantsOf(survey.id)).map(presentGrant) });
  });

  router.post("/surveys/:id/grants", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { survey, access } = await loadSurvey(reader, parseId(request.params.id));
    authorize(surveyPolicy, "manageAccess", reader, access);
    response.status(201).json(presentGrant(await giveGrant(sequelize, reader, survey, parse(GrantInput, request.body))));
  });

  router.delete("/grants/:id", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const grant = await loadGrant(parseId(request.params.id));
    const { access } = await loadSurvey(reader, grant.surveyId);
    authorize(surveyPolicy, "manageAccess", reader, access);
    response.json(presentGrant(await revokeGrant(sequelize, reader, grant)));
  });

  return router;
}
