// A process of its own that brings files in until it is killed: `node importer.ts <JSON of ImporterInput>`.
import { z } from "zod";
import { readConfig } from "../../../server/config.ts";
import { connectDatabase } from "../../../server/database.ts";
import { createImports } from "../../../server/microdata/imports.ts";
import { createLogger } from "../../../server/middleware/requestLog.ts";

const ImporterInput = z.object({
  databaseUrl: z.string(),
  dataFolder: z.string(),
  surveyId: z.string(),
  microdataPath: z.string(),
  actor: z.object({ id: z.string(), name: z.string() }),
});

const input = ImporterInput.parse(JSON.parse(process.argv[2] ?? ""));
const config = readConfig({ NODE_ENV: "test", PERHUNDRED_DATA: input.dataFolder, LOG_LEVEL: "silent" });
const sequelize = connectDatabase(input.databaseUrl);
const imports = await createImports({ config, sequelize, databaseUrl: input.databaseUrl, logger: createLogger("silent") });
await imports.run({
  surveyId: input.surveyId,
  wave: "2025",
  microdataPath: input.microdataPath,
  codebookPath: null,
  actor: input.actor,
});
