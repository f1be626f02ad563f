import { DataTypes, type Model } from "sequelize";

/*
 * JSON held as text. MariaDB's JSON type is text as well, and the connector hands it over parsed or
 * not depending on the column's type; keeping the text in our own hands makes both the same.
 */
function column(name: string, allowNull: boolean) {
  return {
    type: DataTypes.TEXT("long"),
    allowNull,
    get(this: Model): unknown {
      const value: unknown = this.getDataValue(name);
      return typeof value === "string" ? JSON.parse(value) : (value ?? null);
    },
    set(this: Model, value: unknown): void {
      this.setDataValue(name, value === null ? null : JSON.stringify(value));
    },
  };
}

/** A column whose value is any JSON; `name` is the attribute's. The row's class states its type. */
export const jsonColumn = (name: string) => column(name, false);
export const optionalJson = (name: string) => column(name, true);
