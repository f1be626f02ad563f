import type { QueryInterface } from "sequelize";

/** Room for more than eight channels in a block's key: outdoor temperature, electric power, pressure. */
export const companionSeries = {
  name: "011-companion-series",
  async up(schema: QueryInterface): Promise<void> {
    await schema.sequelize.query(
      "ALTER TABLE reading_block MODIFY channel_set SMALLINT UNSIGNED NOT NULL",
    );
  },
};
