import { Sequelize } from "sequelize";
import { defineModels } from "@server/models";
import { exactNumbers } from "./conversions";

export type Database = Sequelize;

/**
 * Opens the pool and binds every model to it. One process works on one database.
 * Errors of the connection surface with the first query.
 */
export function connectDatabase(url: string, options: { poolSize?: number } = {}): Database {
  const database = new Sequelize(url, {
    dialect: "mariadb",
    logging: false,
    timezone: "+00:00",
    dialectOptions: { ...exactNumbers },
    define: { underscored: true, charset: "utf8mb4", collate: "utf8mb4_unicode_ci" },
    pool: { max: options.poolSize ?? 10, min: 0, acquire: 15_000, idle: 10_000 },
  });
  defineModels(database);
  return database;
}
