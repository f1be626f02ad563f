import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalInstant, reference } from "./columns";

/** A property with plant of its own. Its zone decides every question about days and hours. */
export class Site extends Model<InferAttributes<Site>, InferCreationAttributes<Site>> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare name: string;
  /** IANA time zone. */
  declare zone: string;
  /** ISO 4217. */
  declare currency: string;
  declare unitSystem: CreationOptional<"si" | "inchPound">;
  declare address: CreationOptional<string | null>;
  declare isDemo: CreationOptional<boolean>;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    Site.init(
      {
        id: idColumn,
        organisationId: reference,
        name: { type: DataTypes.STRING(120), allowNull: false },
        zone: { type: DataTypes.STRING(64), allowNull: false },
        currency: { type: DataTypes.CHAR(3), allowNull: false },
        unitSystem: {
          type: DataTypes.ENUM("si", "inchPound"),
          allowNull: false,
          defaultValue: "si",
        },
        address: { type: DataTypes.STRING(300), allowNull: true, defaultValue: null },
        isDemo: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
        archivedAt: optionalInstant,
        createdAt: instantColumn,
      },
      { sequelize, tableName: "site", timestamps: false },
    );
  }
}
