import type { QueryInterface } from "sequelize";

const changes = [
  // Power and counters of permanent meters: time without water's own figures, and power of the
  // wrong sign for the loop's service.
  `ALTER TABLE interval_energy
     ADD COLUMN IF NOT EXISTS meter_only_s FLOAT NULL,
     ADD COLUMN IF NOT EXISTS against_rows MEDIUMINT UNSIGNED NULL`,
  `ALTER TABLE day_energy
     ADD COLUMN IF NOT EXISTS meter_only_s DOUBLE NOT NULL DEFAULT 0,
     ADD COLUMN IF NOT EXISTS against_rows INT UNSIGNED NOT NULL DEFAULT 0`,
  `ALTER TABLE point_readings
     ADD COLUMN IF NOT EXISTS means_only BOOLEAN NOT NULL DEFAULT FALSE,
     ADD COLUMN IF NOT EXISTS against_rows INT UNSIGNED NOT NULL DEFAULT 0`,
  `ALTER TABLE metering_point
     ADD COLUMN IF NOT EXISTS gap_rule ENUM('survey','billing') NOT NULL DEFAULT 'survey'`,
];

/** Kinds of series beside flow and temperatures, and the point's rule for what a gap is. */
export const seriesKinds = {
  name: "005-series-kinds",
  async up(schema: QueryInterface): Promise<void> {
    for (const change of changes) await schema.sequelize.query(change);
  },
};
