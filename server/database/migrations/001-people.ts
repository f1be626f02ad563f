import type { QueryInterface } from "sequelize";

// Text keys are compared byte for byte where they are secrets, without case where they are names.
const tables = [
  `CREATE TABLE IF NOT EXISTS organisation (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    name VARCHAR(120) NOT NULL,
    is_demo BOOLEAN NOT NULL DEFAULT FALSE,
    created_at DATETIME(3) NOT NULL
  )`,
  `CREATE TABLE IF NOT EXISTS account (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    email VARCHAR(254) NOT NULL,
    name VARCHAR(120) NOT NULL,
    password_hash CHAR(60) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    language ENUM('en','de') NOT NULL DEFAULT 'en',
    unit_system ENUM('si','inchPound') NULL,
    is_demo BOOLEAN NOT NULL DEFAULT FALSE,
    created_at DATETIME(3) NOT NULL,
    UNIQUE KEY account_email (email)
  )`,
  `CREATE TABLE IF NOT EXISTS membership (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    account_id BIGINT UNSIGNED NULL,
    invited_email VARCHAR(254) NULL,
    role ENUM('administrator','surveyor','engineer','billingClerk','tenantContact') NOT NULL,
    state ENUM('invited','active','disabled','removed') NOT NULL,
    invited_at DATETIME(3) NULL,
    last_seen_at DATETIME(3) NULL,
    created_at DATETIME(3) NOT NULL,
    UNIQUE KEY membership_account (organisation_id, account_id),
    KEY membership_of_account (account_id),
    CONSTRAINT membership_organisation FOREIGN KEY (organisation_id) REFERENCES organisation (id),
    CONSTRAINT membership_account FOREIGN KEY (account_id) REFERENCES account (id)
  )`,
  `CREATE TABLE IF NOT EXISTS session (
    id CHAR(32) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
    membership_id BIGINT UNSIGNED NOT NULL,
    account_id BIGINT UNSIGNED NOT NULL,
    organisation_id BIGINT UNSIGNED NOT NULL,
    user_agent VARCHAR(200) NULL,
    created_at DATETIME(3) NOT NULL,
    last_seen_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NOT NULL,
    revoked_at DATETIME(3) NULL,
    KEY session_of_account (account_id),
    KEY session_of_membership (membership_id),
    KEY session_expiry (expires_at),
    CONSTRAINT session_membership FOREIGN KEY (membership_id) REFERENCES membership (id),
    CONSTRAINT session_account FOREIGN KEY (account_id) REFERENCES account (id)
  )`,
  `CREATE TABLE IF NOT EXISTS access_token (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    membership_id BIGINT UNSIGNED NOT NULL,
    name VARCHAR(120) NOT NULL,
    secret_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    created_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NULL,
    last_used_at DATETIME(3) NULL,
    revoked_at DATETIME(3) NULL,
    UNIQUE KEY access_token_secret (secret_hash),
    KEY access_token_of_organisation (organisation_id),
    CONSTRAINT access_token_membership FOREIGN KEY (membership_id) REFERENCES membership (id)
  )`,
  `CREATE TABLE IF NOT EXISTS invitation (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NOT NULL,
    membership_id BIGINT UNSIGNED NOT NULL,
    secret_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    created_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NOT NULL,
    UNIQUE KEY invitation_secret (secret_hash),
    UNIQUE KEY invitation_of_membership (membership_id),
    CONSTRAINT invitation_membership FOREIGN KEY (membership_id) REFERENCES membership (id)
  )`,
  `CREATE TABLE IF NOT EXISTS password_reset (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    account_id BIGINT UNSIGNED NOT NULL,
    secret_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    created_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NOT NULL,
    used_at DATETIME(3) NULL,
    UNIQUE KEY password_reset_secret (secret_hash),
    KEY password_reset_of_account (account_id, created_at),
    CONSTRAINT password_reset_account FOREIGN KEY (account_id) REFERENCES account (id)
  )`,
  `CREATE TABLE IF NOT EXISTS sign_in_failure (
    email_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
    failures INT UNSIGNED NOT NULL,
    window_started_at DATETIME(3) NOT NULL,
    KEY sign_in_failure_age (window_started_at)
  )`,
  `CREATE TABLE IF NOT EXISTS outbox_mail (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NULL,
    kind VARCHAR(40) NOT NULL,
    to_address VARCHAR(254) NOT NULL,
    subject VARCHAR(200) NOT NULL,
    body_text TEXT NULL,
    body_html TEXT NULL,
    state ENUM('queued','sending','sent','failed') NOT NULL,
    attempts INT UNSIGNED NOT NULL DEFAULT 0,
    next_attempt_at DATETIME(3) NOT NULL,
    last_error VARCHAR(500) NULL,
    created_at DATETIME(3) NOT NULL,
    sent_at DATETIME(3) NULL,
    KEY outbox_mail_due (state, next_attempt_at)
  )`,
  `CREATE TABLE IF NOT EXISTS audit_event (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    organisation_id BIGINT UNSIGNED NULL,
    account_id BIGINT UNSIGNED NULL,
    actor_name VARCHAR(254) NOT NULL,
    kind VARCHAR(60) NOT NULL,
    subject_kind VARCHAR(40) NULL,
    subject_id VARCHAR(40) NULL,
    details JSON NULL,
    address VARCHAR(64) NULL,
    at DATETIME(3) NOT NULL,
    KEY audit_event_of_organisation (organisation_id, at)
  )`,
];

/** Organisations, accounts and their roles, ways to sign in, letters to send, the audit trail. */
export const people = {
  name: "001-people",
  async up(schema: QueryInterface): Promise<void> {
    for (const table of tables) await schema.sequelize.query(table);
  },
};
