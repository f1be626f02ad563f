import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import type { z } from "zod";
import { gapRule, meterSide, pointRole } from "@shared/contracts/places";
import { idColumn, instantColumn, optionalInstant, optionalReference, reference } from "./columns";

/** A place on a loop where flow and both temperatures are measured. */
export class MeteringPoint extends Model<
  InferAttributes<MeteringPoint>,
  InferCreationAttributes<MeteringPoint>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare loopId: string;
  declare parentPointId: CreationOptional<string | null>;
  /** As printed on the pipe; unique among the loop's points in use. */
  declare code: string;
  declare name: string;
  declare role: z.infer<typeof pointRole>;
  /** Which pipe the flow meter sits on: the water's density is taken at that side. */
  declare meterSide: z.infer<typeof meterSide>;
  /** What counts as a gap between its readings; the energy's rule, never that of what is stored. */
  declare gapRule: CreationOptional<z.infer<typeof gapRule>>;
  declare notes: CreationOptional<string | null>;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    MeteringPoint.init(
      {
        id: idColumn,
        organisationId: reference,
        loopId: reference,
        parentPointId: optionalReference,
        code: { type: DataTypes.STRING(40), allowNull: false },
        name: { type: DataTypes.STRING(120), allowNull: false },
        role: { type: DataTypes.ENUM(...pointRole.options), allowNull: false },
        meterSide: { type: DataTypes.ENUM(...meterSide.options), allowNull: false },
        gapRule: {
          type: DataTypes.ENUM(...gapRule.options),
          allowNull: false,
          defaultValue: "survey",
        },
        notes: { type: DataTypes.STRING(2000), allowNull: true, defaultValue: null },
        archivedAt: optionalInstant,
        createdAt: instantColumn,
      },
      { sequelize, tableName: "metering_point", timestamps: false },
    );
  }
}
