import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from "sequelize";
import { instrumentKind, type InstrumentKind } from "@shared/contracts/evidence";
import type { ProbeClass } from "@shared/domain/uncertainty/point-evidence";
import { idColumn, instantColumn, optionalInstant, reference } from "./columns";

const optionalText = (length: number) =>
  ({ type: DataTypes.STRING(length), allowNull: true, defaultValue: null }) as const;

/** One instrument of the kit or one that stays on a pipe, by the serial on its plate. */
export class Instrument extends Model<
  InferAttributes<Instrument>,
  InferCreationAttributes<Instrument>
> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare kind: InstrumentKind;
  /** Unique within its kind among the instruments in use. */
  declare serial: string;
  /** What people here call it, such as FM-05. */
  declare label: CreationOptional<string | null>;
  declare make: CreationOptional<string | null>;
  declare measuringRange: CreationOptional<string | null>;
  /** IEC 60751 class; probes only. */
  declare probeClass: CreationOptional<ProbeClass | null>;
  /** Why it must not be used; null while it may. */
  declare outOfService: CreationOptional<string | null>;
  declare notes: CreationOptional<string | null>;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    Instrument.init(
      {
        id: idColumn,
        organisationId: reference,
        kind: { type: DataTypes.ENUM(...instrumentKind.options), allowNull: false },
        serial: { type: DataTypes.STRING(60), allowNull: false },
        label: optionalText(40),
        make: optionalText(120),
        measuringRange: optionalText(80),
        probeClass: {
          type: DataTypes.ENUM("AA", "A", "B"),
          allowNull: true,
          defaultValue: null,
        },
        outOfService: optionalText(200),
        notes: optionalText(2000),
        archivedAt: optionalInstant,
        createdAt: instantColumn,
      },
      { sequelize, tableName: "instrument", timestamps: false },
    );
  }
}
