import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalReference, reference } from "./columns";

/** Many files of a site, all read by one recipe. */
export class ImportBatch extends Model<
  InferAttributes<ImportBatch>,
  InferCreationAttributes<ImportBatch>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare siteId: string;
  /** Null once the recipe is deleted; its name stays. */
  declare recipeId: string | null;
  declare recipeName: string;
  declare createdByAccountId: string | null;
  declare createdByName: string;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    ImportBatch.init(
      {
        id: idColumn,
        organisationId: reference,
        siteId: reference,
        recipeId: optionalReference,
        recipeName: { type: DataTypes.STRING(120), allowNull: false },
        createdByAccountId: optionalReference,
        createdByName: { type: DataTypes.STRING(120), allowNull: false },
        createdAt: instantColumn,
      },
      { sequelize, tableName: "import_batch", timestamps: false },
    );
  }
}
