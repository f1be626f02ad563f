import { readFileSync } from "node:fs";
import { QueryTypes } from "sequelize";
import { integrateEnergy } from "@shared/domain/energy/integrate";
import { totalEnergy } from "@shared/domain/energy/totals";
import { energyBlocks } from "@server/database/migrations/008-energy-blocks";
import { inTransaction } from "@server/database/transaction";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { DEFAULT_REPAIR_CHOICES } from "@shared/domain/log-files/recipe";
import { organisation } from "@server/testing/factories";
import { pointToMeter } from "@server/testing/place-factories";
import { testApp } from "@server/testing/test-app";
import { loadDays } from "./day-rows";
import { loadEnergySettings, powerOptionsOf } from "./energy-settings";
import { loadIntervals } from "./interval-rows";
import { loadSegments } from "./load-segments";
import { loadOnePointReadings } from "./point-readings";
import { lockPoint, recalculateEnergy } from "./recalculate-energy";
import { packBlocks, storeBlocks } from "./store-blocks";
import type { StoredRows } from "./stored-rows";

const app = testApp();

const minutes = (count: number, from: number, stepMin: number) =>
  Float64Array.from({ length: count }, (_, i) => from + i * stepMin * 60_000);

function steadyRows(count: number, from: number, flow = 28.8, stepMin = 5): StoredRows {
  const column = (value: number) => new Float64Array(count).fill(value);
  return {
    instantMs: minutes(count, from, stepMin),
    flow: { unit: "m3/h", values: column(flow) },
    supply: { unit: "degC", values: column(6.9) },
    return: { unit: "degC", values: column(12.8) },
    signal: null,
    quality: new Uint8Array(count),
  };
}

async function fileOf(organisationId: string, pointId: string, precedence: number) {
  const { id: importId } = await LogImport.create({
    organisationId,
    pointId,
    state: "imported",
    repair: DEFAULT_REPAIR_CHOICES,
    createdByAccountId: null,
    createdByName: "Test",
    createdAt: app.clock.date(),
  });
  return LogFile.create({
    organisationId,
    importId,
    pointId,
    name: "log.csv",
    sha256: "0".repeat(64),
    byteLength: 1,
    uploadedAt: app.clock.date(),
    precedence,
    seriesKind: "instantaneous",
    nominalStepMs: 300_000,
  });
}

async function store(pointId: string, organisationId: string, rows: StoredRows, precedence = 1) {
  const file = await fileOf(organisationId, pointId, precedence);
  await inTransaction(app.database, async (transaction) => {
    await lockPoint(app.database, transaction, pointId);
    await storeBlocks(
      transaction,
      { organisationId, pointId, logFileId: file.id },
      packBlocks(rows),
    );
    await recalculateEnergy(app.database, transaction, pointId, {
      startMs: rows.instantMs[0] as number,
      endMs: rows.instantMs[rows.instantMs.length - 1] as number,
    });
  });
  return file;
}

const always = [0, Date.UTC(2100, 0, 1)] as const;

test("the two-pipe day gives the published heating, cooling and suppressed energy once stored", async () => {
  // Scenario S10: an independent program worked these out from the same file, tolerance 0.05 %.
  const lines = readFileSync("test/fixtures/scenarios/S10/two_pipe.csv", "utf8")
    .trim()
    .split(/\r?\n/);
  const cells = lines.slice(1).map((line) => line.split(","));
  const column = (index: number) => Float64Array.from(cells, (row) => Number(row[index]));
  const { id: organisationId } = await organisation(app);
  const { point } = await pointToMeter(app, organisationId, {
    service: "changeover",
    meterSide: "supply",
    flowCutOffM3PerHour: 0.5,
    deltaTCutOffK: 0.5,
  });
  await store(point.id, organisationId, {
    instantMs: Float64Array.from(cells, (row) => Date.parse(row[0] ?? "")),
    flow: { unit: "m3/h", values: column(1) },
    supply: { unit: "degC", values: column(2) },
    return: { unit: "degC", values: column(3) },
    signal: null,
    quality: new Uint8Array(cells.length),
  });
  const [day] = await loadDays(app.database, point.id, "2025-04-16", "2025-04-17");
  expect(day?.totals.heating.energyKwh).toBeCloseTo(1646.25, 0);
  expect(day?.totals.cooling.energyKwh).toBeCloseTo(1569.19, 0);
  expect(day?.totals.suppressedKwh).toBeCloseTo(8.369, 2);
});

