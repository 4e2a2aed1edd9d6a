import { Router } from "express";
import { StewardsInput } from "../../shared/contracts/access.ts";
import { SurveyInput } from "../../shared/contracts/holdings.ts";
import type { Services } from "../app.ts";
import { AppError } from "../errors.ts";
import { currentReader, requirePerson } from "../middleware/signedIn.ts";
import { parse, parseId } from "../parse.ts";
import { surveyPolicy } from "../policies/survey.ts";
import {
  accessCandidates,
  createSurvey,
  setStewards,
  updateSurvey,
  visibleSurvey,
  visibleSurveys,
} from "../services/holdings.ts";
import { authorize, loadSurvey } from "../services/surveyAccess.ts";

/** Surveys. */
export function holdingsRoutes({ sequelize }: Services): Router {
  const router = Router();

  router.get("/surveys", requirePerson, async (request, response) => {
    response.json({ surveys: await visibleSurveys(currentReader(request)) });
  });

  router.post("/surveys", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    if (!reader.roles.includes("steward"))
      throw new AppError("forbidden", "Only data stewards create surveys. Nothing was changed.");
    const id = await createSurvey(sequelize, reader, parse(SurveyInput, request.body));
    response.status(201).json(await visibleSurvey(reader, id));
  });

  router.get("/surveys/:id", requirePerson, async (request, response) => {
    response.json(await visibleSurvey(currentReader(request), parseId(request.params.id)));
  });

  router.patch("/surveys/:id", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { survey, access } = await loadSurvey(reader, parseId(request.params.id));
    authorize(surveyPolicy, "update", reader, access);
    await updateSurvey(sequelize, reader, survey, parse(SurveyInput, request.body));
    response.json(await visibleSurvey(reader, survey.id));
  });

  router.put("/surveys/:id/stewards", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { survey, access } = await loadSurvey(reader, parseId(request.params.id));
    authorize(surveyPolicy, "manageAccess", reader, access);
    await setStewards(sequelize, reader, survey, parse(StewardsInput, request.body).personIds);
    // Whoever handed the survey over may no longer see it: answer with what they see now.
    const [view] = await visibleSurveys(reader, survey.id);
    if (view) response.json(view);
    else response.status(204).end();
  });

  router.get("/surveys/:id/candidates", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { access } = await loadSurvey(reader, parseId(request.params.id));
    authorize(surveyPolicy, "manageAccess", reader, access);
    const people = await accessCandidates();
    response.json({ people: people.map(({ id, name, email, roles }) => ({ id, name, email, roles })) });
  });

  return router;
}
