import { Readable } from "node:stream";
import { DAY_MS } from "@shared/domain/time/interval";
import { addDays, localDateOf, startOfLocalDay } from "@shared/domain/time/local-calendar";
import { waterSeconds } from "@shared/domain/energy/totals";
import type { Database } from "@server/database/connect";
import { FileAnswer } from "@server/http/file-answer";
import { breathe } from "./breathe";
import { csvFileName, csvRecord, numberCell, textCell, timeCells } from "./csv-cells";
import type { EnergyPoint } from "./energy-point";
import { requireQuarterHours, type EnergyRange } from "./energy-range";
import { energyRows, type EnergyRow, type EnergyStep } from "./energy-rows";
import { readingRows } from "./readings-page";

// A byte order mark: without it spreadsheets read °, ³ and umlauts as another encoding.
const byteOrderMark = "\uFEFF";

const intervalHeader = [
  "Loop",
  "Point",
  "Start (UTC)",
  "Start (local)",
  "Length (s)",
  "Covered (s)",
  "Heating (kWh)",
  "Cooling (kWh)",
  "Volume (m3)",
  "Mean supply (degC)",
  "Mean return (degC)",
  "Suppressed (kWh)",
  "Least power (kW)",
  "Greatest power (kW)",
  "Measured rows",
  "Excluded rows",
  "Rows without reading",
];

const readingHeader = [
  "Loop",
  "Point",
  "Time (UTC)",
  "Time (local)",
  "Flow (m3/h)",
  "Supply (degC)",
  "Return (degC)",
  "Signal (%)",
  "Power (kW)",
  "Quality",
  "Outdoor (degC)",
  "Electric power (kW)",
  "Pressure (kPa)",
];

function nameOf({ loop, point, site }: EnergyPoint, range: EnergyRange, what: string): string {
  const lastDate = localDateOf(range.endMs - 1, site.zone);
  const from = localDateOf(range.startMs, site.zone);
  return csvFileName([loop.tag, point.code, what, from, "to", lastDate]);
}

function stream(name: string, records: AsyncGenerator<string>): FileAnswer {
  return new FileAnswer({
    name,
    contentType: "text/csv; charset=utf-8",
    body: Readable.from(records, { objectMode: false }),
  });
}

const partDays = { quarterHour: 28, hour: 112, day: 4000 } as const;

/**
 * Energy intervals of a range as CSV, a part at a time.
 * @throws Invalid (422) where the range cuts a quarter-hour; before anything is sent.
 */
export function intervalsCsv(
  database: Database,
  energyPoint: EnergyPoint,
  range: EnergyRange,
  step: EnergyStep,
): FileAnswer {
  requireQuarterHours(range);
  const what = { quarterHour: "quarter-hours", hour: "hours", day: "days" }[step];
  return stream(
    nameOf(energyPoint, range, what),
    intervalRecords(database, energyPoint, range, step),
  );
}

async function* intervalRecords(
  database: Database,
  { loop, point, site }: EnergyPoint,
  range: EnergyRange,
  step: EnergyStep,
): AsyncGenerator<string> {
  const names = [textCell(loop.tag), textCell(point.code)];
  const times = timeCells(site.zone);
  yield byteOrderMark + csvRecord(intervalHeader);
  for (const part of partsOf(range, site.zone, partDays[step])) {
    const rows = await energyRows(database, { pointId: point.id, zone: site.zone }, part, step);
    yield rows.map((row) => intervalRecord(row, names, times(row.startMs))).join("");
    await breathe();
  }
}

function intervalRecord(
  { startMs, endMs, totals }: EnergyRow,
  names: readonly string[],
  times: readonly string[],
): string {
  const covered = (value: number | null, decimals: number) =>
    numberCell(totals.coveredS > 0 ? value : null, decimals);
  return csvRecord([
    ...names,
    ...times,
    numberCell((endMs - startMs) / 1000, 3),
    numberCell(totals.coveredS, 3),
    covered(totals.heating.energyKwh, 6),
    covered(totals.cooling.energyKwh, 6),
    covered(waterSeconds(totals) > 0 ? totals.volumeM3 : null, 6),
    covered(totals.meanSupplyC, 4),
    covered(totals.meanReturnC, 4),
    numberCell(totals.suppressedKwh, 6),
    covered(totals.minPowerKw, 4),
    covered(totals.maxPowerKw, 4),
    numberCell(totals.measuredRows, 0),
    numberCell(totals.excludedRows, 0),
    numberCell(totals.noReadingRows, 0),
  ]);
}

/** Whole local days at a time, so that no hour or day is cut between two parts. */
function* partsOf(range: EnergyRange, zone: string, days: number): Generator<EnergyRange> {
  let startMs = range.startMs;
  while (startMs < range.endMs) {
    const next = startOfLocalDay(addDays(localDateOf(startMs + DAY_MS / 2, zone), days), zone);
    const endMs = Math.min(range.endMs, next);
    const from = localDateOf(startMs, zone);
    const to = localDateOf(endMs, zone);
    const whole = startOfLocalDay(from, zone) === startMs && startOfLocalDay(to, zone) === endMs;
    yield { startMs, endMs, dates: whole ? { from, to } : null };
    startMs = endMs;
  }
}

/**
 * Cleaned readings of a range as CSV: what energy is worked out from, with what became of each, and
 * the companion series at the same instants.
 */
export function readingsCsv(
  database: Database,
  energyPoint: EnergyPoint,
  range: EnergyRange,
): FileAnswer {
  return stream(
    nameOf(energyPoint, range, "readings"),
    readingRecords(database, energyPoint, range),
  );
}

const qualityWords = {
  measured: "measured",
  excluded: "excluded",
  noReading: "no reading",
} as const;

async function* readingRecords(
  database: Database,
  energyPoint: EnergyPoint,
  range: EnergyRange,
): AsyncGenerator<string> {
  const { loop, point, site } = energyPoint;
  const names = [textCell(loop.tag), textCell(point.code)];
  const times = timeCells(site.zone);
  yield byteOrderMark + csvRecord(readingHeader);
  for await (const rows of readingRows(database, energyPoint, range)) {
    yield rows
      .map((row) =>
        csvRecord([
          ...names,
          ...times(row.atMs),
          numberCell(row.flowM3PerHour, 6),
          numberCell(row.supplyC, 6),
          numberCell(row.returnC, 6),
          numberCell(row.signalPercent, 3),
          numberCell(row.powerKw, 4),
          qualityWords[row.quality],
          numberCell(row.outdoorC, 4),
          numberCell(row.electricKw, 6),
          numberCell(row.pressureKpa, 4),
        ]),
      )
      .join("");
  }
}
