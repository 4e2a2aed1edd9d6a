import {
  DataTypes,
  Model,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type { VariableKind } from "../../shared/contracts/codebook.ts";

/** A variable of a release's codebook. */
export class Variable extends Model<InferAttributes<Variable>, InferCreationAttributes<Variable>> {
  declare id: string;
  declare releaseId: string;
  declare position: number;
  declare name: string;
  declare label: string;
  declare kind: VariableKind;
  /** What its column holds: positions of `categories`, numbers, or text. A kind may be changed only where the storage allows. */
  declare storage: "code" | "number" | "text";
  /** Rows with an empty field. Missing codes are counted in their categories. */
  declare missingRows: number;
  declare distinctValues: number;
  declare minimum: number | null;
  declare maximum: number | null;
  declare isWhole: boolean;
  /** In order of position. Loaded with `include: "categories"`. */
  declare categories?: NonAttribute<Category[]>;
}

/** A code of a variable. In a column stored as "code", the stored integer is the category's position. */
export class Category extends Model<InferAttributes<Category>, InferCreationAttributes<Category>> {
  declare variableId: string;
  declare position: number;
  declare code: string;
  declare label: string;
  declare isMissing: boolean;
  declare respondents: number;
}

/** Registers variables and categories. */
export function initialiseVariableModels(sequelize: Sequelize): void {
  const unsigned = { type: DataTypes.INTEGER.UNSIGNED, allowNull: false };
  Variable.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true },
      releaseId: { type: DataTypes.UUID, allowNull: false },
      position: { ...unsigned },
      name: { type: DataTypes.STRING(64), allowNull: false },
      label: { type: DataTypes.STRING(400), allowNull: false },
      kind: { type: DataTypes.STRING(12), allowNull: false },
      storage: { type: DataTypes.STRING(12), allowNull: false },
      missingRows: { ...unsigned },
      distinctValues: { ...unsigned },
      minimum: DataTypes.DOUBLE,
      maximum: DataTypes.DOUBLE,
      isWhole: { type: DataTypes.BOOLEAN, allowNull: false },
    },
    { sequelize, modelName: "Variable", tableName: "variables" },
  );
  Category.init(
    {
      variableId: { type: DataTypes.UUID, primaryKey: true },
      position: { ...unsigned, primaryKey: true },
      code: { type: DataTypes.STRING(200), allowNull: false },
      label: { type: DataTypes.STRING(400), allowNull: false },
      isMissing: { type: DataTypes.BOOLEAN, allowNull: false },
      respondents: { ...unsigned },
    },
    { sequelize, modelName: "Category", tableName: "categories" },
  );
  Variable.hasMany(Category, { as: "categories", foreignKey: "variableId" });
}
