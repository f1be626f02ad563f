import type { QueryInterface } from "sequelize";

/*
 * What the shape of a load is judged by: when people are in, and what a loop's pump has to lift.
 *
 * Hours nobody has set are NULL, so that they can be shown as assumed. A pump's curve may be missing
 * while its least flow is known. A price is DECIMAL: money is never a binary fraction.
 */
const steps = [
  `ALTER TABLE site
    ADD COLUMN IF NOT EXISTS occupied_weekdays SMALLINT UNSIGNED NULL,
    ADD COLUMN IF NOT EXISTS occupied_start_minute SMALLINT UNSIGNED NULL,
    ADD COLUMN IF NOT EXISTS occupied_end_minute SMALLINT UNSIGNED NULL`,
  `CREATE TABLE IF NOT EXISTS loop_pump (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    loop_id BIGINT UNSIGNED NOT NULL,
    controlled_head BOOLEAN NOT NULL,
    static_head_m DOUBLE NULL,
    design_head_m DOUBLE NULL,
    design_flow_m3_per_hour DOUBLE NULL,
    efficiency DOUBLE NULL,
    minimum_flow_m3_per_hour DOUBLE NULL,
    price_per_kwh DECIMAL(12,6) NULL,
    UNIQUE KEY loop_pump_of_loop (loop_id),
    KEY loop_pump_of_organisation (organisation_id),
    CONSTRAINT loop_pump_loop FOREIGN KEY (loop_id) REFERENCES \`loop\` (id) ON DELETE CASCADE
  )`,
];

export const occupiedHours = {
  name: "006-occupied-hours",
  async up(schema: QueryInterface): Promise<void> {
    for (const step of steps) await schema.sequelize.query(step);
  },
};
