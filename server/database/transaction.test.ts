import { QueryTypes } from "sequelize";
import { testApp } from "@server/testing/test-app";
import { insertMany } from "./bulk";
import { inTransaction } from "./transaction";

const app = testApp();

test("the victim of a deadlock runs again from its start, also when a bulk insert was refused", async () => {
  const { database } = app;
  await database.query("CREATE TABLE tally (id INT PRIMARY KEY, n INT NOT NULL)");
  await database.query("INSERT INTO tally VALUES (1, 0), (2, 0)");
  const add = "INSERT INTO tally (id, n) VALUES (?, ?) ON DUPLICATE KEY UPDATE n = n + 1";
  let waiting = 2;
  let bothHoldOne: () => void = () => undefined;
  const meeting = new Promise<void>((resolve) => (bothHoldOne = resolve));
  let attempts = 0;
  const count = (first: number, second: number) =>
    inTransaction(database, async (transaction) => {
      attempts += 1;
      await insertMany(transaction, add, [[first, 0]]);
      // The first time both hold what the other wants next.
      if (--waiting <= 0) bothHoldOne();
      await meeting;
      await insertMany(transaction, add, [[second, 0]]);
    });
  await Promise.all([count(1, 2), count(2, 1)]);
  const rows = await database.query("SELECT id, n FROM tally", { type: QueryTypes.SELECT });
  expect(rows).toEqual([
    { id: 1, n: 2 },
    { id: 2, n: 2 },
  ]);
  expect(attempts).toBe(3);
});
