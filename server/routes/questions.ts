import { Router } from "express";
import { z } from "zod";
import { Question } from "../../shared/contracts/questions.ts";
import type { ScriptView } from "../../shared/contracts/tables.ts";
import type { Services } from "../app.ts";
import { AppError } from "../errors.ts";
import { currentReader, requirePerson } from "../middleware/signedIn.ts";
import { parse } from "../parse.ts";
import { releasePolicy } from "../policies/survey.ts";
import { caption } from "../questions/caption.ts";
import { canReproduce, reproduceScript } from "../questions/reproduce.ts";
import { record } from "../services/ledger.ts";
import { authorize, loadRelease } from "../services/surveyAccess.ts";
import { loadCodebook } from "../services/codebook.ts";

/** `POST /api/tables/downloads`: says that a table's figures leave the page, before they do. */
const DownloadInput = z.strictObject({ question: Question, format: z.enum(["csv", "text", "png", "svg", "bundle"]) });

/** `POST /api/tables` and the record of downloads. */
export function questionRoutes({ questions, sequelize }: Services): Router {
  const router = Router();

  const load = async (request: Parameters<typeof currentReader>[0], releaseId: string) => {
    const reader = currentReader(request);
    const { release, access } = await loadRelease(reader, releaseId);
    if (releasePolicy.read(reader, access) && release.status !== "published") {
      const why = release.status === "draft" ? "isn't published yet" : `was ${release.status}`;
      throw new AppError("conflict", `This release ${why}, so it takes no questions. Choose a published release.`);
    }
    authorize(releasePolicy, "ask", reader, access);
    if (release.design === null) throw new AppError("conflict", "This release has no design yet.");
    return { reader, release, design: release.design, variables: await loadCodebook(release) };
  };

  /** The release asked of, and the one compared with; both must be open to the reader, and of one survey. */
  const loadBoth = async (request: Parameters<typeof currentReader>[0], question: Question) => {
    const { reader, ...asked } = await load(request, question.releaseId);
    const { comparison } = question;
    if (comparison.kind !== "release") return { reader, ...asked };
    const { release, design, variables } = await load(request, comparison.releaseId);
    if (release.surveyId !== asked.release.surveyId) {
      const message = "Only releases of one survey can be compared.";
      throw new AppError("invalid", message, { comparison: message });
    }
    return { reader, ...asked, other: { release, design, variables } };
  };

  router.post("/tables", requirePerson, async (request, response) => {
    const question = parse(Question, request.body);
    const { reader, ...asked } = await loadBoth(request, question);
    const table = await questions.table(asked, question, reader);
    await sequelize.transaction((transaction) =>
      record(transaction, reader, {
        action: "question.asked",
        surveyId: asked.release.surveyId,
        subjectId: asked.release.id,
        summary: `Asked: ${table.caption}`,
      }),
    );
    response.set("Cache-Control", "no-store").json(table);
  });

  router.post("/tables/downloads", requirePerson, async (request, response) => {
    const { question, format } = parse(DownloadInput, request.body);
    const { reader, release, variables, ...rest } = await loadBoth(request, question);
    await sequelize.transaction((transaction) =>
      record(transaction, reader, {
        action: "table.downloaded",
        surveyId: release.surveyId,
        subjectId: release.id,
        summary: `Took away as ${format}: ${caption(question, release, variables, "other" in rest ? rest.other.release : undefined)}`,
      }),
    );
    response.status(204).end();
  });

  router.post("/tables/script", requirePerson, async (request, response) => {
    const { question } = parse(DownloadInput.pick({ question: true }).loose(), request.body);
    const { release, design, variables, ...rest } = await loadBoth(request, question);
    const words = caption(question, release, variables, "other" in rest ? rest.other.release : undefined);
    const script = canReproduce(question, design) ? reproduceScript(question, design, variables, words) : null;
    response.json({ script } satisfies ScriptView);
  });

  return router;
}
