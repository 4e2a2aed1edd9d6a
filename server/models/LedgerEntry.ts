import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { LedgerAction } from "../../shared/contracts/ledger.ts";

/** One act, as it was done. Never changed. */
export class LedgerEntry extends Model<InferAttributes<LedgerEntry>, InferCreationAttributes<LedgerEntry>> {
  declare id: CreationOptional<number>;
  declare at: Date;
  declare actorId: string | null;
  declare actorName: string | null;
  declare action: LedgerAction;
  declare surveyId: string | null;
  declare subjectId: string | null;
  declare summary: string;
}

/** Registers the ledger. */
export function initialiseLedgerEntry(sequelize: Sequelize): void {
  LedgerEntry.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
      at: { type: DataTypes.DATE(3), allowNull: false },
      actorId: DataTypes.UUID,
      actorName: DataTypes.STRING(120),
      action: { type: DataTypes.STRING(40), allowNull: false },
      surveyId: DataTypes.UUID,
      subjectId: DataTypes.STRING(64),
      summary: { type: DataTypes.STRING(2000), allowNull: false },
    },
    { sequelize, modelName: "LedgerEntry", tableName: "ledger" },
  );
}
