import { readFileSync } from "node:fs";
import { rm } from "node:fs/promises";
import path from "node:path";
import type { Bench } from "./bench";
import { startBenchServer } from "./bench-server";
import { FIVE_MILLION, writeLog } from "./log-year";
import { importFile, newPoint, newSite, type Milestone } from "./ours-import";
import { time, type Line } from "./report";

const leastPerSecond = 1e6;
const mostMb = 350;

/** G2: five million rows of seconds, and of minutes. */
export async function benchLargeFile(bench: Bench): Promise<Line[]> {
  return [...(await importLarge(bench, "seconds")), ...(await importLarge(bench, "minutes"))];
}

/**
 * From "store it" to stored, and how much memory the import's worker takes at its most while it
 * checks and while it stores: what the server's process holds beyond what it held when the upload
 * had ended. A server of its own, so that nothing before counts.
 */
async function importLarge({ folder }: Bench, step: keyof typeof FIVE_MILLION): Promise<Line[]> {
  const shape = FIVE_MILLION[step];
  const csv = path.join(folder, "five-million.csv");
  await writeLog(csv, shape);
  const bytes = readFileSync(csv);
  await rm(csv);
  const server = await startBenchServer(process.env.LOOPWRIGHT_TEST_DB_PORT ?? "", folder);
  try {
    const site = await newSite(server);
    const pointId = await newPoint(server, site, "LARGE-1");
    const idleMb = server.residentMb();
    let uploadedMb = NaN;
    const peakMb: Partial<Record<Milestone, number>> = {};
    const result = await importFile(server, pointId, "five-million.csv", bytes, (milestone) => {
      if (milestone === "uploaded") uploadedMb = server.residentMb();
      peakMb[milestone] = server.peakMb();
      server.forgetPeak();
    });
    if (result.rowsStored !== shape.rowCount)
      throw new Error(`${result.rowsStored} rows stored of ${shape.rowCount}`);
    const perSecond = shape.rowCount / result.storeS;
    console.error(
      `  five million ${step}: whole way ${time(result.wholeS)}; ` +
        `idle ${idleMb.toFixed(0)} MB, after the upload ${uploadedMb.toFixed(0)} MB`,
    );
    const memory = (milestone: Milestone, doing: string): Line => {
      const peak = peakMb[milestone] ?? NaN;
      const more = peak - uploadedMb;
      return {
        goal: "G2",
        promise: `5 M ${step}: worker ≤ ${mostMb} MB while ${doing}`,
        ours: `${more.toFixed(0)} MB`,
        peer: `${peak.toFixed(0)} MB in all`,
        ratio: "",
        met: more <= mostMb,
      };
    };
    return [
      {
        goal: "G2",
        promise: `5 M ${step} ≥ 1 M rows/s, “store it” to stored`,
        ours: time(result.storeS),
        peer: "",
        ratio: `${(perSecond / 1e6).toFixed(2)} M rows/s`,
        met: perSecond >= leastPerSecond,
      },
      memory("checked", "checking"),
      memory("stored", "storing"),
    ];
  } finally {
    await server.stop();
  }
}
