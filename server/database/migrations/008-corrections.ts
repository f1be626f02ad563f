import type { QueryInterface } from "sequelize";
import { addJobKind } from "./add-job-kind";

/*
 * A correction is kept as the document the contract's schema reads; what queries ask of it has columns
 * of its own. A probe's offset names no point: the points it touches follow from where installations
 * say the probe sat, so that a corrected installation moves it along.
 *
 * A fill's quarter-hours stand apart from interval_energy, so that no measured figure can contain one.
 *
 * An energy result is a photograph of a point's energy: what it came from and its days, gzip where
 * that is worth it. Rows are only ever added.
 */
const tables = [
  `CREATE TABLE IF NOT EXISTS correction (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    proposed_at_point_id BIGINT UNSIGNED NOT NULL,
    point_id BIGINT UNSIGNED NULL,
    probe_id BIGINT UNSIGNED NULL,
    log_file_id BIGINT UNSIGNED NULL,
    kind ENUM('exclude','clock','probeOffset','swapSides','flipFlow','scaleByBore','unit','fluid') NOT NULL,
    document LONGTEXT NOT NULL,
    reason VARCHAR(300) NOT NULL,
    state ENUM('working','proposed','applied','withdrawn','failed') NOT NULL,
    effect LONGTEXT NULL,
    failure LONGTEXT NULL,
    created_at DATETIME(3) NOT NULL,
    created_by_account_id BIGINT UNSIGNED NULL,
    created_by_name VARCHAR(120) NOT NULL,
    applied_at DATETIME(3) NULL,
    applied_by_name VARCHAR(120) NULL,
    withdrawn_at DATETIME(3) NULL,
    withdrawn_by_name VARCHAR(120) NULL,
    withdrawn_reason VARCHAR(300) NULL,
    KEY correction_of_point (point_id, state),
    KEY correction_of_probe (probe_id, state),
    KEY correction_of_organisation (organisation_id, id),
    CONSTRAINT correction_point FOREIGN KEY (proposed_at_point_id) REFERENCES metering_point (id)
  )`,
  `CREATE TABLE IF NOT EXISTS energy_fill (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    point_id BIGINT UNSIGNED NOT NULL,
    from_ms BIGINT NOT NULL,
    to_ms BIGINT NOT NULL,
    method ENUM('interpolation','likeDays','otherPoint') NOT NULL,
    other_point_id BIGINT UNSIGNED NULL,
    reason VARCHAR(300) NOT NULL,
    heating_kwh DOUBLE NOT NULL,
    cooling_kwh DOUBLE NOT NULL,
    volume_m3 DOUBLE NULL,
    filled_s DOUBLE NOT NULL,
    uncertainty_percent DOUBLE NOT NULL,
    days LONGTEXT NOT NULL,
    state ENUM('proposed','approved','withdrawn') NOT NULL,
    created_at DATETIME(3) NOT NULL,
    created_by_account_id BIGINT UNSIGNED NULL,
    created_by_name VARCHAR(120) NOT NULL,
    approved_at DATETIME(3) NULL,
    approved_by_name VARCHAR(120) NULL,
    withdrawn_at DATETIME(3) NULL,
    withdrawn_by_name VARCHAR(120) NULL,
    KEY energy_fill_of_point (point_id, state, from_ms),
    KEY energy_fill_of_organisation (organisation_id, id),
    CONSTRAINT energy_fill_point FOREIGN KEY (point_id) REFERENCES metering_point (id)
  )`,
  `CREATE TABLE IF NOT EXISTS energy_fill_interval (
    fill_id BIGINT UNSIGNED NOT NULL,
    start_s INT UNSIGNED NOT NULL,
    filled_s DOUBLE NOT NULL,
    heating_kwh DOUBLE NOT NULL,
    cooling_kwh DOUBLE NOT NULL,
    volume_m3 DOUBLE NULL,
    PRIMARY KEY (fill_id, start_s),
    CONSTRAINT energy_fill_interval_fill FOREIGN KEY (fill_id) REFERENCES energy_fill (id)
  )`,
  `CREATE TABLE IF NOT EXISTS energy_result (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    point_id BIGINT UNSIGNED NOT NULL,
    revision INT UNSIGNED NOT NULL,
    calculated_at DATETIME(3) NOT NULL,
    cause ENUM('import','undo','correction','withdrawal','pointChanged','loopChanged','engineChanged','other') NOT NULL,
    engine_version TINYINT UNSIGNED NOT NULL,
    inputs LONGTEXT NOT NULL,
    heating_kwh DOUBLE NULL,
    cooling_kwh DOUBLE NULL,
    days_format ENUM('json','gzip') NOT NULL,
    days MEDIUMBLOB NOT NULL,
    UNIQUE KEY energy_result_revision (point_id, revision),
    KEY energy_result_of_organisation (organisation_id, id),
    CONSTRAINT energy_result_point FOREIGN KEY (point_id) REFERENCES metering_point (id)
  )`,
  "ALTER TABLE job ADD COLUMN IF NOT EXISTS correction_id BIGINT UNSIGNED NULL",
];

/** Corrections of readings, fills of their gaps, and every result a point's energy has had. */
export const corrections = {
  name: "008-corrections",
  async up(schema: QueryInterface): Promise<void> {
    for (const table of tables) await schema.sequelize.query(table);
    await addJobKind(schema, "correction");
  },
};
