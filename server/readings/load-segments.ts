import { QueryTypes, type Transaction } from "sequelize";
import type {
  ReadingColumns,
  ReadingSegment,
  SeriesKind,
} from "@shared/domain/readings/reading-columns";
import { resolveSegments, type ReadingSource } from "@shared/domain/readings/resolve-segments";
import { selectMany } from "@server/database/bulk";
import type { Database } from "@server/database/connect";
import { decodeBlock } from "./block-codec";
import { inSiUnits } from "./stored-rows";

interface FileOfPoint {
  readonly id: string;
  readonly precedence: number;
  readonly kind: SeriesKind;
  readonly nominalStepMs: number | null;
}

/** A step over this many nominal steps is a hole everywhere, so no row reaches further. */
const farthestSteps = 4;

async function filesOf(
  database: Database,
  pointId: string,
  transaction?: Transaction,
): Promise<FileOfPoint[]> {
  return database.query<FileOfPoint>(
    `SELECT id, precedence, series_kind AS kind, nominal_step_ms AS nominalStepMs
       FROM log_file WHERE point_id = :pointId AND precedence IS NOT NULL`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
}

/** How far outside a range a row can still matter inside it, ms; at least an hour. */
function reachOf(files: readonly FileOfPoint[]): number {
  const longest = Math.max(900_000, ...files.map((file) => file.nominalStepMs ?? 0));
  return farthestSteps * longest;
}

export async function reachOfPoint(
  database: Database,
  pointId: string,
  transaction?: Transaction,
): Promise<number> {
  return reachOf(await filesOf(database, pointId, transaction));
}

const utcDate = (ms: number) => new Date(ms).toISOString().slice(0, 10);

/**
 * What each file of a point holds in [fromMs, toMs) and somewhat beyond: whole UTC days, with room
 */
export async function loadSources(
  database: Database,
  pointId: string,
  fromMs: number,
  toMs: number,
  transaction?: Transaction,
): Promise<ReadingSource[]> {
  const files = await filesOf(database, pointId, transaction);
  if (files.length === 0 || !(fromMs < toMs)) return [];
  const reach = reachOf(files);
  const rows = await selectMany(
    database,
    `SELECT log_file_id, channel_set, format, data FROM reading_block
      WHERE point_id = ? AND day >= ? AND day <= ? ORDER BY day`,
    [pointId, utcDate(fromMs - reach), utcDate(toMs + reach)],
    transaction,
  );
  const blocksBySource = new Map<string, ReadingColumns[]>();
  for (const [fileId, channelSet, format, data] of rows) {
    if (!Buffer.isBuffer(data)) throw new Error(`a reading block of point ${pointId} has no data`);
    const key = `${String(fileId)}/${String(channelSet)}`;
    const blocks = blocksBySource.get(key) ?? [];
    blocks.push(inSiUnits(decodeBlock(data, Number(format))));
    blocksBySource.set(key, blocks);
  }
  const byId = new Map(files.map((file) => [String(file.id), file]));
  return [...blocksBySource].flatMap(([key, blocks]) => {
    const file = byId.get(key.slice(0, key.indexOf("/")));
    if (!file) return [];
    const { precedence, kind, nominalStepMs } = file;
    return [{ precedence, kind, nominalStepMs, columns: joinColumns(blocks) }];
  });
}

/**
 * The readings of a point over [fromMs, toMs), resolved: overlapping files settled, temperatures
 * aligned to flow. Besides the rows inside, each end carries the one row beyond it, so that lines
 * and steps can be drawn and integrated up to the edge. SI units; see {@link ReadingColumns}. The
 * point must have been found through the organisation's scope.
 */
export async function loadSegments(
  database: Database,
  pointId: string,
  fromMs: number,
  toMs: number,
  transaction?: Transaction,
): Promise<ReadingSegment[]> {
  const sources = await loadSources(database, pointId, fromMs, toMs, transaction);
  return trimSegments(resolveSegments(sources), fromMs, toMs);
}

/** Rows of [fromMs, toMs) with one neighbour at either end, however the segments lie. */
export function trimSegments(
  segments: readonly ReadingSegment[],
  fromMs: number,
  toMs: number,
): ReadingSegment[] {
  const starts = segments.flatMap(({ columns }) => lastBefore(columns.instantMs, fromMs) ?? []);
  const ends = segments.flatMap(({ columns }) => firstFrom(columns.instantMs, toMs) ?? []);
  const startMs = Math.max(-Infinity, ...starts);
  const endMs = Math.min(Infinity, ...ends);
  return segments.flatMap((segment) => {
    const { instantMs } = segment.columns;
    const from = indexFrom(instantMs, startMs);
    const to = endMs === Infinity ? instantMs.length : indexFrom(instantMs, endMs + 1);
    if (from >= to) return [];
    return [{ ...segment, columns: sliceColumns(segment.columns, from, to) }];
  });
}

function lastBefore(instantMs: Float64Array, ms: number): number | undefined {
  return instantMs[indexFrom(instantMs, ms) - 1];
}

function firstFrom(instantMs: Float64Array, ms: number): number | undefined {
  return instantMs[indexFrom(instantMs, ms)];
}

/** Index of the first instant ≥ ms. */
export function indexFrom(instantMs: Float64Array, ms: number): number {
  let low = 0;
  let high = instantMs.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((instantMs[middle] as number) < ms) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** The rows `from` ≤ index < `to` as views of the same memory. */
export function sliceColumns(columns: ReadingColumns, from: number, to: number): ReadingColumns {
  if (from === 0 && to === columns.instantMs.length) return columns;
  return {
    instantMs: columns.instantMs.subarray(from, to),
    flowM3PerHour: columns.flowM3PerHour?.subarray(from, to) ?? null,
    supplyC: columns.supplyC?.subarray(from, to) ?? null,
    returnC: columns.returnC?.subarray(from, to) ?? null,
    signalPercent: columns.signalPercent?.subarray(from, to) ?? null,
    quality: columns.quality.subarray(from, to),
  };
}

function joinColumns(blocks: readonly ReadingColumns[]): ReadingColumns {
  const [first] = blocks;
  if (!first || blocks.length === 1) return first as ReadingColumns;
  const length = blocks.reduce((sum, block) => sum + block.instantMs.length, 0);
  const join = (pick: (block: ReadingColumns) => Float64Array | null): Float64Array | null => {
    if (pick(first) === null) return null;
    const joined = new Float64Array(length);
    let at = 0;
    for (const block of blocks) {
      const part = pick(block);
      if (part) joined.set(part, at);
      at += block.instantMs.length;
    }
    return joined;
  };
  const quality = new Uint8Array(length);
  let at = 0;
  for (const block of blocks) {
    quality.set(block.quality, at);
    at += block.quality.length;
  }
  return {
    instantMs: join((block) => block.instantMs) as Float64Array,
    flowM3PerHour: join((block) => block.flowM3PerHour),
    supplyC: join((block) => block.supplyC),
    returnC: join((block) => block.returnC),
    signalPercent: join((block) => block.signalPercent),
    quality,
  };
}
