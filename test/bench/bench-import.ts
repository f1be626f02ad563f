import type { Site } from "@shared/contracts/places";
import type { Bench } from "./bench";
import { YEAR } from "./log-year";
import { interleaved, median, seconds, type Timed } from "./measure";
import { importFile, newPoint } from "./ours-import";
import type { PandasMode } from "./peers/pandas";
import { plainNodeImport } from "./peers/plain-node";
import { time, times, type Line } from "./report";
import { bytesPerRow, bytesPerSample } from "./storage";

/** Ours and a peer's kWh must agree, or one of them did not do the work. */
function expectSameEnergy(name: string, ours: number, theirs: number): void {
  if (!(Math.abs(theirs / ours - 1) < 1e-6))
    throw new Error(`${name} works out ${theirs} kWh, we ${ours} kWh`);
}

/** G1 and G6: the year file through the real import, job queue and worker included. */
export async function benchImport(
  { server, database, csv, bytes, pandas, rounds }: Bench,
  site: Site,
): Promise<{ lines: Line[]; pointId: string }> {
  let count = 0;
  let pointId = "";
  let coolingKwh = NaN;
  const whole: number[] = [];
  const importYear = async () => {
    pointId = await newPoint(server, site, `YEAR-${++count}`);
    const result = await importFile(server, pointId, "year.csv", bytes);
    if (result.rowsStored !== YEAR.rowCount)
      throw new Error(`${result.rowsStored} rows stored of ${YEAR.rowCount}`);
    coolingKwh = result.coolingKwh;
    return result;
  };
  const cold = await importYear();
  await importYear(); // the worker's second import is where it has reached its pace

  const byPandas = (mode: PandasMode): Timed | null =>
    pandas &&
    (async () => {
      const result = await pandas.run(mode);
      expectSameEnergy("pandas", coolingKwh, result.kwh);
      return result.seconds;
    });
  const took = await interleaved(rounds, {
    ours: async () => {
      const result = await importYear();
      whole.push(result.wholeS);
      return result.storeS;
    },
    plain: () =>
      seconds(async () =>
        expectSameEnergy("the plain way", coolingKwh, await plainNodeImport(database, csv)),
      ),
    load: byPandas("load"),
    tosql: byPandas("tosql"),
  });
  const wholeS = median(whole);
  const line = (peerS: number, name: string, least: number): Line => ({
    goal: "G1",
    promise: `import ≥ ${least}× ${name}`,
    ours: time(took.ours),
    peer: time(peerS),
    ratio: times(peerS / took.ours),
    met: peerS / took.ours >= least,
  });
  const { databaseName } = server;
  const sampleBytes = await bytesPerSample(database, databaseName);
  const rowBytes = await bytesPerRow(database, databaseName, "plain_sample");
  const lines: Line[] = [
    ...(pandas
      ? [line(took.tosql, "pandas + to_sql", 8), line(took.load, "pandas + LOAD DATA", 4)]
      : []),
    line(took.plain, "the plain Node way", 25),
    {
      goal: "G1",
      promise: "(with upload, recognition and checks)",
      ours: time(wholeS),
      peer: time(took.plain),
      ratio: times(took.plain / wholeS),
      met: null,
    },
    {
      goal: "G1",
      promise: "(first import of a fresh server)",
      ours: time(cold.storeS),
      peer: time(took.plain),
      ratio: times(took.plain / cold.storeS),
      met: null,
    },
    {
      goal: "G6",
      promise: "≤ 12 bytes a sample, all in",
      ours: `${sampleBytes.toFixed(1)} B`,
      peer: `${rowBytes.toFixed(1)} B`,
      ratio: times(rowBytes / sampleBytes),
      met: sampleBytes <= 12,
    },
  ];
  return { lines, pointId };
}
