import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalInstant, reference } from "./columns";

/** A building of a site: where loops end up on the site page. */
export class Building extends Model<InferAttributes<Building>, InferCreationAttributes<Building>> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare siteId: string;
  declare name: string;
  declare note: CreationOptional<string | null>;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    Building.init(
      {
        id: idColumn,
        organisationId: reference,
        siteId: reference,
        name: { type: DataTypes.STRING(120), allowNull: false },
        note: { type: DataTypes.STRING(200), allowNull: true, defaultValue: null },
        archivedAt: optionalInstant,
        createdAt: instantColumn,
      },
      { sequelize, tableName: "building", timestamps: false },
    );
  }
}
