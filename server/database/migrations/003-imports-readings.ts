import type { QueryInterface } from "sequelize";

/*
 * Readings are kept as one packed block per file, point and UTC day, energy as a narrow row per
 * quarter-hour and a full row per local day. The narrow row is what a year of charts reads, so it
 * holds energy as doubles, the rest as floats, and leaves NULL what is the usual: a
 * register that did not run, an interval that is covered whole, no excluded row. The exact rules
 * are in server/readings/interval-rows.ts, its only reader and writer.
 *
 * `start_s` counts UTC seconds since 1970: a third of the space of a DATETIME key and no parsing.
 */
const registerOfInterval = (name: string) => `
    ${name}_kwh DOUBLE NULL,
    ${name}_m3 FLOAT NULL,
    ${name}_flow_dt FLOAT NULL,
    ${name}_power_dt FLOAT NULL,
    ${name}_dt FLOAT NULL,
    ${name}_s FLOAT NULL,`;

const registerOfDay = (name: string) => `
    ${name}_kwh DOUBLE NOT NULL,
    ${name}_m3 DOUBLE NOT NULL,
    ${name}_flow_dt DOUBLE NOT NULL,
    ${name}_power_dt DOUBLE NOT NULL,
    ${name}_dt DOUBLE NOT NULL,
    ${name}_s DOUBLE NOT NULL,`;