test("stored quarter-hours give back what was worked out, floats to seven digits", async () => {
  const { id: organisationId } = await organisation(app);
  const { point } = await pointToMeter(app, organisationId, { deltaTCutOffK: 5 });
  const rows = steadyRows(400, Date.UTC(2025, 5, 30, 22, 3, 30), 28.8, 7);
  rows.flow?.values.forEach((_, i, flow) => (flow[i] = Math.round(2880 + 300 * Math.sin(i)) / 100));
  rows.return?.values.forEach((_, i, back) => (back[i] = i % 9 === 0 ? 10 : 12.8));
  rows.quality[17] = 1;
  await store(point.id, organisationId, rows);
  const settings = await loadEnergySettings(app.database, point.id);
  const options = powerOptionsOf(settings);
  if (!options) throw new Error("water gives energy");
  const segments = await loadSegments(app.database, point.id, ...always);
  const expected = integrateEnergy(segments, options);
  const stored = await loadIntervals(app.database, point.id, ...always);
  expect(stored.startMs).toEqual(expected.startMs);
  expect(stored.cooling.energyKwh).toEqual(expected.cooling.energyKwh);
  const closeTo = (a: Float64Array, b: Float64Array) =>
    a.forEach((value, i) =>
      expect(Math.abs(value - (b[i] ?? NaN))).toBeLessThan(2e-7 * Math.abs(value) + 1e-9),
    );
  closeTo(expected.coveredS, stored.coveredS);
  closeTo(expected.volumeM3, stored.volumeM3);
  closeTo(expected.cooling.flowDeltaTM3K, stored.cooling.flowDeltaTM3K);
  closeTo(expected.cooling.runningS, stored.cooling.runningS);
  closeTo(expected.suppressedKwh, stored.suppressedKwh);
  closeTo(expected.supplyCs, stored.supplyCs);
  closeTo(expected.minPowerKw, stored.minPowerKw);
  expect(stored.excludedRows).toEqual(expected.excludedRows);
  expect(stored.apportioned).toEqual(expected.apportioned);
  const total = totalEnergy(expected);
  const days = await loadDays(app.database, point.id, "2025-06-01", "2025-08-01");
  const sum = days.reduce((kwh, day) => kwh + day.totals.cooling.energyKwh, 0);
  expect(sum).toBeCloseTo(total.cooling.energyKwh, 8);
});

test("a second file completes the first, and taking it out again leaves the first one's figures", async () => {
  const { id: organisationId } = await organisation(app);
  const { point } = await pointToMeter(app, organisationId);
  const morning = Date.UTC(2025, 6, 14, 6);
  await store(point.id, organisationId, steadyRows(13, morning));
  const before = await loadIntervals(app.database, point.id, ...always);
  // The same hour again and one more: the hour they share must not count twice.
  const second = await store(point.id, organisationId, steadyRows(25, morning), 2);
  const both = totalEnergy(await loadIntervals(app.database, point.id, ...always));
  // 28.8 m³/h, 6.90 → 12.80 °C on the return: 197.798 kW (worked interval of the trade's method).
  expect(both.cooling.energyKwh).toBeCloseTo(2 * 197.798, 2);
  await inTransaction(app.database, async (transaction) => {
    await lockPoint(app.database, transaction, point.id);
    await app.database.query("DELETE FROM reading_block WHERE log_file_id = :id", {
      replacements: { id: second.id },
      transaction,
    });
    await recalculateEnergy(app.database, transaction, point.id, null);
  });
  expect(await loadIntervals(app.database, point.id, ...always)).toEqual(before);
});

test("another zone of the site moves the days, and none of the old ones stays", async () => {
  const { id: organisationId } = await organisation(app);
  const { site, point } = await pointToMeter(app, organisationId);
  await store(point.id, organisationId, steadyRows(25, Date.UTC(2025, 6, 14, 22)));
  await site.update({ zone: "Pacific/Auckland" });
  await inTransaction(app.database, async (transaction) => {
    await recalculateEnergy(app.database, transaction, point.id, null);
  });
  const days = await loadDays(app.database, point.id, "2025-01-01", "2026-01-01");
  expect(days.map((day) => [day.date, day.totals.coveredS])).toEqual([["2025-07-15", 7200]]);
});

test("a loop of 30 % propylene glycol by mass has 5.88 % less energy than one of water", async () => {
  const { id: organisationId } = await organisation(app);
  const energyOf = async (fluidKind: "water" | "propyleneGlycol") => {
    const { point } = await pointToMeter(app, organisationId, { fluidKind });
    const rows = steadyRows(13, Date.UTC(2025, 6, 14));
    rows.supply?.values.fill(6);
    rows.return?.values.fill(12);
    await store(point.id, organisationId, rows);
    const state = await loadOnePointReadings(app.database, organisationId, point.id);
    expect(state).toMatchObject({ blockedBy: null, rowCount: 13 });
    const intervals = await loadIntervals(app.database, point.id, ...always);
    return intervals.cooling.energyKwh.reduce((sum, kwh) => sum + kwh, 0);
  };
  const glycol = await energyOf("propyleneGlycol");
  expect(glycol).toBeGreaterThan(0);
  expect(100 * (glycol / (await energyOf("water")) - 1)).toBeCloseTo(-5.88, 2);
});

