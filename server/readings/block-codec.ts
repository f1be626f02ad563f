import { constants, deflateRawSync, inflateRawSync } from "node:zlib";
import type {
  ColumnUnit,
  CountedEnergyUnit,
  CountedVolumeUnit,
  ElectricPowerUnit,
  FlowUnit,
  LoopPressureUnit,
  MeterPowerUnit,
  OutdoorUnit,
  TemperatureUnit,
} from "@shared/domain/log-files/recipe";
import { ByteReader, ByteWriter } from "./byte-columns";
import {
  CHANNEL_NAMES,
  ChannelBit,
  channelSetOf,
  type StoredChannel,
  type StoredRows,
} from "./stored-rows";

/**
 * A reading block: the rows of one file on one UTC day, packed.
 *
 * Numbers a logger wrote have few decimals, so each column is whole numbers of its last decimal,
 * stored as differences from row to row; instants are differences of differences, all zero for a
 * steady step; then deflate level 1. What comes back is bit for bit what went in, −0 read as 0. A
 * column with more decimals than fit keeps its doubles. The worked example is in the test: 1,440
 * minutes of flow and two temperatures take about four kilobytes.
 *
 * Layout after inflating: channel set, row count, instants, quality runs, then per channel its unit
 * code, its decimals (255: doubles) and its numbers. Readers of an older `BLOCK_FORMAT` must stay:
 * in format 1 the channel set is one byte, since then an integer of any length.
 */
export const BLOCK_FORMAT = 2;
const BYTE_SET_FORMAT = 1;

/** Stored; never renumber. */
const unitCodes: readonly ColumnUnit[] = [
  "m3/h",
  "L/s",
  "L/min",
  "US gpm",
  "degC",
  "degF",
  "K",
  "%",
  "kW",
  "MW",
  "W",
  "MBH",
  "ton",
  "m3",
  "L",
  "US gal",
  "ft3",
  "kWh",
  "MWh",
  "MJ",
  "GJ",
  "kBtu",
  "MMBtu",
  "L/h",
  "kPa",
  "bar",
  "psi",
];
const AS_DOUBLES = 255;
const MOST_DECIMALS = 9;
/** Differences of numbers below this fit the fast integers. */
const LARGEST = 2 ** 29;

const deflateOptions = { level: constants.Z_BEST_SPEED };

/**
 * Packs rows of one UTC day. `rows.instantMs` must be whole milliseconds, strictly ascending.
 * @throws RangeError for an empty block, which nothing should store.
 */
export function encodeBlock(rows: StoredRows): Buffer {
  const count = rows.instantMs.length;
  if (count === 0) throw new RangeError("a reading block holds at least one row");
  const out = new ByteWriter(64 + count * 14);
  out.integer(channelSetOf(rows));
  out.integer(count);
  writeInstants(out, rows.instantMs);
  writeQuality(out, rows.quality);
  for (const name of CHANNEL_NAMES) {
    const channel = rows[name];
    if (channel) writeChannel(out, channel);
  }
  return deflateRawSync(out.finish(), deflateOptions);
}

/** Where a block's columns are unpacked to: arrays of just so many rows. */
export interface BlockRoom {
  instants(count: number): Float64Array;
  /** `bit` is the channel's. */
  numbers(bit: number, count: number): Float64Array;
  quality(count: number): Uint8Array;
}

const newRoom: BlockRoom = {
  instants: (count) => new Float64Array(count),
  numbers: (_bit, count) => new Float64Array(count),
  quality: (count) => new Uint8Array(count),
};

/**
 * Unpacks what {@link encodeBlock} packed into new arrays, or into those that `room` gives.
 * @throws RangeError for another format or damaged bytes.
 */
export function decodeBlock(packed: Uint8Array, format: number, room = newRoom): StoredRows {
  if (format !== BLOCK_FORMAT && format !== BYTE_SET_FORMAT)
    throw new RangeError(
      `reading block of format ${format}; this server reads ${BYTE_SET_FORMAT} and ${BLOCK_FORMAT}`,
    );
  const input = new ByteReader(inflateRawSync(packed));
  const channels = format === BYTE_SET_FORMAT ? input.byte() : input.integer();
  const count = input.integer();
  const instantMs = readInstants(input, room.instants(count));
  const quality = readQuality(input, room.quality(count));
  const read = <Unit extends ColumnUnit>(bit: number): StoredChannel<Unit> | null =>
    (channels & bit) === 0
      ? null
      : (readChannel(input, room.numbers(bit, count)) as StoredChannel<Unit>);
  const water = {
    flow: read<FlowUnit>(ChannelBit.flow),
    supply: read<TemperatureUnit>(ChannelBit.supply),
    return: read<TemperatureUnit>(ChannelBit.return),
    signal: read<"%">(ChannelBit.signal),
  };
  if (channels < ChannelBit.power) return { instantMs, ...water, quality };
  const metered = {
    power: read<MeterPowerUnit>(ChannelBit.power),
    volumeCounter: read<CountedVolumeUnit>(ChannelBit.volumeCounter),
    heatingCounter: read<CountedEnergyUnit>(ChannelBit.heatingCounter),
    coolingCounter: read<CountedEnergyUnit>(ChannelBit.coolingCounter),
  };
  if (channels < ChannelBit.outdoor) return { instantMs, ...water, ...metered, quality };
  return {
    instantMs,
    ...water,
    ...metered,
    outdoor: read<OutdoorUnit>(ChannelBit.outdoor),
    electricPower: read<ElectricPowerUnit>(ChannelBit.electricPower),
    pressure: read<LoopPressureUnit>(ChannelBit.pressure),
    quality,
  };
}

