import type { QueryInterface } from "sequelize";

const steps = [
  `CREATE TABLE IF NOT EXISTS recipe (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    name VARCHAR(120) NOT NULL,
    logger_serial VARCHAR(60) NULL,
    fingerprint CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    recipe LONGTEXT NOT NULL,
    repair LONGTEXT NOT NULL,
    shared BOOLEAN NOT NULL,
    version INT UNSIGNED NOT NULL DEFAULT 1,
    created_by_account_id BIGINT UNSIGNED NULL,
    created_by_name VARCHAR(120) NOT NULL,
    created_at DATETIME(3) NOT NULL,
    last_used_at DATETIME(3) NULL,
    KEY recipe_of_organisation (organisation_id, fingerprint)
  )`,
  // A batch outlives its recipe, whose name it therefore keeps.
  `CREATE TABLE IF NOT EXISTS import_batch (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    site_id BIGINT UNSIGNED NOT NULL,
    recipe_id BIGINT UNSIGNED NULL,
    recipe_name VARCHAR(120) NOT NULL,
    created_by_account_id BIGINT UNSIGNED NULL,
    created_by_name VARCHAR(120) NOT NULL,
    created_at DATETIME(3) NOT NULL,
    KEY import_batch_of_organisation (organisation_id, id),
    CONSTRAINT import_batch_site FOREIGN KEY (site_id) REFERENCES site (id),
    CONSTRAINT import_batch_recipe FOREIGN KEY (recipe_id) REFERENCES recipe (id) ON DELETE SET NULL
  )`,
  `CREATE TABLE IF NOT EXISTS import_batch_file (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    batch_id BIGINT UNSIGNED NOT NULL,
    import_id BIGINT UNSIGNED NULL,
    name VARCHAR(255) NOT NULL,
    sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    byte_length BIGINT UNSIGNED NOT NULL,
    uploaded_at DATETIME(3) NOT NULL,
    logger_serial VARCHAR(60) NULL,
    point_by ENUM('serial','fileName','chosen') NULL,
    point_ambiguous BOOLEAN NOT NULL DEFAULT FALSE,
    KEY import_batch_file_of_batch (batch_id, id),
    KEY import_batch_file_of_import (import_id),
    KEY import_batch_file_of_organisation (organisation_id),
    CONSTRAINT import_batch_file_batch FOREIGN KEY (batch_id) REFERENCES import_batch (id),
    CONSTRAINT import_batch_file_import FOREIGN KEY (import_id) REFERENCES log_import (id)
  )`,
  "ALTER TABLE log_import ADD COLUMN IF NOT EXISTS batch_id BIGINT UNSIGNED NULL",
  "ALTER TABLE log_import ADD COLUMN IF NOT EXISTS reopen_when_undone BOOLEAN NOT NULL DEFAULT FALSE",
  "ALTER TABLE log_file ADD COLUMN IF NOT EXISTS applied_recipe LONGTEXT NULL",
  "CREATE INDEX IF NOT EXISTS audit_event_of_subject ON audit_event (subject_kind, subject_id)",
];

/** How one logger writes, kept; many files read by one of these; and what an import was read by. */
export const recipes = {
  name: "013-recipes",
  async up(schema: QueryInterface): Promise<void> {
    for (const step of steps) await schema.sequelize.query(step);
  },
};
