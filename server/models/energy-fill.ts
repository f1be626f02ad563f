import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { fillMethod, type Fill } from "@shared/contracts/corrections";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";
import { jsonColumn } from "./json-column";

const figure = { type: DataTypes.DOUBLE, allowNull: false } as const;
const optionalName = { type: DataTypes.STRING(120), allowNull: true, defaultValue: null } as const;

/** A proposal for time that readings do not cover. Its quarter-hours are rows of their own. */
export class EnergyFill extends Model<
  InferAttributes<EnergyFill>,
  InferCreationAttributes<EnergyFill>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare pointId: string;
  /** UTC milliseconds on quarter-hours, half-open. BIGINT, so text when read. */
  declare fromMs: number | string;
  declare toMs: number | string;
  declare method: Fill["method"];
  declare otherPointId: CreationOptional<string | null>;
  declare reason: string;
  declare heatingKwh: number;
  declare coolingKwh: number;
  declare volumeM3: CreationOptional<number | null>;
  declare filledS: number;
  declare uncertaintyPercent: number;
  declare days: readonly string[];
  declare state: Fill["state"];
  declare createdAt: Date;
  declare createdByAccountId: CreationOptional<string | null>;
  declare createdByName: string;
  declare approvedAt: CreationOptional<Date | null>;
  declare approvedByName: CreationOptional<string | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawnByName: CreationOptional<string | null>;

  static define(sequelize: Sequelize): void {
    EnergyFill.init(
      {
        id: idColumn,
        organisationId: reference,
        pointId: reference,
        fromMs: { type: DataTypes.BIGINT, allowNull: false },
        toMs: { type: DataTypes.BIGINT, allowNull: false },
        method: { type: DataTypes.ENUM(...fillMethod.options), allowNull: false },
        otherPointId: optionalReference,
        reason: { type: DataTypes.STRING(300), allowNull: false },
        heatingKwh: figure,
        coolingKwh: figure,
        volumeM3: { type: DataTypes.DOUBLE, allowNull: true, defaultValue: null },
        filledS: figure,
        uncertaintyPercent: figure,
        days: jsonColumn("days"),
        state: { type: DataTypes.ENUM("proposed", "approved", "withdrawn"), allowNull: false },
        createdAt: instantColumn,
        createdByAccountId: optionalReference,
        createdByName: { type: DataTypes.STRING(120), allowNull: false },
        approvedAt: optionalInstant,
        approvedByName: optionalName,
        withdrawnAt: optionalInstant,
        withdrawnByName: optionalName,
      },
      { sequelize, tableName: "energy_fill", timestamps: false },
    );
  }
}
