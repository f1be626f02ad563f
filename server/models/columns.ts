import { DataTypes } from "sequelize";

/** Column definitions every table shares. Ids are BIGINT and reach TypeScript as text. */
export const idColumn = {
  type: DataTypes.BIGINT.UNSIGNED,
  primaryKey: true,
  autoIncrement: true,
} as const;

export const reference = { type: DataTypes.BIGINT.UNSIGNED, allowNull: false } as const;
/** `defaultValue` makes a row just created say null as one read back does, not undefined. */
const optional = { allowNull: true, defaultValue: null } as const;
export const optionalReference = { type: DataTypes.BIGINT.UNSIGNED, ...optional } as const;
export const instantColumn = { type: DataTypes.DATE(3), allowNull: false } as const;
export const optionalInstant = { type: DataTypes.DATE(3), ...optional } as const;
export const secretHashColumn = { type: DataTypes.CHAR(64), allowNull: false } as const;
