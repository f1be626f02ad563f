import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
  type Sequelize,
} from "sequelize";
import { ASSUMED_OCCUPIED_HOURS, type OccupiedHours } from "@shared/domain/analysis/occupied-hours";
import { idColumn, instantColumn, optionalInstant, reference } from "./columns";

const optionalWhole = {
  type: DataTypes.SMALLINT.UNSIGNED,
  allowNull: true,
  defaultValue: null,
} as const;

/** A property with plant of its own. Its zone decides every question about days and hours. */
export class Site extends Model<InferAttributes<Site>, InferCreationAttributes<Site>> {
  declare id: CreationOptional<string>;
  declare organisationId: string;
  declare name: string;
  /** IANA time zone. */
  declare zone: string;
  /** ISO 4217. */
  declare currency: string;
  declare unitSystem: CreationOptional<"si" | "inchPound">;
  declare address: CreationOptional<string | null>;
  /** Bit 0 is Monday; null, as its hours are, while nobody has set them. */
  declare occupiedWeekdays: CreationOptional<number | null>;
  /** Minutes since local midnight. */
  declare occupiedStartMinute: CreationOptional<number | null>;
  declare occupiedEndMinute: CreationOptional<number | null>;
  declare isDemo: CreationOptional<boolean>;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: Date;

  static define(sequelize: Sequelize): void {
    Site.init(
      {
        id: idColumn,
        organisationId: reference,
        name: { type: DataTypes.STRING(120), allowNull: false },
        zone: { type: DataTypes.STRING(64), allowNull: false },
        currency: { type: DataTypes.CHAR(3), allowNull: false },
        unitSystem: {
          type: DataTypes.ENUM("si", "inchPound"),
          allowNull: false,
          defaultValue: "si",
        },
        address: { type: DataTypes.STRING(300), allowNull: true, defaultValue: null },
        occupiedWeekdays: optionalWhole,
        occupiedStartMinute: optionalWhole,
        occupiedEndMinute: optionalWhole,
        isDemo: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
        archivedAt: optionalInstant,
        createdAt: instantColumn,
      },
      { sequelize, tableName: "site", timestamps: false },
    );
  }

  /** The hours people are in, and whether they are only assumed. */
  get occupied(): NonAttribute<OccupiedHours & { readonly assumed: boolean }> {
    const { occupiedWeekdays: bits, occupiedStartMinute, occupiedEndMinute } = this;
    if (bits === null || occupiedStartMinute === null || occupiedEndMinute === null)
      return { ...ASSUMED_OCCUPIED_HOURS, assumed: true };
    return {
      weekdays: [1, 2, 3, 4, 5, 6, 7].filter((day) => (bits & (1 << (day - 1))) !== 0),
      startMinute: occupiedStartMinute,
      endMinute: occupiedEndMinute,
      assumed: false,
    };
  }
}

/** Occupied hours as the columns that store them; null gives them back to the assumption. */
export function occupiedColumns(hours: OccupiedHours | null) {
  return {
    occupiedWeekdays: hours?.weekdays.reduce((bits, day) => bits | (1 << (day - 1)), 0) ?? null,
    occupiedStartMinute: hours?.startMinute ?? null,
    occupiedEndMinute: hours?.endMinute ?? null,
  };
}
