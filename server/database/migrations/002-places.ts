import type { QueryInterface } from "sequelize";

/*
 * Names are unique among what is in use: an archived loop gives its tag back, so `live_…` is null
 * for archived rows, and a unique key lets any number of nulls in.
 *
 * A pipe is kept as dated versions with its dimensions written out, because an energy figure must
 * stay explainable after a standard table is corrected or a wall is measured again.
 */
const tables = [
  `CREATE TABLE IF NOT EXISTS site (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    name VARCHAR(120) NOT NULL,
    zone VARCHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    currency CHAR(3) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    unit_system ENUM('si','inchPound') NOT NULL DEFAULT 'si',
    address VARCHAR(300) NULL,
    is_demo BOOLEAN NOT NULL DEFAULT FALSE,
    archived_at DATETIME(3) NULL,
    created_at DATETIME(3) NOT NULL,
    KEY site_of_organisation (organisation_id, name, id),
    CONSTRAINT site_organisation FOREIGN KEY (organisation_id) REFERENCES organisation (id)
  )`,
  `CREATE TABLE IF NOT EXISTS building (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    site_id BIGINT UNSIGNED NOT NULL,
    name VARCHAR(120) NOT NULL,
    note VARCHAR(200) NULL,
    archived_at DATETIME(3) NULL,
    created_at DATETIME(3) NOT NULL,
    live_name VARCHAR(120) AS (IF(archived_at IS NULL, name, NULL)) VIRTUAL,
    UNIQUE KEY building_name (site_id, live_name),
    KEY building_of_organisation (organisation_id),
    CONSTRAINT building_site FOREIGN KEY (site_id) REFERENCES site (id)
  )`,
  `CREATE TABLE IF NOT EXISTS \`loop\` (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    site_id BIGINT UNSIGNED NOT NULL,
    building_id BIGINT UNSIGNED NULL,
    parent_loop_id BIGINT UNSIGNED NULL,
    tag VARCHAR(24) NOT NULL,
    name VARCHAR(120) NOT NULL,
    service ENUM('chilled','hot','changeover') NOT NULL,
    fluid_kind ENUM('water','ethyleneGlycol','propyleneGlycol') NOT NULL DEFAULT 'water',
    glycol_percent DOUBLE NULL,
    glycol_basis ENUM('mass','volume') NULL,
    gauge_pressure_mpa DOUBLE NULL,
    design_flow_m3_per_hour DOUBLE NULL,
    design_delta_t_k DOUBLE NULL,
    flow_cut_off_m3_per_hour DOUBLE NULL,
    delta_t_cut_off_k DOUBLE NULL,
    notes VARCHAR(2000) NULL,
    archived_at DATETIME(3) NULL,
    created_at DATETIME(3) NOT NULL,
    live_tag VARCHAR(24) AS (IF(archived_at IS NULL, tag, NULL)) VIRTUAL,
    UNIQUE KEY loop_tag (site_id, live_tag),
    KEY loop_of_organisation (organisation_id),
    CONSTRAINT loop_site FOREIGN KEY (site_id) REFERENCES site (id),
    CONSTRAINT loop_building FOREIGN KEY (building_id) REFERENCES building (id),
    CONSTRAINT loop_parent FOREIGN KEY (parent_loop_id) REFERENCES \`loop\` (id)
  )`,
  `CREATE TABLE IF NOT EXISTS metering_point (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    loop_id BIGINT UNSIGNED NOT NULL,
    parent_point_id BIGINT UNSIGNED NULL,
    code VARCHAR(40) NOT NULL,
    name VARCHAR(120) NOT NULL,
    role ENUM('main','riser','branch','coil','zone') NOT NULL,
    meter_side ENUM('supply','return') NOT NULL,
    notes VARCHAR(2000) NULL,
    archived_at DATETIME(3) NULL,
    created_at DATETIME(3) NOT NULL,
    live_code VARCHAR(40) AS (IF(archived_at IS NULL, code, NULL)) VIRTUAL,
    UNIQUE KEY metering_point_code (loop_id, live_code),
    KEY metering_point_of_organisation (organisation_id),
    CONSTRAINT metering_point_loop FOREIGN KEY (loop_id) REFERENCES \`loop\` (id),
    CONSTRAINT metering_point_parent FOREIGN KEY (parent_point_id) REFERENCES metering_point (id)
  )`,
  `CREATE TABLE IF NOT EXISTS bore_version (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    point_id BIGINT UNSIGNED NOT NULL,
    valid_from DATETIME(3) NOT NULL,
    valid_to DATETIME(3) NULL,
    kind ENUM('table','measured') NOT NULL,
    table_id VARCHAR(60) NULL,
    dn DOUBLE NULL,
    outside_diameter_mm DOUBLE NOT NULL,
    wall_mm DOUBLE NOT NULL,
    lining_mm DOUBLE NOT NULL,
    inside_diameter_mm DOUBLE NOT NULL,
    material VARCHAR(60) NULL,
    account_id BIGINT UNSIGNED NULL,
    KEY bore_version_of_point (point_id, valid_from),
    KEY bore_version_of_organisation (organisation_id),
    CONSTRAINT bore_version_point FOREIGN KEY (point_id) REFERENCES metering_point (id)
  )`,
];

/** Sites, their buildings and loops, the metering points on them and each point's pipe over time. */
export const places = {
  name: "002-places",
  async up(schema: QueryInterface): Promise<void> {
    for (const table of tables) await schema.sequelize.query(table);
  },
};
