import type { z } from "zod";
import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { ImportProblem, ImportStatus } from "../../shared/contracts/imports.ts";

/** The bringing-in of one release, with its progress, so that any process can tell of it. */
export class Import extends Model<InferAttributes<Import>, InferCreationAttributes<Import>> {
  declare id: string;
  declare surveyId: string;
  declare releaseId: CreationOptional<string | null>;
  declare wave: string;
  declare status: z.infer<typeof ImportStatus>;
  declare stage: string;
  declare bytesDone: CreationOptional<number>;
  declare bytesTotal: CreationOptional<number>;
  declare rowCount: CreationOptional<number>;
  declare problems: z.infer<typeof ImportProblem>[];
  declare isCancelAsked: CreationOptional<boolean>;
  declare startedBy: string;
  declare startedAt: Date;
  /** Written while it runs; an import whose heart stopped died with its process. */
  declare heartbeatAt: Date;
  declare endedAt: CreationOptional<Date | null>;
}

/** Registers imports. */
export function initialiseImport(sequelize: Sequelize): void {
  Import.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true },
      surveyId: { type: DataTypes.UUID, allowNull: false },
      releaseId: DataTypes.UUID,
      wave: { type: DataTypes.STRING(60), allowNull: false },
      status: { type: DataTypes.STRING(12), allowNull: false },
      stage: { type: DataTypes.STRING(120), allowNull: false },
      bytesDone: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false, defaultValue: 0 },
      bytesTotal: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false, defaultValue: 0 },
      rowCount: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
      problems: { type: DataTypes.JSON, allowNull: false },
      isCancelAsked: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      startedBy: { type: DataTypes.UUID, allowNull: false },
      startedAt: { type: DataTypes.DATE(3), allowNull: false },
      heartbeatAt: { type: DataTypes.DATE(3), allowNull: false },
      endedAt: DataTypes.DATE(3),
    },
    { sequelize, modelName: "Import", tableName: "imports" },
  );
}
