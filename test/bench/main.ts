import { mkdtempSync, readFileSync } from "node:fs";
import { rm } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { parseArgs } from "node:util";
import { connectDatabase } from "@server/database/connect";
import { startBenchServer } from "./bench-server";
import { benchFluids } from "./bench-fluids";
import { benchImport } from "./bench-import";
import { benchLargeFile } from "./bench-large-file";
import { benchParsing } from "./bench-parsing";
import { benchReads } from "./bench-reads";
import { benchResponsiveness } from "./bench-responsiveness";
import { writeLog, YEAR } from "./log-year";
import { newSite } from "./ours-import";
import { findPandas } from "./peers/pandas";
import { table, type Line } from "./report";

/*
 * npm run bench [-- --rounds 3 --only large,reads]
 * Everything ours goes through a real server in production mode, as a script would; the peers run in
 * turn with it on the same MariaDB. Only the ratios travel to another machine.
 */
const parts = ["import", "large", "parsing", "reads", "responsiveness", "fluids"] as const;
type Part = (typeof parts)[number];

function chosenParts(only: string | undefined): ReadonlySet<Part> {
  if (only === undefined) return new Set(parts);
  const names = only.split(",");
  const wrong = names.filter((name) => !parts.some((part) => part === name));
  if (wrong.length > 0)
    throw new Error(`--only takes ${parts.join(", ")}; not ${wrong.join(", ")}`);
  return new Set(parts.filter((part) => names.includes(part)));
}

async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      rounds: { type: "string", default: "3" },
      only: { type: "string" },
    },
  });
  const chosen = chosenParts(values.only);
  const rounds = Math.max(1, Number(values.rounds));
  const port = process.env.LOOPWRIGHT_TEST_DB_PORT;
  if (!port) throw new Error("LOOPWRIGHT_TEST_DB_PORT is not set: start with npm run bench.");
  const folder = mkdtempSync(path.join(os.tmpdir(), "loopwright-bench-"));
  const csv = path.join(folder, "year.csv");
  await writeLog(csv, YEAR);
  const server = await startBenchServer(port, folder);
  const database = connectDatabase(server.databaseUrl, { poolSize: 4 });
  try {
    const pandas = await findPandas(csv, { port: Number(port), name: server.databaseName }, folder);
    const bench = { server, database, csv, bytes: readFileSync(csv), pandas, rounds, folder };
    const site = await newSite(server);
    const run = async (part: Part, work: () => Promise<Line[]>) => (chosen.has(part) ? work() : []);
    const parsing = await run("parsing", () => benchParsing(bench));
    // Reads look at the year that the import's bench has stored.
    const imports =
      chosen.has("import") || chosen.has("reads") ? await benchImport(bench, site) : null;
    const reads = await run("reads", async () =>
      imports ? benchReads(bench, imports.pointId) : [],
    );
    const responsiveness = await run("responsiveness", () => benchResponsiveness(bench, site));
    const large = await run("large", () => benchLargeFile(bench));
    const fluids = await run("fluids", () => benchFluids(rounds));
    const cores = os.availableParallelism();
    console.log(
      `\n${YEAR.rowCount.toLocaleString("en")} one-minute rows, ${(bench.bytes.length / 1e6).toFixed(1)} MB; ` +
        `medians of ${rounds} interleaved rounds on ${cores} cores (load ${os.loadavg()[0]?.toFixed(1)}).`,
    );
    if (pandas === null)
      console.log(
        "Without python3-pandas, python3-sqlalchemy and python3-pymysql: no pandas peers.",
      );
    console.log(
      `\n${table([...(imports?.lines ?? []), ...large, ...parsing, ...reads, ...responsiveness, ...fluids])}`,
    );
  } finally {
    await database.close();
    await server.stop();
    await rm(folder, { recursive: true, force: true });
  }
}

main().catch((error: unknown) => {
  console.error(error);
  process.exitCode = 1;
});
