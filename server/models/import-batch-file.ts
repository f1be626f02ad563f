import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { BatchFile } from "@shared/contracts/import-batches";
import { idColumn, instantColumn, optionalReference, reference } from "./columns";

/** A file of a batch: what came in, and the import it became once its point was known. */
export class ImportBatchFile extends Model<
  InferAttributes<ImportBatchFile>,
  InferCreationAttributes<ImportBatchFile>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare batchId: string;
  declare importId: CreationOptional<string | null>;
  declare name: string;
  declare sha256: string;
  declare byteLength: number;
  declare uploadedAt: Date;
  declare loggerSerial: CreationOptional<string | null>;
  declare pointBy: CreationOptional<BatchFile["pointBy"]>;
  /** More than one point answers to its serial or its name, so somebody has to say. */
  declare pointAmbiguous: CreationOptional<boolean>;

  static define(sequelize: Sequelize): void {
    ImportBatchFile.init(
      {
        id: idColumn,
        organisationId: reference,
        batchId: reference,
        importId: optionalReference,
        name: { type: DataTypes.STRING(255), allowNull: false },
        sha256: { type: DataTypes.CHAR(64), allowNull: false },
        byteLength: {
          type: DataTypes.BIGINT.UNSIGNED,
          allowNull: false,
          get(this: ImportBatchFile) {
            return Number(this.getDataValue("byteLength"));
          },
        },
        uploadedAt: instantColumn,
        loggerSerial: { type: DataTypes.STRING(60), allowNull: true, defaultValue: null },
        pointBy: {
          type: DataTypes.ENUM("serial", "fileName", "chosen"),
          allowNull: true,
          defaultValue: null,
        },
        pointAmbiguous: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      },
      { sequelize, tableName: "import_batch_file", timestamps: false },
    );
  }
}
