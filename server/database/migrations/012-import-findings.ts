import type { QueryInterface } from "sequelize";

/*
 * Corrections that were chosen in an import's checks belong to that import and go with it. An import
 * keeps who confirmed and who undid it, because those corrections are that person's.
 */
const changes = [
  `ALTER TABLE correction
     MODIFY COLUMN kind ENUM('exclude','clock','probeOffset','swapSides','flipFlow','scaleByBore','unit','fluid','split') NOT NULL,
     ADD COLUMN IF NOT EXISTS import_id BIGINT UNSIGNED NULL,
     ADD INDEX IF NOT EXISTS correction_of_import (import_id, state)`,
  `ALTER TABLE log_import
     ADD COLUMN IF NOT EXISTS confirmed_by_account_id BIGINT UNSIGNED NULL,
     ADD COLUMN IF NOT EXISTS confirmed_by_name VARCHAR(120) NULL,
     ADD COLUMN IF NOT EXISTS undone_by_name VARCHAR(120) NULL`,
];

/** What ties corrections to the import whose checks they were chosen in. */
export const importFindings = {
  name: "012-import-findings",
  async up(schema: QueryInterface): Promise<void> {
    for (const change of changes) await schema.sequelize.query(change);
  },
};
