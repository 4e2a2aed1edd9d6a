import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type { Role } from "../../shared/roles.ts";

/** Someone with an account. Deactivated people stay, since the ledger and releases name them. */
export class Person extends Model<InferAttributes<Person>, InferCreationAttributes<Person>> {
  declare id: string;
  declare name: string;
  /** Lower case; unique. */
  declare email: string;
  /** Null until the person has chosen a password through a one-time link. */
  declare passwordHash: CreationOptional<string | null>;
  declare isActive: CreationOptional<boolean>;
  declare lastSignInAt: CreationOptional<Date | null>;
  declare createdAt: Date;
  /** Loaded with `include: "roleRows"`. */
  declare roleRows?: NonAttribute<PersonRole[]>;

  get roles(): NonAttribute<Role[]> {
    if (!this.roleRows) throw new Error("Load a person's roleRows before asking for roles.");
    return this.roleRows.map((row) => row.role);
  }
}

/** One role of one person. */
export class PersonRole extends Model<InferAttributes<PersonRole>, InferCreationAttributes<PersonRole>> {
  declare personId: string;
  declare role: Role;
}

/** A one-time link; only its SHA-256 is kept. A person has at most one. */
export class SignInLink extends Model<InferAttributes<SignInLink>, InferCreationAttributes<SignInLink>> {
  declare tokenHash: string;
  declare personId: string;
  declare expiresAt: Date;
  declare createdAt: Date;
}

/** A signed-in browser; the table of the session store, with whose session it is. */
export class SessionRow extends Model<InferAttributes<SessionRow>, InferCreationAttributes<SessionRow>> {
  declare sid: string;
  declare expires: Date | null;
  declare data: string | null;
  declare personId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

/** Registers people, roles, links and sessions. */
export function initialisePersonModels(sequelize: Sequelize): void {
  Person.init(
    {
      id: { type: DataTypes.UUID, primaryKey: true },
      name: { type: DataTypes.STRING(120), allowNull: false },
      email: { type: DataTypes.STRING(254), allowNull: false },
      passwordHash: DataTypes.STRING(255),
      isActive: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: true },
      lastSignInAt: DataTypes.DATE(3),
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
    },
    { sequelize, modelName: "Person", tableName: "people" },
  );
  PersonRole.init(
    { personId: { type: DataTypes.UUID, primaryKey: true }, role: { type: DataTypes.STRING(20), primaryKey: true } },
    { sequelize, modelName: "PersonRole", tableName: "person_roles" },
  );
  SignInLink.init(
    {
      tokenHash: { type: DataTypes.STRING(64), primaryKey: true },
      personId: { type: DataTypes.UUID, allowNull: false },
      expiresAt: { type: DataTypes.DATE(3), allowNull: false },
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
    },
    { sequelize, modelName: "SignInLink", tableName: "sign_in_links" },
  );
  SessionRow.init(
    {
      sid: { type: DataTypes.STRING(128), primaryKey: true },
      expires: DataTypes.DATE(3),
      data: DataTypes.TEXT,
      personId: DataTypes.UUID,
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), allowNull: false },
    },
    { sequelize, modelName: "SessionRow", tableName: "sessions", timestamps: true, underscored: true },
  );
  Person.hasMany(PersonRole, { as: "roleRows", foreignKey: "personId" });
  SignInLink.belongsTo(Person, { as: "person", foreignKey: "personId" });
}
