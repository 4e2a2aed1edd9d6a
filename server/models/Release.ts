import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type { Design } from "../../shared/contracts/design.ts";
import type { ReleaseStatus } from "../../shared/contracts/holdings.ts";
import { Survey } from "./Survey.ts";

/** One wave's microdata as brought in. The microdata never change; a correction is another release. */
export class Release extends Model<InferAttributes<Release>, InferCreationAttributes<Release>> {
  declare id: string;
  declare surveyId: string;
  declare wave: string;
  declare status: CreationOptional<ReleaseStatus>;
  declare respondents: number;
  /** SHA-256 over the segments' checksums, in order of variable and segment. */
  declare checksum: string;
  declare design: CreationOptional<Design | null>;
  /** When the layout for the present design was kept. */
  declare layoutAt: CreationOptional<Date | null>;
  declare createdBy: string;
  declare createdAt: Date;
  declare publishedBy: CreationOptional<string | null>;
  declare publishedAt: CreationOptional<Date | null>;
  /** Counts changes of codebook and design, so that cached answers go stale. */
  declare version: CreationOptional<number>;
  declare survey?: NonAttribute<Survey>;
}

/** Registers releases. */
export function initialiseRelease(sequelize: Sequelize): void {
  Release.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true },
      surveyId: { type: DataTypes.UUID, allowNull: false },
      wave: { type: DataTypes.STRING(60), allowNull: false },
      status: { type: DataTypes.STRING(12), allowNull: false, defaultValue: "draft" },
      respondents: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      checksum: { type: DataTypes.STRING(64), allowNull: false },
      design: DataTypes.JSON,
      layoutAt: DataTypes.DATE(3),
      createdBy: { type: DataTypes.UUID, allowNull: false },
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
      publishedBy: DataTypes.UUID,
      publishedAt: DataTypes.DATE(3),
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 0 },
    },
    { sequelize, modelName: "Release", tableName: "releases" },
  );
  Release.belongsTo(Survey, { as: "survey", foreignKey: "surveyId" });
  Survey.hasMany(Release, { as: "releases", foreignKey: "surveyId" });
}
