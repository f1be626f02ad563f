import type { QueryInterface } from "sequelize";

/*
 * A comparison is kept as it was asked and as it came out: two documents that the contract's schemas
 * read. It is superseded or withdrawn, never overwritten. Points stand in its document alone, because
 * it outlives them.
 */
const table = `CREATE TABLE IF NOT EXISTS meter_comparison (
  id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
  organisation_id BIGINT UNSIGNED NOT NULL,
  site_id BIGINT UNSIGNED NOT NULL,
  title VARCHAR(120) NOT NULL,
  from_at DATETIME(3) NOT NULL,
  to_at DATETIME(3) NOT NULL,
  input LONGTEXT NOT NULL,
  result LONGTEXT NOT NULL,
  supersedes_id BIGINT UNSIGNED NULL,
  superseded_at DATETIME(3) NULL,
  recorded_at DATETIME(3) NOT NULL,
  recorded_by_account_id BIGINT UNSIGNED NULL,
  recorded_by_name VARCHAR(120) NOT NULL,
  withdrawn_at DATETIME(3) NULL,
  withdrawn_by_name VARCHAR(120) NULL,
  withdrawn_reason VARCHAR(300) NULL,
  KEY meter_comparison_of_organisation (organisation_id, id),
  KEY meter_comparison_of_site (site_id, id),
  UNIQUE KEY meter_comparison_supersedes (supersedes_id),
  CONSTRAINT meter_comparison_site FOREIGN KEY (site_id) REFERENCES site (id),
  CONSTRAINT meter_comparison_before FOREIGN KEY (supersedes_id) REFERENCES meter_comparison (id)
)`;

/** Two meters compared over a period of a site. */
export const meterComparisons = {
  name: "009-meter-comparisons",
  async up(schema: QueryInterface): Promise<void> {
    await schema.sequelize.query(table);
  },
};
