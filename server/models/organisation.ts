import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn } from "./columns";

/** Whoever the work is done for: every row of the product belongs to one. */
export class Organisation extends Model<
  InferAttributes<Organisation>,
  InferCreationAttributes<Organisation>
> {
  declare id: CreationOptional<string>;
  declare name: string;
  declare isDemo: CreationOptional<boolean>;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    Organisation.init(
      {
        id: idColumn,
        name: { type: DataTypes.STRING(120), allowNull: false },
        isDemo: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
        createdAt: instantColumn,
      },
      { sequelize, tableName: "organisation", timestamps: false },
    );
  }
}
