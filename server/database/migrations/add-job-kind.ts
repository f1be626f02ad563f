import { QueryTypes, type QueryInterface } from "sequelize";

/** Adds a kind of job to whichever there are: another step may have added its own. */
export async function addJobKind({ sequelize }: QueryInterface, kind: string): Promise<void> {
  const [column] = await sequelize.query<{ type: string }>(
    `SELECT COLUMN_TYPE AS type FROM information_schema.COLUMNS
      WHERE TABLE_SCHEMA = DATABASE() AND TABLE_NAME = 'job' AND COLUMN_NAME = 'kind'`,
    { type: QueryTypes.SELECT },
  );
  if (!column || column.type.includes(`'${kind}'`)) return;
  const type = column.type.replace(/\)$/, `,'${kind}')`);
  await sequelize.query(`ALTER TABLE job MODIFY COLUMN kind ${type} NOT NULL`);
}
