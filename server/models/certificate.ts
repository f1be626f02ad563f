import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { idColumn, instantColumn, optionalInstant, reference } from "./columns";

/** A calibration certificate of an instrument; a wrong one is withdrawn and stays readable. */
export class Certificate extends Model<
  InferAttributes<Certificate>,
  InferCreationAttributes<Certificate>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare instrumentId: string;
  declare number: string;
  declare laboratory: CreationOptional<string | null>;
  declare accredited: CreationOptional<boolean | null>;
  /** Calendar days, YYYY-MM-DD. */
  declare issuedOn: string;
  declare dueOn: CreationOptional<string | null>;
  /** Expanded uncertainty: % of flow for flow meters, K for thermometers, mm for gauges. */
  declare expanded: number;
  declare k: number;
  declare recordedAt: Date;
  declare recordedByName: string;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawnReason: CreationOptional<string | null>;

  static define(sequelize: Sequelize): void {
    Certificate.init(
      {
        id: idColumn,
        organisationId: reference,
        instrumentId: reference,
        number: { type: DataTypes.STRING(80), allowNull: false },
        laboratory: { type: DataTypes.STRING(120), allowNull: true, defaultValue: null },
        accredited: { type: DataTypes.BOOLEAN, allowNull: true, defaultValue: null },
        issuedOn: { type: DataTypes.DATEONLY, allowNull: false },
        dueOn: { type: DataTypes.DATEONLY, allowNull: true, defaultValue: null },
        expanded: { type: DataTypes.DOUBLE, allowNull: false },
        k: { type: DataTypes.DOUBLE, allowNull: false },
        recordedAt: instantColumn,
        recordedByName: { type: DataTypes.STRING(120), allowNull: false },
        withdrawnAt: optionalInstant,
        withdrawnReason: { type: DataTypes.STRING(300), allowNull: true, defaultValue: null },
      },
      { sequelize, tableName: "certificate", timestamps: false },
    );
  }
}
