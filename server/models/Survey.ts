import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import { Person } from "./Person.ts";
import type { Release } from "./Release.ts";

/** A survey; its waves are releases. */
export class Survey extends Model<InferAttributes<Survey>, InferCreationAttributes<Survey>> {
  declare id: string;
  declare title: string;
  declare description: string;
  declare createdAt: Date;
  /** Loaded with `include: "stewards"`. */
  declare stewards?: NonAttribute<Person[]>;
  /** Loaded with `include: "releases"`. */
  declare releases?: NonAttribute<Release[]>;
}

/** One steward of one survey. */
export class SurveySteward extends Model<InferAttributes<SurveySteward>, InferCreationAttributes<SurveySteward>> {
  declare surveyId: string;
  declare personId: string;
}

/** Registers surveys and their stewards. */
export function initialiseSurveyModels(sequelize: Sequelize): void {
  Survey.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true },
      title: { type: DataTypes.STRING(160), allowNull: false },
      description: { type: DataTypes.TEXT, allowNull: false },
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
    },
    { sequelize, modelName: "Survey", tableName: "surveys" },
  );
  SurveySteward.init(
    { surveyId: { type: DataTypes.UUID, primaryKey: true }, personId: { type: DataTypes.UUID, primaryKey: true } },
    { sequelize, modelName: "SurveySteward", tableName: "survey_stewards" },
  );
  Survey.belongsToMany(Person, { as: "stewards", through: SurveySteward, foreignKey: "surveyId", otherKey: "personId" });
}
