import { DataTypes } from "sequelize";

/** Column definitions every table shares. Ids are BIGINT and reach TypeScript as text. */
export const idColumn = {
  type: DataTypes.BIGINT.UNSIGNED,
  primaryKey: true,
  autoIncrement: true,
} as const;

export const reference = { type: DataTypes.BIGINT.UNSIGNED, allowNull: false } as const;
export const optionalReference = { type: DataTypes.BIGINT.UNSIGNED, allowNull: true } as const;
export const instantColumn = { type: DataTypes.DATE(3), allowNull: false } as const;
export const optionalInstant = { type: DataTypes.DATE(3), allowNull: true } as const;
export const secretHashColumn = { type: DataTypes.CHAR(64), allowNull: false } as const;
