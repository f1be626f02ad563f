import { INTERVAL_MS, type IntervalEnergyColumns } from "@shared/domain/energy/interval-energy";
import { sumIntervals } from "@shared/domain/energy/totals";
import { HOUR_MS } from "@shared/domain/time/interval";
import { inTransaction } from "@server/database/transaction";
import { testApp } from "@server/testing/test-app";
import { loadIntervals, replaceIntervals } from "./interval-rows";
import { loadIntervalSums } from "./interval-sums";

const app = testApp();
const pointId = "4711";
const startMs = Date.UTC(2026, 2, 28, 22, 30);
const count = 400;

/** Numbers without a pattern, the same in every run. */
function numbers(seed: number): () => number {
  let state = seed;
  return () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647;
}

/** Quarter-hours of every kind: whole and cut, with either register, both or none, and holes. */
function intervals(): IntervalEnergyColumns {
  const random = numbers(42);
  const kept = Array.from({ length: count }, (_, i) => i).filter(() => random() > 0.1);
  const column = (value: (row: number) => number) =>
    Float64Array.from(kept, (_, row) => value(row));
  const some = (share: number, greatest: number) =>
    column(() => (random() < share ? random() * greatest : 0));
  const coveredS = column(() => [900, 900, 900, random() * 900, 0][Math.floor(random() * 5)] ?? 0);
  const meterOnlyS = coveredS.map((s) => [0, 0, 0, s / 3, s][Math.floor(random() * 5)] ?? 0);
  const waterS = coveredS.map((s, row) => s - (meterOnlyS[row] ?? 0));
  const covers = (row: number) => (coveredS[row] ?? 0) > 0;
  const supplyC = column(() => 6 + random());
  const returnC = column(() => 12 + random());
  const register = (sign: 1 | -1) => {
    const runs = column((row) => (covers(row) && random() < 0.6 ? 1 : 0));
    const runningS = coveredS.map((s, row) => s * (runs[row] ?? 0) * (random() < 0.5 ? 1 : 0.5));
    const ran = (greatest: number) => runs.map((on) => on * (0.01 + random() * greatest));
    return {
      energyKwh: ran(50),
      volumeM3: ran(8),
      flowDeltaTM3K: ran(40),
      powerDeltaTKwhK: ran(300),
      // What the mean temperatures give is not stored, another integral is.
      deltaTKs: runningS.map((s, row) =>
        random() < 0.5 ? sign * ((supplyC[row] ?? 0) - (returnC[row] ?? 0)) * s : s * random(),
      ),
      runningS,
    };
  };
  const heating = register(1);
  const cooling = register(-1);
  const extreme = (least: number) => column((row) => (covers(row) ? least + random() : NaN));
  return {
    startMs: Float64Array.from(kept, (i) => startMs + i * INTERVAL_MS),
    coveredS,
    heating,
    cooling,
    volumeM3: column(
      (row) =>
        (heating.volumeM3[row] ?? 0) + (cooling.volumeM3[row] ?? 0) + (random() < 0.5 ? 0 : 0.5),
    ),
    suppressedKwh: some(0.3, 1),
    suppressedS: some(0.3, 900),
    minPowerKw: extreme(-200),
    maxPowerKw: extreme(-180),
    minFlowM3PerHour: extreme(0),
    maxFlowM3PerHour: extreme(28),
    supplyCs: waterS.map((s, row) => s * (supplyC[row] ?? 0)),
    returnCs: waterS.map((s, row) => s * (returnC[row] ?? 0)),
    measuredRows: column(() => Math.floor(random() * 16)),
    excludedRows: column(() => Math.floor(random() * 2)),
    noReadingRows: column(() => Math.floor(random() * 2)),
    apportioned: Uint8Array.from(kept, () => (random() < 0.2 ? 1 : 0)),
    meterOnlyS,
    againstRows: column(() => Math.floor(random() * 2)),
  };
}

it.each([
  ["hours", HOUR_MS, 100],
  ["half hours", HOUR_MS / 2, 200],
  ["days", 24 * HOUR_MS, 5],
  ["quarter-hours", INTERVAL_MS, 7],
])(
  "the database adds up %s to the figures that the rows themselves give",
  async (_, stepMs, steps) => {
    const end = startMs + count * INTERVAL_MS;
    const range = { fromMs: startMs, toMs: end };
    await inTransaction(app.database, (transaction) =>
      replaceIntervals(app.database, transaction, pointId, range, intervals()),
    );
    const periods = Array.from({ length: steps }, (_unused, i) => ({
      startMs: startMs + i * stepMs,
      endMs: startMs + (i + 1) * stepMs,
    }));
    const sums = await loadIntervalSums(app.database, pointId, { startMs, stepMs, count: steps });
    const rows = await loadIntervals(app.database, pointId, startMs, startMs + steps * stepMs);
    expect(sumIntervals(sums, periods)).toEqual(sumIntervals(rows, periods));
    expect(sumIntervals(sums, periods).some((totals) => totals.meanSupplyC !== null)).toBe(true);
  },
);
