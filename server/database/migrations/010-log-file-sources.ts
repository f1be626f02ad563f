import type { QueryInterface } from "sequelize";
import { addJobKind } from "./add-job-kind";

/*
 * A log may come inside a workbook or an archive. `sha256`, `byte_length` and `name` are those of the
 * text that is read; the source columns name the upload it came in, whose bytes are kept as well.
 * `member` is null until it is unpacked, and for files that are text themselves.
 */
const changes = [
  `ALTER TABLE log_file
     ADD COLUMN IF NOT EXISTS source_kind ENUM('xlsx','zip','gzip') NULL,
     ADD COLUMN IF NOT EXISTS source_sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NULL,
     ADD COLUMN IF NOT EXISTS source_name VARCHAR(255) NULL,
     ADD COLUMN IF NOT EXISTS source_byte_length BIGINT UNSIGNED NULL,
     ADD COLUMN IF NOT EXISTS member VARCHAR(255) NULL,
     ADD COLUMN IF NOT EXISTS unpack_notes LONGTEXT NULL`,
  `ALTER TABLE log_file ADD KEY IF NOT EXISTS log_file_of_source (point_id, source_sha256)`,
];

/** Where the text of a log came from, and the job that unpacks it. */
export const logFileSources = {
  name: "010-log-file-sources",
  async up(schema: QueryInterface): Promise<void> {
    for (const change of changes) await schema.sequelize.query(change);
    await addJobKind(schema, "unpack");
  },
};
