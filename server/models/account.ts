import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn } from "./columns";

/** A person with a password. What they may do is said by their membership, not here. */
export class Account extends Model<InferAttributes<Account>, InferCreationAttributes<Account>> {
  declare id: CreationOptional<string>;
  declare email: string;
  declare name: string;
  declare passwordHash: string;
  declare language: CreationOptional<"en" | "de">;
  declare unitSystem: CreationOptional<"si" | "inchPound" | null>;
  declare isDemo: CreationOptional<boolean>;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    Account.init(
      {
        id: idColumn,
        email: { type: DataTypes.STRING(254), allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        passwordHash: { type: DataTypes.CHAR(60), allowNull: false },
        language: { type: DataTypes.ENUM("en", "de"), allowNull: false, defaultValue: "en" },
        unitSystem: { type: DataTypes.ENUM("si", "inchPound"), allowNull: true },
        isDemo: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
        createdAt: instantColumn,
      },
      { sequelize, tableName: "account", timestamps: false },
    );
  }
}
