import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import type { Pipe } from "@shared/contracts/places";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";

const millimetres = { type: DataTypes.DOUBLE, allowNull: false } as const;

/**
 * What was known of a point's pipe from `validFrom` until `validTo`; null is until now. Versions of
 * a point never overlap, and the dimensions are written out even where a standard table gave them.
 */
export class BoreVersion extends Model<
  InferAttributes<BoreVersion>,
  InferCreationAttributes<BoreVersion>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare pointId: string;
  declare validFrom: Date;
  declare validTo: CreationOptional<Date | null>;
  declare kind: Pipe["kind"];
  declare tableId: CreationOptional<string | null>;
  declare dn: CreationOptional<number | null>;
  declare outsideDiameterMm: number;
  declare wallMm: number;
  declare liningMm: number;
  declare insideDiameterMm: number;
  declare material: CreationOptional<string | null>;
  declare accountId: CreationOptional<string | null>;

  static define(sequelize: Sequelize): void {
    BoreVersion.init(
      {
        id: idColumn,
        organisationId: reference,
        pointId: reference,
        validFrom: instantColumn,
        validTo: optionalInstant,
        kind: { type: DataTypes.ENUM("table", "measured"), allowNull: false },
        tableId: { type: DataTypes.STRING(60), allowNull: true, defaultValue: null },
        dn: { type: DataTypes.DOUBLE, allowNull: true, defaultValue: null },
        outsideDiameterMm: millimetres,
        wallMm: millimetres,
        liningMm: millimetres,
        insideDiameterMm: millimetres,
        material: { type: DataTypes.STRING(60), allowNull: true, defaultValue: null },
        accountId: optionalReference,
      },
      { sequelize, tableName: "bore_version", timestamps: false },
    );
  }

  get pipe(): NonAttribute<Pipe> {
    const { kind, tableId, dn, outsideDiameterMm, wallMm, liningMm, material } = this;
    if (kind === "measured") return { kind, outsideDiameterMm, wallMm, liningMm, material };
    if (tableId === null || dn === null)
      throw new Error(`bore version ${this.id} names no table or size`);
    return { kind, tableId, dn };
  }
}
