import * as fc from "fast-check";
import { BLOCK_FORMAT, decodeBlock, encodeBlock } from "./block-codec";
import { inSiUnits, type StoredRows } from "./stored-rows";

const FORMAT_1_BLOCK = "a2RquHDzcUPagZXsDEwMjPLcggz8rAA=";
const midnight = Date.UTC(2025, 6, 14);

function rowsOf(count: number, value: (row: number) => number): StoredRows {
  return {
    instantMs: Float64Array.from({ length: count }, (_, row) => midnight + row * 60_000),
    flow: { unit: "US gpm", values: Float64Array.from({ length: count }, (_, row) => value(row)) },
    supply: { unit: "degF", values: Float64Array.from({ length: count }, () => 44.1) },
    return: null,
    signal: null,
    quality: new Uint8Array(count),
  };
}

test("every column comes back bit for bit, whatever the decimals, holes and steps", () => {
  const cell = fc.oneof(
    { weight: 6, arbitrary: fc.tuple(fc.integer({ min: -2e6, max: 2e6 }), fc.nat(4)) },
    { weight: 1, arbitrary: fc.constant(null) },
  );
  const number = cell.map((given) => (given === null ? NaN : Number(`${given[0]}e-${given[1]}`)));
  const anyNumber = fc.oneof(
    { weight: 9, arbitrary: number },
    { weight: 1, arbitrary: fc.double() },
  );
  const row = fc.record({
    step: fc.integer({ min: 1, max: 100_000 }),
    flow: anyNumber,
    supply: number,
    signal: fc.integer({ min: 0, max: 100 }),
    quality: fc.nat(2),
  });
  fc.assert(
    fc.property(fc.array(row, { minLength: 1, maxLength: 200 }), (given) => {
      let at = midnight;
      const rows: StoredRows = {
        instantMs: Float64Array.from(given, ({ step }) => (at += step)),
        // Adding 0 turns −0 into 0, which is how it is kept.
        flow: { unit: "L/s", values: Float64Array.from(given, (r) => r.flow + 0) },
        supply: null,
        return: { unit: "degF", values: Float64Array.from(given, (r) => r.supply + 0) },
        signal: { unit: "%", values: Float64Array.from(given, (r) => r.signal) },
        quality: Uint8Array.from(given, (r) => r.quality),
      };
      expect(decodeBlock(encodeBlock(rows), BLOCK_FORMAT)).toEqual(rows);
    }),
    { numRuns: 300 },
  );
});

test("a large number that needs fewer decimals than a later one is kept exactly", () => {
  const rows = rowsOf(2, (row) => (row === 0 ? 500_000_000 : 0.125));
  expect(decodeBlock(encodeBlock(rows), BLOCK_FORMAT).flow?.values).toEqual(
    Float64Array.of(500_000_000, 0.125),
  );
});

test("companion series stand behind the readings, and in a block of their own", () => {
  const beside: StoredRows = {
    ...rowsOf(3, (row) => row),
    power: null,
    volumeCounter: null,
    heatingCounter: null,
    coolingCounter: null,
    outdoor: { unit: "degF", values: Float64Array.of(59, NaN, 14.5) },
    electricPower: { unit: "W", values: Float64Array.of(730, 731, 0) },
    pressure: { unit: "psi", values: Float64Array.of(29.4, 29.5, 29.4) },
  };
  expect(decodeBlock(encodeBlock(beside), BLOCK_FORMAT)).toEqual(beside);
  const alone: StoredRows = { ...beside, flow: null, supply: null, electricPower: null };
  const read = decodeBlock(encodeBlock(alone), BLOCK_FORMAT);
  expect(read).toEqual(alone);
  const si = inSiUnits(read);
  expect([...si.outdoorC!].map((value) => Math.round(value * 1e6) / 1e6)).toEqual([
    15,
    NaN,
    -9.722222,
  ]);
  // NIST SP 811: 1 psi = 6.894757 kPa.
  expect(si.pressureKpa?.[0]).toBeCloseTo(29.4 * 6.894757, 4);
  expect(si.electricKw).toBeUndefined();
});

test("a block of format 1, whose channel set is a byte, is read as ever", () => {
  // Flow and cooling counter of two rows, written before the set became an integer.
  const written = Buffer.from(FORMAT_1_BLOCK, "base64");
  expect(decodeBlock(written, 1)).toEqual({
    instantMs: Float64Array.of(midnight, midnight + 60_000),
    flow: { unit: "m3/h", values: Float64Array.of(1.5, 2) },
    supply: null,
    return: null,
    signal: null,
    power: null,
    volumeCounter: null,
    heatingCounter: null,
    coolingCounter: { unit: "kWh", values: Float64Array.of(7, 9) },
    quality: new Uint8Array(2),
  });
});

test("a day of minutes with noisy readings takes less than five bytes a row", () => {
  let state = 1;
  const noise = () => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647;
  const rows: StoredRows = {
    ...rowsOf(1440, () => 0),
    flow: { unit: "m3/h", values: Float64Array.from({ length: 1440 }, () => round(28 + noise())) },
    supply: {
      unit: "degC",
      values: Float64Array.from({ length: 1440 }, () => round(6 + noise() / 5)),
    },
    return: {
      unit: "degC",
      values: Float64Array.from({ length: 1440 }, () => round(12 + noise() / 5)),
    },
  };
  expect(encodeBlock(rows).length).toBeLessThan(1440 * 5);
});

test("readings in the logger's own unit become m³/h and °C", () => {
  const si = inSiUnits(rowsOf(1, () => 100));
  // NIST SP 811: 1 gal = 231 in³, so 100 US gpm = 22.712470704 m³/h; 44.1 °F = 6.7222 °C.
  expect(si.flowM3PerHour?.[0]).toBeCloseTo(22.712470704, 9);
  expect(si.supplyC?.[0]).toBeCloseTo(12.1 / 1.8, 9);
  expect(si.returnC).toBeNull();
});

test("a block of an unknown format or with lost bytes is refused", () => {
  const packed = encodeBlock(rowsOf(10, (row) => row));
  expect(() => decodeBlock(packed, 99)).toThrow("format 99");
  expect(() => decodeBlock(packed.subarray(0, packed.length - 4), BLOCK_FORMAT)).toThrow();
});

function round(value: number): number {
  return Math.round(value * 100) / 100;
}
