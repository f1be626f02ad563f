import { createWriteStream } from "node:fs";
import { once } from "node:events";

/** One row of the invented log: smooth load, a little noise, two decimals, as a logger writes. */
export interface LogShape {
  readonly startMs: number;
  readonly stepMs: number;
  readonly rowCount: number;
}

/** 525,600 one-minute rows, about 19 MB: a year of one metering point. */
export const YEAR: LogShape = {
  startMs: Date.UTC(2025, 0, 1),
  stepMs: 60_000,
  rowCount: 525_600,
};

/** Five million rows, about 185 MB: 58 days of a logger of seconds, nine and a half years of minutes. */
export const FIVE_MILLION: Readonly<Record<"seconds" | "minutes", LogShape>> = {
  seconds: { startMs: Date.UTC(2025, 0, 1), stepMs: 1_000, rowCount: 5_000_000 },
  minutes: { startMs: Date.UTC(2015, 0, 1), stepMs: 60_000, rowCount: 5_000_000 },
};

const DAY_MS = 86_400_000;

/** Writes `timestamp,flow,supply,return` in m³/h and °C, UTC; the same shape gives the same bytes. */
export async function writeLog(path: string, { startMs, stepMs, rowCount }: LogShape) {
  const out = createWriteStream(path);
  out.write("timestamp,flow m3/h,supply °C,return °C\n");
  let state = 7;
  const noise = () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647 - 0.5;
  let lines: string[] = [];
  for (let row = 0; row < rowCount; row++) {
    const ms = startMs + row * stepMs;
    const day = Math.sin(((ms % DAY_MS) / DAY_MS) * 2 * Math.PI);
    const time = new Date(ms).toISOString();
    const flow = (28 + 8 * day + noise()).toFixed(2);
    const supply = (6.4 + 0.3 * noise()).toFixed(2);
    const back = (12.2 + day + 0.3 * noise()).toFixed(2);
    lines.push(`${time.slice(0, 10)} ${time.slice(11, 19)},${flow},${supply},${back}\n`);
    if (lines.length < 20_000) continue;
    if (!out.write(lines.join(""))) await once(out, "drain");
    lines = [];
  }
  out.end(lines.join(""));
  await once(out, "finish");
}
