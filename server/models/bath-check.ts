import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";
import { jsonColumn } from "./json-column";

export interface BathReading {
  readonly firstC: number;
  readonly secondC: number;
}

/** Both probes of a pair in one bath at one time; a check that another replaces stays readable. */
export class BathCheck extends Model<
  InferAttributes<BathCheck>,
  InferCreationAttributes<BathCheck>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare firstProbeId: string;
  declare secondProbeId: string;
  /** Calendar day, YYYY-MM-DD. */
  declare checkedOn: string;
  /** Standard uncertainty the bath itself leaves, K. */
  declare bathUncertaintyK: number;
  declare readings: readonly BathReading[];
  declare notes: CreationOptional<string | null>;
  declare supersedesId: CreationOptional<string | null>;
  declare supersededAt: CreationOptional<Date | null>;
  declare recordedAt: Date;
  declare recordedByAccountId: CreationOptional<string | null>;
  /** Kept as text: the check outlives the account. */
  declare recordedByName: string;

  static define(sequelize: Sequelize): void {
    BathCheck.init(
      {
        id: idColumn,
        organisationId: reference,
        firstProbeId: reference,
        secondProbeId: reference,
        checkedOn: { type: DataTypes.DATEONLY, allowNull: false },
        bathUncertaintyK: { type: DataTypes.DOUBLE, allowNull: false, field: "bath_uncertainty_k" },
        readings: jsonColumn("readings"),
        notes: { type: DataTypes.STRING(2000), allowNull: true, defaultValue: null },
        supersedesId: optionalReference,
        supersededAt: optionalInstant,
        recordedAt: instantColumn,
        recordedByAccountId: optionalReference,
        recordedByName: { type: DataTypes.STRING(120), allowNull: false },
      },
      { sequelize, tableName: "bath_check", timestamps: false },
    );
  }
}
