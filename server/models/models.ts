import type { Sequelize } from "sequelize";
import { initialiseColumnModels } from "./Column.ts";
import { initialiseGrant } from "./Grant.ts";
import { initialiseImport } from "./Import.ts";
import { initialiseLedgerEntry } from "./LedgerEntry.ts";
import { initialisePersonModels } from "./Person.ts";
import { initialiseRelease } from "./Release.ts";
import { initialiseSurveyModels } from "./Survey.ts";
import { initialiseVariableModels } from "./Variable.ts";

/** Registers every model on a connection; call once per connection. */
export function initialiseModels(sequelize: Sequelize): void {
  initialisePersonModels(sequelize);
  initialiseSurveyModels(sequelize);
  initialiseGrant(sequelize);
  initialiseRelease(sequelize);
  initialiseImport(sequelize);
  initialiseVariableModels(sequelize);
  initialiseColumnModels(sequelize);
  initialiseLedgerEntry(sequelize);
}
