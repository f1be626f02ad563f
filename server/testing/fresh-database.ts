import { createHash, randomBytes } from "node:crypto";
import {
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  writeFileSync,
} from "node:fs";
import path from "node:path";
import { QueryTypes, Sequelize } from "sequelize";
import { migrate } from "@server/database/migrate";

/** A database of one test file's own, with the schema of this checkout and not a row in it. */
export interface FreshDatabase {
  readonly url: string;
  drop(): Promise<void>;
}

/**
 * Makes a database on the MariaDB of the run. The migrations run once for each state of their files;
 * after that a database is made from the schema they left, in a fraction of the time.
 * @param port of a MariaDB on loopback whose root needs no password
 */
export async function freshDatabase(port: string, prefix: string): Promise<FreshDatabase> {
  const server = `mariadb://root@127.0.0.1:${port}/`;
  const name = `${prefix}_${randomBytes(6).toString("hex")}`;
  const administer = (sql: string) => withConnection(server, (root) => root.query(sql));
  const drop = async () => void (await administer(`DROP DATABASE ${name}`));
  await administer(`CREATE DATABASE ${name} CHARACTER SET utf8mb4`);
  try {
    await withConnection(`${server}${name}`, async (database) => {
      const file = path.join(schemaFolder, `${migrationsHash()}.sql`);
      if (existsSync(file)) {
        await database.query(readFileSync(file, "utf8"));
        return;
      }
      await migrate(database);
      mkdirSync(schemaFolder, { recursive: true });
      // Renamed into place, so that half a schema is never read as a whole one.
      const unfinished = `${file}.${name}`;
      writeFileSync(unfinished, await schemaOf(database));
      renameSync(unfinished, file);
    });
  } catch (error) {
    await drop();
    throw error;
  }
  return { url: `${server}${name}`, drop };
}

const schemaFolder = path.join(__dirname, "..", "..", "var", "test-schemas");

export async function withConnection<Result>(
  url: string,
  work: (database: Sequelize) => Promise<Result>,
): Promise<Result> {
  const database = new Sequelize(url, {
    dialect: "mariadb",
    logging: false,
    pool: { max: 2 },
    dialectOptions: { multipleStatements: true },
  });
  try {
    return await work(database);
  } finally {
    await database.close();
  }
}

/** Of every file of `server/database`: migrations share code with their neighbours. */
function migrationsHash(): string {
  const folder = path.join(__dirname, "..", "database");
  const hash = createHash("sha256");
  for (const file of readdirSync(folder, { recursive: true, encoding: "utf8" }).sort())
    if (file.endsWith(".ts")) hash.update(file).update(readFileSync(path.join(folder, file)));
  return hash.digest("hex").slice(0, 16);
}

const select = { type: QueryTypes.SELECT } as const;

/** The statements that make this database's tables anew and note the migrations as done. */
export async function schemaOf(database: Sequelize): Promise<string> {
  const tables = await database.query<{ name: string }>(
    `SELECT table_name AS name FROM information_schema.tables
      WHERE table_schema = DATABASE() AND table_type = 'BASE TABLE' ORDER BY table_name`,
    select,
  );
  const statements = ["SET FOREIGN_KEY_CHECKS = 0"];
  for (const { name } of tables) {
    const [row] = await database.query<Record<string, string>>(
      `SHOW CREATE TABLE \`${name}\``,
      select,
    );
    statements.push(row?.["Create Table"] ?? "");
  }
  const done = await database.query<{ name: string }>("SELECT name FROM migration", select);
  const names = done.map(({ name }) => `(${database.escape(name)})`).join(", ");
  statements.push(`INSERT INTO migration (name) VALUES ${names}`, "SET FOREIGN_KEY_CHECKS = 1");
  return statements.join(";\n");
}
