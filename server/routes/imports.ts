import { Router } from "express";
import { WaveName } from "../../shared/contracts/imports.ts";
import type { Services } from "../app.ts";
import { AppError } from "../errors.ts";
import { receiveUpload } from "../microdata/uploads.ts";
import { currentReader, requirePerson } from "../middleware/signedIn.ts";
import { Import } from "../models/Import.ts";
import { parseId } from "../parse.ts";
import type { Reader } from "../policies/policy.ts";
import { surveyPolicy } from "../policies/survey.ts";
import { presentImport } from "../presenters/import.ts";
import { authorize, loadSurvey } from "../services/surveyAccess.ts";

const IMPORTS_LISTED = 50;

/** The bringing-in of releases. */
export function importRoutes({ imports }: Services): Router {
  const router = Router();

  const load = async (reader: Reader, id: string) => {
    const row = await Import.findByPk(id);
    if (!row) throw new AppError("notFound", "There is nothing here, or you may not see it.");
    const { access } = await loadSurvey(reader, row.surveyId);
    return { row, access };
  };

  router.post("/surveys/:id/releases", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { survey, access } = await loadSurvey(reader, parseId(request.params.id));
    authorize(surveyPolicy, "import", reader, access);
    const upload = await receiveUpload(request, imports.uploadFolder);
    try {
      const wave = WaveName.safeParse(upload.fields.wave);
      const fields: Record<string, string> = {};
      if (!wave.success) fields.wave = wave.error.issues[0]?.message ?? "Name the wave, such as 2025.";
      if (upload.files.microdata === undefined) fields.microdata = "Choose the file that holds the microdata.";
      const [first] = Object.values(fields);
      if (!wave.success || upload.files.microdata === undefined)
        throw new AppError("invalid", `${first ?? ""} Nothing was kept.`, fields);
      const row = await imports.start({
        surveyId: survey.id,
        wave: wave.data,
        microdataPath: upload.files.microdata,
        codebookPath: upload.files.codebook ?? null,
        actor: { id: reader.id, name: reader.name },
      });
      response.status(202).json(presentImport(row));
    } catch (error) {
      await upload.discard();
      throw error;
    }
  });

  router.get("/surveys/:id/imports", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { survey, access } = await loadSurvey(reader, parseId(request.params.id));
    authorize(surveyPolicy, "import", reader, access);
    const rows = await Import.findAll({ where: { surveyId: survey.id }, order: [["startedAt", "DESC"]], limit: IMPORTS_LISTED });
    response.json({ imports: rows.map(presentImport) });
  });

  router.get("/imports/:id", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { row, access } = await load(reader, parseId(request.params.id));
    authorize(surveyPolicy, "import", reader, access);
    response.json(presentImport(row));
  });

  router.delete("/imports/:id", requirePerson, async (request, response) => {
    const reader = currentReader(request);
    const { row, access } = await load(reader, parseId(request.params.id));
    authorize(surveyPolicy, "import", reader, access);
    if (!presentImport(row).can.cancel)
      throw new AppError("conflict", "This import has ended already. Remove its draft instead, if it made one.");
    await imports.cancel(row.id);
    await row.reload();
    response.json(presentImport(row));
  });

  return router;
}
