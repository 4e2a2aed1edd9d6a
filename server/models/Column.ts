import { DataTypes, Model, type InferAttributes, type InferCreationAttributes, type Sequelize } from "sequelize";

/** Up to 65,536 respondents' values of one variable, in file order. */
export class ColumnSegment extends Model<InferAttributes<ColumnSegment>, InferCreationAttributes<ColumnSegment>> {
  declare variableId: string;
  declare segment: number;
  declare encoding: string;
  declare rowCount: number;
  declare bytes: Buffer;
  /** SHA-256 of `bytes`. */
  declare checksum: string;
}

/** A part of the order of respondents by stratum and PSU that a release's design asks for. */
export class Layout extends Model<InferAttributes<Layout>, InferCreationAttributes<Layout>> {
  declare releaseId: string;
  declare part: string;
  declare bytes: Buffer;
  declare checksum: string;
}

/** Registers column segments and layouts. */
export function initialiseColumnModels(sequelize: Sequelize): void {
  ColumnSegment.init(
    {
      variableId: { type: DataTypes.UUID, primaryKey: true },
      segment: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
      encoding: { type: DataTypes.STRING(12), allowNull: false },
      rowCount: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      bytes: { type: DataTypes.BLOB("long"), allowNull: false },
      checksum: { type: DataTypes.STRING(64), allowNull: false },
    },
    { sequelize, modelName: "ColumnSegment", tableName: "column_segments" },
  );
  Layout.init(
    {
      releaseId: { type: DataTypes.UUID, primaryKey: true },
      part: { type: DataTypes.STRING(20), primaryKey: true },
      bytes: { type: DataTypes.BLOB("long"), allowNull: false },
      checksum: { type: DataTypes.STRING(64), allowNull: false },
    },
    { sequelize, modelName: "Layout", tableName: "layouts" },
  );
}
