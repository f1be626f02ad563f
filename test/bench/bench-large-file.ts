import { readFileSync } from "node:fs";
import { rm } from "node:fs/promises";
import path from "node:path";
import type { Bench } from "./bench";
import { startBenchServer } from "./bench-server";
import { FIVE_MILLION, writeLog } from "./log-year";
import { importFile, newPoint, newSite } from "./ours-import";
import { time, type Line } from "./report";

/**
 * G2: five million one-second rows from "store it" to stored, and how much memory the process that
 * imports them takes at its most. A server of its own, so that nothing before counts.
 */
export async function benchLargeFile({ folder }: Bench): Promise<Line[]> {
  const csv = path.join(folder, "five-million.csv");
  await writeLog(csv, FIVE_MILLION);
  const bytes = readFileSync(csv);
  await rm(csv);
  const port = process.env.LOOPWRIGHT_TEST_DB_PORT ?? "";
  const server = await startBenchServer(port, folder);
  try {
    const site = await newSite(server);
    const pointId = await newPoint(server, site, "SECONDS-1");
    const before = server.residentMb();
    const result = await importFile(server, pointId, "five-million.csv", bytes);
    if (result.rowsStored !== FIVE_MILLION.rowCount)
      throw new Error(`${result.rowsStored} rows stored of ${FIVE_MILLION.rowCount}`);
    const perSecond = FIVE_MILLION.rowCount / result.storeS / 1e6;
    const peak = server.peakMb();
    console.error(`  five million rows: whole way ${time(result.wholeS)}`);
    return [
      {
        goal: "G2",
        promise: "5 M rows ≥ 1 M rows/s, from “store it” to stored",
        ours: time(result.storeS),
        peer: "",
        ratio: `${perSecond.toFixed(2)} M rows/s`,
        met: perSecond >= 1,
      },
      {
        goal: "G2",
        promise: "≤ 400 MB more than the idle server, at the most",
        ours: `${(peak - before).toFixed(0)} MB`,
        peer: `${peak.toFixed(0)} MB in all`,
        ratio: "",
        met: peak - before <= 400,
      },
    ];
  } finally {
    await server.stop();
  }
}