/** Steps within a day stay below 2^27 ms, so their differences fit the fast integers. */
function writeInstants(out: ByteWriter, instantMs: Float64Array): void {
  let before = instantMs[0] as number;
  let step = 0;
  out.signed(before);
  const coded = new Uint32Array(instantMs.length - 1);
  for (let i = 1; i < instantMs.length; i++) {
    const at = instantMs[i] as number;
    const difference = at - before - step;
    coded[i - 1] = difference < 0 ? -2 * difference - 1 : 2 * difference;
    step = at - before;
    before = at;
  }
  out.integers(coded);
}

function readInstants(input: ByteReader, instantMs: Float64Array): Float64Array {
  const count = instantMs.length;
  let at = input.signed();
  let step = 0;
  instantMs[0] = at;
  const coded = input.integers(count - 1);
  for (let i = 1; i < count; i++) {
    const code = coded[i - 1] as number;
    step += (code & 1) === 0 ? code >>> 1 : -(code >>> 1) - 1;
    at += step;
    instantMs[i] = at;
  }
  return instantMs;
}

/** Runs of one code: most blocks are a single run. */
function writeQuality(out: ByteWriter, quality: Uint8Array): void {
  for (let from = 0; from < quality.length;) {
    let to = from + 1;
    while (to < quality.length && quality[to] === quality[from]) to++;
    out.byte(quality[from] as number);
    out.integer(to - from);
    from = to;
  }
}

function readQuality(input: ByteReader, quality: Uint8Array): Uint8Array {
  for (let from = 0; from < quality.length;) {
    const code = input.byte();
    const length = input.integer();
    quality.fill(code, from, from + length);
    from += length;
  }
  return quality;
}

function writeChannel(out: ByteWriter, { unit, values }: StoredChannel<ColumnUnit>): void {
  out.byte(unitCodes.indexOf(unit));
  const quantised = quantise(values);
  out.byte(quantised?.decimals ?? AS_DOUBLES);
  if (quantised === null) {
    out.doubles(values);
    return;
  }
  const { whole } = quantised;
  const coded = new Uint32Array(values.length);
  let before = 0;
  for (let i = 0; i < coded.length; i++) {
    // 0 stands for "no reading", which is why every difference is one higher.
    if (values[i] !== values[i]) continue;
    const difference = (whole[i] as number) - before;
    coded[i] = difference < 0 ? -2 * difference : 2 * difference + 1;
    before = whole[i] as number;
  }
  out.integers(coded);
}

function readChannel(input: ByteReader, values: Float64Array): StoredChannel<ColumnUnit> {
  const code = input.byte();
  const unit = unitCodes[code];
  if (unit === undefined) throw new RangeError(`unknown unit ${code} in a reading block`);
  const decimals = input.byte();
  if (decimals === AS_DOUBLES) input.doubles(values);
  else input.differences(values, 10 ** decimals);
  return { unit, values };
}

/**
 * The values as whole numbers of their last decimal, with the fewest decimals under which each comes
 * back bit for bit, or null where there are too many. A decimal number as read is the double nearest
 * to n / 10^d, and so is the quotient, so for numbers a logger wrote the comparison is exact.
 */
function quantise(values: Float64Array): { decimals: number; whole: Int32Array } | null {
  const whole = new Int32Array(values.length);
  let decimals = 0;
  let scale = 1;
  for (let i = 0; i < values.length; i++) {
    const value = values[i] as number;
    if (value !== value) continue;
    const rounded = Math.round(value * scale);
    if (rounded > LARGEST || rounded < -LARGEST) return null;
    if (rounded / scale === value) {
      whole[i] = rounded;
      continue;
    }
    if (++decimals > MOST_DECIMALS) return null;
    scale = 10 ** decimals;
    // All before are to be scaled anew; it happens a few times a block at most.
    i = -1;
  }
  return { decimals, whole };
}