test("a loop of a concentration outside the tables keeps its readings and shows no energy, with the reason", async () => {
  const { id: organisationId } = await organisation(app);
  const { point } = await pointToMeter(app, organisationId, {
    fluidKind: "propyleneGlycol",
    glycolVolumePercent: 61,
  });
  await store(point.id, organisationId, steadyRows(13, Date.UTC(2025, 6, 14)));
  const state = await loadOnePointReadings(app.database, organisationId, point.id);
  expect(state).toMatchObject({ blockedBy: "concentration", rowCount: 13, nominalStepMs: 300_000 });
  expect((await loadIntervals(app.database, point.id, ...always)).startMs.length).toBe(0);
  expect((await loadSegments(app.database, point.id, ...always))[0]?.columns.instantMs.length).toBe(
    13,
  );
});

test("frozen readings of a glycol loop give no energy, and water's limit is not theirs", async () => {
  const { id: organisationId } = await organisation(app);
  const blockAt = async (temperatureC: number) => {
    const { point } = await pointToMeter(app, organisationId, { fluidKind: "propyleneGlycol" });
    const rows = steadyRows(13, Date.UTC(2025, 6, 14));
    rows.supply?.values.fill(temperatureC);
    await store(point.id, organisationId, rows);
    return loadOnePointReadings(app.database, organisationId, point.id);
  };
  // ASHRAE tables: 30 % propylene glycol by mass freezes at −12.7 °C.
  expect(await blockAt(-12)).toMatchObject({ blockedBy: null, outsideFluidRows: 0 });
  expect(await blockAt(-13)).toMatchObject({ blockedBy: "outsideFluid", outsideFluidRows: 13 });
});

test("points that glycol used to block are worked out again after the update", async () => {
  const { id: organisationId } = await organisation(app);
  const { point } = await pointToMeter(app, organisationId, { fluidKind: "propyleneGlycol" });
  await store(point.id, organisationId, steadyRows(13, Date.UTC(2025, 6, 14)));
  const write = (sql: string) => app.database.query(sql, { replacements: { id: point.id } });
  await write("UPDATE point_readings SET blocked_by = 'glycol' WHERE point_id = :id");
  await energyBlocks.up(app.database.getQueryInterface());
  await energyBlocks.up(app.database.getQueryInterface());
  const state = await loadOnePointReadings(app.database, organisationId, point.id);
  expect(state).toMatchObject({ blockedBy: null, recalculating: true });
  const jobs = await app.database.query("SELECT kind, state FROM job WHERE point_id = :id", {
    replacements: { id: point.id },
    type: QueryTypes.SELECT,
  });
  expect(jobs).toEqual([{ kind: "recalculate", state: "queued" }]);
});

test("a year of minutes takes at most twelve bytes a reading, all tables together", async () => {
  // speed goal G6
  const { id: organisationId } = await organisation(app);
  const { point } = await pointToMeter(app, organisationId);
  let state = 7;
  const noise = () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647 - 0.5;
  const rows = steadyRows(525_600, Date.UTC(2025, 0, 1), 28.8, 1);
  const shape = (i: number) => Math.sin((i / 1440) * 2 * Math.PI);
  const round = (value: number) => Math.round(value * 100) / 100;
  rows.flow?.values.forEach((_, i, to) => (to[i] = round(28 + 8 * shape(i) + noise())));
  rows.supply?.values.forEach((_, i, to) => (to[i] = round(6 + 0.3 * noise())));
  rows.return?.values.forEach((_, i, to) => (to[i] = round(12 + shape(i) + 0.3 * noise())));
  await store(point.id, organisationId, rows);
  const tables = ["reading_block", "interval_energy", "day_energy"];
  for (const table of tables)
    await app.database.query(`ANALYZE TABLE ${table}`, { type: QueryTypes.SELECT });
  // Pages in use: a table's file grows by whole megabytes, which says little about one year.
  const sizes = await app.database.query<{ pages: string }>(
    `SELECT SUM(stat_value) AS pages FROM mysql.innodb_index_stats
      WHERE database_name = DATABASE() AND stat_name = 'n_leaf_pages' AND table_name IN (:tables)`,
    { replacements: { tables }, type: QueryTypes.SELECT },
  );
  const bytesEach = (Number(sizes[0]?.pages) * 16_384) / 525_600;
  expect(bytesEach).toBeGreaterThan(2);
  expect(bytesEach).toBeLessThanOrEqual(12);
});
