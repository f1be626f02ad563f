import { migrate } from "@server/database/migrate";
import { freshDatabase, schemaOf, withConnection } from "./fresh-database";

const port = () => process.env.LOOPWRIGHT_TEST_DB_PORT ?? "";

test("a database made from the kept schema is what the migrations leave", async () => {
  const first = await freshDatabase(port(), "fresh");
  const second = await freshDatabase(port(), "fresh");
  try {
    const kept = await withConnection(second.url, schemaOf);
    await withConnection(first.url, async (database) => {
      const tables = kept.match(/(?<=CREATE TABLE )`\w+`/g) ?? [];
      await database.query(
        `SET FOREIGN_KEY_CHECKS = 0; DROP TABLE ${tables.join(", ")}; SET FOREIGN_KEY_CHECKS = 1`,
      );
      const steps = await migrate(database);
      expect(steps.length).toBeGreaterThan(10);
      expect(await migrate(database)).toEqual([]);
      expect(kept).toBe(await schemaOf(database));
    });
    expect(await withConnection(second.url, migrate)).toEqual([]);
  } finally {
    await first.drop();
    await second.drop();
  }
}, 60_000);
