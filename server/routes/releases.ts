import { Router, type Request } from "express";
import { VariableChange } from "../../shared/contracts/codebook.ts";
import { DesignInput } from "../../shared/contracts/design.ts";
import type { Services } from "../app.ts";
import { AppError } from "../errors.ts";
import { CODEBOOK_TEMPLATE, writeCodebook } from "../microdata/codebookCsv.ts";
import { designVariables } from "../microdata/designData.ts";
import { currentReader, requirePerson } from "../middleware/signedIn.ts";
import { Person } from "../models/Person.ts";
import type { Release } from "../models/Release.ts";
import { parse, parseId } from "../parse.ts";
import type { Reader } from "../policies/policy.ts";
import { releasePolicy, type ReleaseAccess } from "../policies/survey.ts";
import { presentCodebook, presentVariable } from "../presenters/codebook.ts";
import { presentReleaseView } from "../presenters/holdings.ts";
import { changeVariable, loadCodebook, loadVariables } from "../services/codebook.ts";
import { releaseExtras } from "../services/holdings.ts";
import { publish, removeDraft } from "../services/publication.ts";
import { readiness } from "../services/readiness.ts";
import { authorize, loadRelease } from "../services/surveyAccess.ts";

/** A file name of letters, digits and hyphens. */
const fileName = (text: string) =>
  text
    .normalize("NFKD")
    .replace(/[^A-Za-z0-9]+/g, "-")
    .replace(/^-|-$/g, "") || "release";

/** Releases: their codebook, design, readiness and publication. */
export function releaseRoutes({ sequelize, designs, columns, config }: Services): Router {
  const router = Router();

  const load = async (request: Request, act: keyof typeof releasePolicy) => {
    const reader = currentReader(request);
    const { release, access } = await loadRelease(reader, parseId(request.params.id));
    authorize(releasePolicy, act, reader, access);
    return { reader, release, access };
  };

  const view = async (reader: Reader, release: Release, access: ReleaseAccess) => {
    const extras = (await releaseExtras([release.id])).get(release.id) ?? { variables: 0, importId: null };
    const publisher = release.publishedBy ? await Person.findByPk(release.publishedBy) : null;
    return presentReleaseView(release, access, reader, { ...extras, publishedBy: publisher?.name ?? null });
  };

  router.get("/codebook-template.csv", requirePerson, (_request, response) => {
    response.attachment("codebook-template.csv").type("text/csv; charset=utf-8").send(CODEBOOK_TEMPLATE);
  });

  router.get("/releases/:id", requirePerson, async (request, response) => {
    const { reader, release, access } = await load(request, "read");
    response.json(await view(reader, release, access));
  });

  router.delete("/releases/:id", requirePerson, async (request, response) => {
    const { reader, release } = await load(request, "remove");
    await removeDraft(sequelize, reader, release);
    columns.forget(release.id);
    response.status(204).end();
  });

  router.get("/releases/:id/codebook", requirePerson, async (request, response) => {
    const { reader, release, access } = await load(request, "read");
    response.json(presentCodebook(release, await loadVariables(release.id), access, reader));
  });

  router.get("/releases/:id/codebook.csv", requirePerson, async (request, response) => {
    const { release } = await load(request, "read");
    const name = `${fileName(release.survey?.title ?? "")}-${fileName(release.wave)}-codebook.csv`;
    response
      .attachment(name)
      .type("text/csv; charset=utf-8")
      .send(writeCodebook(await loadCodebook(release)));
  });

  router.patch("/releases/:id/codebook/:variableId", requirePerson, async (request, response) => {
    const { reader, release } = await load(request, "updateCodebook");
    const variableId = parseId(request.params.variableId);
    if (release.status !== "draft")
      throw new AppError("conflict", "A published release keeps its codebook. Bring in a new release to change it.");
    const change = parse(VariableChange, request.body);
    const find = async () => {
      const variables = await loadVariables(release.id);
      const variable = variables.find(({ id }) => id === variableId);
      if (!variable) throw new AppError("notFound", "This release has no such variable.");
      return { variable, names: variables.map(({ name }) => name) };
    };
    const { variable, names } = await find();
    await changeVariable(sequelize, reader, release, variable, change);
    columns.forget(release.id);
    // A missing code in a variable of the design changes who has a weight, a stratum or a PSU.
    await release.reload();
    if (release.design && designVariables(release.design, names).includes(variable.name))
      await designs.declare(reader, release, release.design);
    response.json(presentVariable((await find()).variable, release, true));
  });

  router.get("/releases/:id/design", requirePerson, async (request, response) => {
    const { reader, release, access } = await load(request, "readDesign");
    const can = { update: release.status === "draft" && releasePolicy.updateDesign(reader, access) };
    response.json({ releaseId: release.id, design: release.design, floor: config.floor, can });
  });

  router.put("/releases/:id/design", requirePerson, async (request, response) => {
    const { reader, release } = await load(request, "updateDesign");
    await designs.declare(reader, release, parse(DesignInput, request.body));
    response.json({ releaseId: release.id, design: release.design, floor: config.floor, can: { update: true } });
  });

  router.get("/releases/:id/readiness", requirePerson, async (request, response) => {
    const { reader, release, access } = await load(request, "readReadiness");
    const checks = await readiness(designs, release);
    const isFit = checks.findings.every(({ severity }) => severity !== "fault");
    response.json({ ...checks, can: { publish: isFit && release.status === "draft" && releasePolicy.publish(reader, access) } });
  });

  router.post("/releases/:id/publication", requirePerson, async (request, response) => {
    const { reader, release, access } = await load(request, "publish");
    await publish(sequelize, designs, reader, release);
    response.json(await view(reader, release, { ...access, status: release.status }));
  });

  return router;
}