const tables = [
  `CREATE TABLE IF NOT EXISTS log_import (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    point_id BIGINT UNSIGNED NOT NULL,
    state ENUM('open','reading','asking','checking','ready','importing','imported','undone','failed','cancelled') NOT NULL,
    revision INT UNSIGNED NOT NULL DEFAULT 1,
    repair LONGTEXT NOT NULL,
    checks LONGTEXT NULL,
    failure LONGTEXT NULL,
    rows_stored INT UNSIGNED NULL,
    first_instant DATETIME(3) NULL,
    last_instant DATETIME(3) NULL,
    created_by_account_id BIGINT UNSIGNED NULL,
    created_by_name VARCHAR(120) NOT NULL,
    created_at DATETIME(3) NOT NULL,
    imported_at DATETIME(3) NULL,
    KEY log_import_of_organisation (organisation_id, id),
    KEY log_import_of_point (point_id, state, id),
    CONSTRAINT log_import_point FOREIGN KEY (point_id) REFERENCES metering_point (id)
  )`,
  `CREATE TABLE IF NOT EXISTS log_file (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    import_id BIGINT UNSIGNED NOT NULL,
    point_id BIGINT UNSIGNED NOT NULL,
    name VARCHAR(255) NOT NULL,
    sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    byte_length BIGINT UNSIGNED NOT NULL,
    uploaded_at DATETIME(3) NOT NULL,
    recognition LONGTEXT NULL,
    unreadable LONGTEXT NULL,
    recipe LONGTEXT NULL,
    questions LONGTEXT NULL,
    precedence INT NULL,
    series_kind ENUM('instantaneous','meanFromLabel','meanToLabel') NULL,
    nominal_step_ms DOUBLE NULL,
    KEY log_file_of_import (import_id, id),
    KEY log_file_of_point (point_id, sha256),
    KEY log_file_of_organisation (organisation_id),
    CONSTRAINT log_file_import FOREIGN KEY (import_id) REFERENCES log_import (id)
  )`,
  `CREATE TABLE IF NOT EXISTS reading_block (
    point_id BIGINT UNSIGNED NOT NULL,
    day DATE NOT NULL,
    channel_set TINYINT UNSIGNED NOT NULL,
    log_file_id BIGINT UNSIGNED NOT NULL,
    organisation_id BIGINT UNSIGNED NOT NULL,
    row_count INT UNSIGNED NOT NULL,
    first_ms BIGINT NOT NULL,
    last_ms BIGINT NOT NULL,
    format TINYINT UNSIGNED NOT NULL,
    data MEDIUMBLOB NOT NULL,
    PRIMARY KEY (point_id, day, channel_set, log_file_id),
    KEY reading_block_of_file (log_file_id),
    CONSTRAINT reading_block_file FOREIGN KEY (log_file_id) REFERENCES log_file (id)
  )`,
  `CREATE TABLE IF NOT EXISTS interval_energy (
    point_id BIGINT UNSIGNED NOT NULL,
    start_s INT UNSIGNED NOT NULL,
    covered_s FLOAT NULL,${registerOfInterval("heating")}${registerOfInterval("cooling")}
    volume_m3 FLOAT NULL,
    suppressed_kwh FLOAT NULL,
    suppressed_s FLOAT NULL,
    min_power_kw FLOAT NULL,
    max_power_kw FLOAT NULL,
    min_flow FLOAT NULL,
    max_flow FLOAT NULL,
    supply_c FLOAT NULL,
    return_c FLOAT NULL,
    measured_rows MEDIUMINT UNSIGNED NULL,
    excluded_rows MEDIUMINT UNSIGNED NULL,
    no_reading_rows MEDIUMINT UNSIGNED NULL,
    apportioned TINYINT UNSIGNED NULL,
    engine_version TINYINT UNSIGNED NOT NULL,
    PRIMARY KEY (point_id, start_s)
  )`,
  `CREATE TABLE IF NOT EXISTS day_energy (
    point_id BIGINT UNSIGNED NOT NULL,
    local_date DATE NOT NULL,
    organisation_id BIGINT UNSIGNED NOT NULL,
    start_ms BIGINT NOT NULL,
    length_s DOUBLE NOT NULL,
    covered_s DOUBLE NOT NULL,${registerOfDay("heating")}${registerOfDay("cooling")}
    volume_m3 DOUBLE NOT NULL,
    suppressed_kwh DOUBLE NOT NULL,
    suppressed_s DOUBLE NOT NULL,
    min_power_kw DOUBLE NULL,
    max_power_kw DOUBLE NULL,
    min_flow DOUBLE NULL,
    max_flow DOUBLE NULL,
    supply_cs DOUBLE NOT NULL,
    return_cs DOUBLE NOT NULL,
    measured_rows INT UNSIGNED NOT NULL,
    excluded_rows INT UNSIGNED NOT NULL,
    no_reading_rows INT UNSIGNED NOT NULL,
    outside_water_rows INT UNSIGNED NOT NULL,
    apportioned BOOLEAN NOT NULL,
    engine_version TINYINT UNSIGNED NOT NULL,
    PRIMARY KEY (point_id, local_date),
    KEY day_energy_of_organisation (organisation_id, local_date)
  )`,
  `CREATE TABLE IF NOT EXISTS point_readings (
    point_id BIGINT UNSIGNED NOT NULL PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    revision INT UNSIGNED NOT NULL,
    zone VARCHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    row_count INT UNSIGNED NOT NULL,
    first_ms BIGINT NULL,
    last_ms BIGINT NULL,
    nominal_step_ms DOUBLE NULL,
    blocked_by ENUM('glycol','noTemperature','noFlow','outsideWater') NULL,
    outside_water_rows INT UNSIGNED NOT NULL DEFAULT 0,
    engine_version TINYINT UNSIGNED NOT NULL,
    calculated_at DATETIME(3) NOT NULL,
    KEY point_readings_of_organisation (organisation_id),
    CONSTRAINT point_readings_point FOREIGN KEY (point_id) REFERENCES metering_point (id)
  )`,
  `CREATE TABLE IF NOT EXISTS job (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    kind ENUM('recognise','check','import','undo','recalculate') NOT NULL,
    state ENUM('queued','running','done','failed','cancelled') NOT NULL,
    point_id BIGINT UNSIGNED NOT NULL,
    import_id BIGINT UNSIGNED NULL,
    log_file_id BIGINT UNSIGNED NULL,
    revision INT UNSIGNED NULL,
    waiting_key VARCHAR(60) CHARACTER SET ascii COLLATE ascii_bin NULL,
    failures TINYINT UNSIGNED NOT NULL DEFAULT 0,
    interruptions TINYINT UNSIGNED NOT NULL DEFAULT 0,
    lease_owner VARCHAR(160) NULL,
    lease_until DATETIME(3) NULL,
    run_after DATETIME(3) NOT NULL,
    progress LONGTEXT NULL,
    failure LONGTEXT NULL,
    created_at DATETIME(3) NOT NULL,
    started_at DATETIME(3) NULL,
    finished_at DATETIME(3) NULL,
    UNIQUE KEY job_waiting (waiting_key),
    KEY job_to_claim (state, run_after),
    KEY job_of_import (import_id, id),
    KEY job_of_point (point_id, state),
    KEY job_of_organisation (organisation_id, started_at)
  )`,
];

/** Imports with their files, readings, the energy worked out from them, and the jobs that do it. */
export const importsAndReadings = {
  name: "003-imports-readings",
  async up(schema: QueryInterface): Promise<void> {
    for (const table of tables) await schema.sequelize.query(table);
  },
};
