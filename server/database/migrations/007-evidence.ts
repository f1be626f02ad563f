import type { QueryInterface } from "sequelize";

/*
 * A serial names one instrument of its kind among those in use: an archived one gives it back, so
 * `live_serial` is null for archived rows, and a unique key lets any number of nulls in.
 *
 * Bath checks and installations are superseded, never overwritten: the earlier row stays, with the
 * instant at which it stopped counting. What queries ask of an installation has columns of its own;
 * the rest of it is one document that the contract's schema reads.
 */
const tables = [
  `CREATE TABLE IF NOT EXISTS instrument (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    kind ENUM('flowMeter','probe','logger','permanentMeter','referenceThermometer','thicknessGauge') NOT NULL,
    serial VARCHAR(60) NOT NULL,
    label VARCHAR(40) NULL,
    make VARCHAR(120) NULL,
    measuring_range VARCHAR(80) NULL,
    probe_class ENUM('AA','A','B') NULL,
    out_of_service VARCHAR(200) NULL,
    notes VARCHAR(2000) NULL,
    archived_at DATETIME(3) NULL,
    created_at DATETIME(3) NOT NULL,
    live_serial VARCHAR(60) AS (IF(archived_at IS NULL, serial, NULL)) VIRTUAL,
    UNIQUE KEY instrument_serial (organisation_id, kind, live_serial),
    CONSTRAINT instrument_organisation FOREIGN KEY (organisation_id) REFERENCES organisation (id)
  )`,
  `CREATE TABLE IF NOT EXISTS certificate (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    instrument_id BIGINT UNSIGNED NOT NULL,
    number VARCHAR(80) NOT NULL,
    laboratory VARCHAR(120) NULL,
    accredited BOOLEAN NULL,
    issued_on DATE NOT NULL,
    due_on DATE NULL,
    expanded DOUBLE NOT NULL,
    k DOUBLE NOT NULL,
    recorded_at DATETIME(3) NOT NULL,
    recorded_by_name VARCHAR(120) NOT NULL,
    withdrawn_at DATETIME(3) NULL,
    withdrawn_reason VARCHAR(300) NULL,
    KEY certificate_of_instrument (instrument_id, issued_on),
    KEY certificate_of_organisation (organisation_id),
    CONSTRAINT certificate_instrument FOREIGN KEY (instrument_id) REFERENCES instrument (id)
  )`,
  `CREATE TABLE IF NOT EXISTS bath_check (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    first_probe_id BIGINT UNSIGNED NOT NULL,
    second_probe_id BIGINT UNSIGNED NOT NULL,
    checked_on DATE NOT NULL,
    bath_uncertainty_k DOUBLE NOT NULL,
    readings LONGTEXT NOT NULL,
    notes VARCHAR(2000) NULL,
    supersedes_id BIGINT UNSIGNED NULL,
    superseded_at DATETIME(3) NULL,
    recorded_at DATETIME(3) NOT NULL,
    recorded_by_account_id BIGINT UNSIGNED NULL,
    recorded_by_name VARCHAR(120) NOT NULL,
    KEY bath_check_of_first (first_probe_id, checked_on),
    KEY bath_check_of_second (second_probe_id, checked_on),
    KEY bath_check_of_organisation (organisation_id),
    UNIQUE KEY bath_check_supersedes (supersedes_id),
    CONSTRAINT bath_check_first FOREIGN KEY (first_probe_id) REFERENCES instrument (id),
    CONSTRAINT bath_check_second FOREIGN KEY (second_probe_id) REFERENCES instrument (id),
    CONSTRAINT bath_check_before FOREIGN KEY (supersedes_id) REFERENCES bath_check (id)
  )`,
  `CREATE TABLE IF NOT EXISTS installation (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    point_id BIGINT UNSIGNED NOT NULL,
    starts_at DATETIME(3) NOT NULL,
    ends_at DATETIME(3) NULL,
    flow_meter_id BIGINT UNSIGNED NULL,
    logger_id BIGINT UNSIGNED NULL,
    supply_probe_id BIGINT UNSIGNED NULL,
    return_probe_id BIGINT UNSIGNED NULL,
    bath_check_id BIGINT UNSIGNED NULL,
    document LONGTEXT NOT NULL,
    version INT UNSIGNED NOT NULL,
    supersedes_id BIGINT UNSIGNED NULL,
    superseded_at DATETIME(3) NULL,
    reason VARCHAR(300) NULL,
    withdrawn_at DATETIME(3) NULL,
    withdrawn_by_name VARCHAR(120) NULL,
    withdrawn_reason VARCHAR(300) NULL,
    recorded_at DATETIME(3) NOT NULL,
    recorded_by_account_id BIGINT UNSIGNED NULL,
    recorded_by_name VARCHAR(120) NOT NULL,
    KEY installation_of_point (point_id, starts_at),
    KEY installation_of_organisation (organisation_id),
    UNIQUE KEY installation_supersedes (supersedes_id),
    CONSTRAINT installation_point FOREIGN KEY (point_id) REFERENCES metering_point (id),
    CONSTRAINT installation_flow_meter FOREIGN KEY (flow_meter_id) REFERENCES instrument (id),
    CONSTRAINT installation_logger FOREIGN KEY (logger_id) REFERENCES instrument (id),
    CONSTRAINT installation_supply_probe FOREIGN KEY (supply_probe_id) REFERENCES instrument (id),
    CONSTRAINT installation_return_probe FOREIGN KEY (return_probe_id) REFERENCES instrument (id),
    CONSTRAINT installation_bath_check FOREIGN KEY (bath_check_id) REFERENCES bath_check (id),
    CONSTRAINT installation_before FOREIGN KEY (supersedes_id) REFERENCES installation (id)
  )`,
];

/** Instruments, their certificates, same-bath checks of probes, and how points were measured. */
export const evidence = {
  name: "007-evidence",
  async up(schema: QueryInterface): Promise<void> {
    for (const table of tables) await schema.sequelize.query(table);
  },
};
