import { Umzug, SequelizeStorage } from "umzug";
import { QueryTypes, type QueryInterface } from "sequelize";
import type { Database } from "./connect";
import { migrations, type Migration } from "./migrations";

function runner(database: Database, steps: readonly Migration[]) {
  return new Umzug<QueryInterface>({
    migrations: steps.map(({ name, up }) => ({
      name,
      up: ({ context }) => up(context),
    })),
    context: database.getQueryInterface(),
    storage: new SequelizeStorage({ sequelize: database, tableName: "migration" }),
    logger: undefined,
  });
}

const lockName = "loopwright-migrate";

/**
 * Brings the schema up to date and answers the names of the steps that ran. Two servers starting at
 * once take turns by a lock of the database, so no step runs twice.
 */
export async function migrate(database: Database): Promise<string[]> {
  return database.transaction(async (transaction) => {
    const [lock] = await database.query<{ got: number | null }>(
      "SELECT GET_LOCK(:lockName, 60) AS got",
      { replacements: { lockName }, type: QueryTypes.SELECT, transaction },
    );
    if (lock?.got !== 1) throw new Error("Another server has been migrating for over a minute.");
    try {
      const done = await runner(database, migrations).up();
      return done.map((step) => step.name);
    } finally {
      await database.query("SELECT RELEASE_LOCK(:lockName)", {
        replacements: { lockName },
        // Without the type the dialect takes the rows for a result of a write and fails on them.
        type: QueryTypes.SELECT,
        transaction,
      });
    }
  });
}
