import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import { Person } from "./Person.ts";
import { Survey } from "./Survey.ts";

/** A person's leave to ask of a survey, for a purpose, until a day. Kept after its end. */
export class Grant extends Model<InferAttributes<Grant>, InferCreationAttributes<Grant>> {
  declare id: string;
  declare surveyId: string;
  declare personId: string;
  declare purpose: string;
  /** `YYYY-MM-DD`, the last day on which it holds, UTC. */
  declare endsOn: string;
  declare givenBy: string;
  declare givenAt: Date;
  declare revokedBy: CreationOptional<string | null>;
  declare revokedAt: CreationOptional<Date | null>;
  declare person?: NonAttribute<Person>;
  declare giver?: NonAttribute<Person>;
  declare revoker?: NonAttribute<Person | null>;
  declare survey?: NonAttribute<Survey>;
}

/** Registers grants. */
export function initialiseGrant(sequelize: Sequelize): void {
  Grant.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true },
      surveyId: { type: DataTypes.UUID, allowNull: false },
      personId: { type: DataTypes.UUID, allowNull: false },
      purpose: { type: DataTypes.STRING(1000), allowNull: false },
      endsOn: { type: DataTypes.DATEONLY, allowNull: false },
      givenBy: { type: DataTypes.UUID, allowNull: false },
      givenAt: { type: DataTypes.DATE(3), allowNull: false },
      revokedBy: DataTypes.UUID,
      revokedAt: DataTypes.DATE(3),
    },
    { sequelize, modelName: "Grant", tableName: "grants" },
  );
  Grant.belongsTo(Person, { as: "person", foreignKey: "personId" });
  Grant.belongsTo(Person, { as: "giver", foreignKey: "givenBy" });
  Grant.belongsTo(Person, { as: "revoker", foreignKey: "revokedBy" });
  Grant.belongsTo(Survey, { as: "survey", foreignKey: "surveyId" });
}
