import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type { ImportChecks } from "@shared/contracts/import-checks";
import { importState, type ImportState } from "@shared/contracts/imports";
import type { RepairChoices } from "@shared/domain/log-files/recipe";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";
import { jsonColumn, optionalJson } from "./json-column";
import { LogFile } from "./log-file";
import { MeteringPoint } from "./metering-point";

/** Why an import or a job ended without a result, for the person who started it. */
export interface Failure {
  readonly code: string;
  readonly detail: string;
  readonly remedy: string;
}

/** One or several logger files of a point on their way to stored readings. */
export class LogImport extends Model<
  InferAttributes<LogImport>,
  InferCreationAttributes<LogImport>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare pointId: string;
  declare state: ImportState;
  /** Grows with every change of files or choices, so that a check of older ones is not taken. */
  declare revision: CreationOptional<number>;
  declare repair: RepairChoices;
  declare checks: CreationOptional<ImportChecks | null>;
  declare failure: CreationOptional<Failure | null>;
  declare rowsStored: CreationOptional<number | null>;
  declare firstInstant: CreationOptional<Date | null>;
  declare lastInstant: CreationOptional<Date | null>;
  declare createdByAccountId: string | null;
  /** Kept as text: the import outlives the account. */
  declare createdByName: string;
  declare createdAt: Date;
  /** Whose the corrections are that were chosen in its checks. */
  declare confirmedByAccountId: CreationOptional<string | null>;
  declare confirmedByName: CreationOptional<string | null>;
  declare undoneByName: CreationOptional<string | null>;
  declare importedAt: CreationOptional<Date | null>;
  /** The batch it came in with; its files are read by the batch's recipe. */
  declare batchId: CreationOptional<string | null>;
  /** Its readings are being taken out so that its choices can change. */
  declare reopenWhenUndone: CreationOptional<boolean>;
  declare files?: NonAttribute<LogFile[]>;
  declare point?: NonAttribute<MeteringPoint>;

  static define(sequelize: Sequelize): void {
    LogImport.init(
      {
        id: idColumn,
        organisationId: reference,
        pointId: reference,
        state: { type: DataTypes.ENUM(...importState.options), allowNull: false },
        revision: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
        repair: jsonColumn("repair"),
        checks: optionalJson("checks"),
        failure: optionalJson("failure"),
        rowsStored: { type: DataTypes.INTEGER.UNSIGNED, allowNull: true },
        firstInstant: optionalInstant,
        lastInstant: optionalInstant,
        createdByAccountId: optionalReference,
        createdByName: { type: DataTypes.STRING(120), allowNull: false },
        createdAt: instantColumn,
        confirmedByAccountId: optionalReference,
        confirmedByName: { type: DataTypes.STRING(120), allowNull: true },
        undoneByName: { type: DataTypes.STRING(120), allowNull: true },
        importedAt: optionalInstant,
        batchId: optionalReference,
        reopenWhenUndone: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      },
      { sequelize, tableName: "log_import", timestamps: false },
    );
  }

  static associate(): void {
    LogImport.hasMany(LogFile, { as: "files", foreignKey: "importId" });
    LogImport.belongsTo(MeteringPoint, { as: "point", foreignKey: "pointId" });
  }
}
