import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { RecipeRepair } from "@shared/contracts/recipes";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";
import { jsonColumn } from "./json-column";

/** The saved answers about how one logger writes its files. */
export class Recipe extends Model<InferAttributes<Recipe>, InferCreationAttributes<Recipe>> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare name: string;
  /** Of the logger whose file it was saved from; null where the file names none. */
  declare loggerSerial: CreationOptional<string | null>;
  /** SHA-256 of the header's fingerprint: files with the same header have the same. */
  declare fingerprint: string;
  /** Line numbers in it are those of the file it was saved from, and mean nothing for another. */
  declare recipe: FileRecipe;
  declare repair: RecipeRepair;
  /** The whole organisation may use it, or its owner alone. */
  declare shared: boolean;
  declare version: CreationOptional<number>;
  declare createdByAccountId: string | null;
  declare createdByName: string;
  declare createdAt: Date;
  declare lastUsedAt: CreationOptional<Date | null>;

  static define(sequelize: Sequelize): void {
    Recipe.init(
      {
        id: idColumn,
        organisationId: reference,
        name: { type: DataTypes.STRING(120), allowNull: false },
        loggerSerial: { type: DataTypes.STRING(60), allowNull: true, defaultValue: null },
        fingerprint: { type: DataTypes.CHAR(64), allowNull: false },
        recipe: jsonColumn("recipe"),
        repair: jsonColumn("repair"),
        shared: { type: DataTypes.BOOLEAN, allowNull: false },
        version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
        createdByAccountId: optionalReference,
        createdByName: { type: DataTypes.STRING(120), allowNull: false },
        createdAt: instantColumn,
        lastUsedAt: optionalInstant,
      },
      { sequelize, tableName: "recipe", timestamps: false },
    );
  }
}
