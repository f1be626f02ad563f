import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type {
  MeterComparisonInput,
  MeterComparisonResult,
} from "@shared/contracts/meter-comparisons";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";
import { jsonColumn } from "./json-column";

/** Two meters over one period, as it was worked out when somebody saved it. */
export class MeterComparison extends Model<
  InferAttributes<MeterComparison>,
  InferCreationAttributes<MeterComparison>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare siteId: string;
  declare title: string;
  declare fromAt: Date;
  declare toAt: Date;
  declare input: MeterComparisonInput;
  declare result: MeterComparisonResult;
  declare supersedesId: CreationOptional<string | null>;
  declare supersededAt: CreationOptional<Date | null>;
  declare recordedAt: Date;
  declare recordedByAccountId: CreationOptional<string | null>;
  /** Kept as text: the comparison outlives the account. */
  declare recordedByName: string;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawnByName: CreationOptional<string | null>;
  declare withdrawnReason: CreationOptional<string | null>;

  static define(sequelize: Sequelize): void {
    MeterComparison.init(
      {
        id: idColumn,
        organisationId: reference,
        siteId: reference,
        title: { type: DataTypes.STRING(120), allowNull: false },
        fromAt: instantColumn,
        toAt: instantColumn,
        input: jsonColumn("input"),
        result: jsonColumn("result"),
        supersedesId: optionalReference,
        supersededAt: optionalInstant,
        recordedAt: instantColumn,
        recordedByAccountId: optionalReference,
        recordedByName: { type: DataTypes.STRING(120), allowNull: false },
        withdrawnAt: optionalInstant,
        withdrawnByName: { type: DataTypes.STRING(120), allowNull: true, defaultValue: null },
        withdrawnReason: { type: DataTypes.STRING(300), allowNull: true, defaultValue: null },
      },
      { sequelize, tableName: "meter_comparison", timestamps: false },
    );
  }

  get state(): NonAttribute<"stands" | "superseded" | "withdrawn"> {
    if (this.withdrawnAt !== null) return "withdrawn";
    return this.supersededAt === null ? "stands" : "superseded";
  }
}
