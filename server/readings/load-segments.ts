import { QueryTypes, type Transaction } from "sequelize";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { GAP_FACTOR, type GapRule } from "@shared/domain/readings/covered-steps";
import {
  mapChannels,
  type ReadingColumns,
  type ReadingSegment,
  type SeriesKind,
} from "@shared/domain/readings/reading-columns";
import {
  resolveSegments,
  type MeterFacts,
  type ReadingSource,
} from "@shared/domain/readings/resolve-segments";
import { selectMany, type SqlRow } from "@server/database/bulk";
import type { Database } from "@server/database/connect";
import { decodeBlock, type BlockRoom } from "./block-codec";
import { correctClock, loggerInstantMs } from "@shared/domain/readings/corrections/clock";
import { correctSegments } from "@shared/domain/readings/corrections/correct-segments";
import {
  loadPointCorrections,
  type FileCorrections,
  type PointCorrections,
} from "./point-corrections";
import { meterFacts, meterPlaceColumns, type MeterPlace } from "./meter-facts";
import { inSiUnits, inUnits } from "./stored-rows";

interface FileOfPoint {
  readonly id: string;
  readonly precedence: number;
  readonly kind: SeriesKind;
  readonly nominalStepMs: number | null;
  /** Only for a file of a permanent meter. */
  readonly meter: MeterFacts | null;
  /** The point's rule for what a hole between its readings is. */
  readonly gapRule: GapRule;
}

/** A step over this many nominal steps is a hole everywhere, so no row reaches further. */
const farthestSteps = 4;

async function filesOf(
  database: Database,
  pointId: string,
  transaction?: Transaction,
): Promise<FileOfPoint[]> {
  const rows = await database.query<
    Omit<FileOfPoint, "meter" | "gapRule"> & MeterPlace & { meterRecipe: string | null }
  >(
    // Only recipes of permanent meters hold a "meter".
    `SELECT f.id, f.precedence, f.series_kind AS kind, f.nominal_step_ms AS nominalStepMs,
            IF(JSON_EXISTS(f.recipe, '$.meter'), f.recipe, NULL) AS meterRecipe, ${meterPlaceColumns}
       FROM log_file f JOIN metering_point p ON p.id = f.point_id JOIN \`loop\` l ON l.id = p.loop_id
      WHERE f.point_id = :pointId AND f.precedence IS NOT NULL`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map(({ id, precedence, kind, nominalStepMs, meterRecipe, ...place }) => ({
    id,
    precedence,
    kind,
    nominalStepMs,
    gapRule: place.gapRule,
    meter: meterRecipe === null ? null : meterFacts(JSON.parse(meterRecipe) as FileRecipe, place),
  }));
}

/** How far outside a range a row can still matter inside it, ms; at least an hour. */
function reachOf(files: readonly FileOfPoint[]): number {
  const longest = Math.max(900_000, ...files.map((file) => file.nominalStepMs ?? 0));
  return farthestSteps * longest;
}

export interface PointSteps {
  readonly reach: number;
  /** Shortest step of the point's files, ms; 0 where none knows its own. */
  readonly shortestMs: number;
}

export async function stepsOfPoint(
  database: Database,
  pointId: string,
  transaction?: Transaction,
): Promise<PointSteps> {
  const files = await filesOf(database, pointId, transaction);
  const steps = files.flatMap(({ nominalStepMs }) => nominalStepMs ?? []);
  return { reach: reachOf(files), shortestMs: steps.length === 0 ? 0 : Math.min(...steps) };
}

const utcDate = (ms: number) => new Date(ms).toISOString().slice(0, 10);

/** What is stored of a point, as it comes from the database: see {@link sourcesOf}. */
export interface StoredBlocks {
  readonly files: readonly FileOfPoint[];
  readonly rows: readonly SqlRow[];
  readonly corrections: PointCorrections;
}

/** A step over this many nominal steps is a hole, by the rule of the point the blocks are of. */
export function gapFactorOf({ files: [first] }: StoredBlocks): number {
  return GAP_FACTOR[first?.gapRule ?? "survey"];
}

/**
 * The blocks of each file over [fromMs, toMs) and somewhat beyond: whole UTC days, with room. A file
 * whose clock was off is asked for the days its logger showed then. `corrections` are the applied
 * ones unless given.
 */
export async function loadBlocks(
  database: Database,
  pointId: string,
  fromMs: number,
  toMs: number,
  transaction?: Transaction,
  corrections?: PointCorrections,
): Promise<StoredBlocks> {
  const [files, standing] = await Promise.all([
    filesOf(database, pointId, transaction),
    corrections ?? loadPointCorrections(database, pointId, transaction),
  ]);
  if (files.length === 0 || !(fromMs < toMs)) return { files, rows: [], corrections: standing };
  const reach = reachOf(files);
  const shifted = files.flatMap(({ id }) => {
    const clock = standing.files.get(id)?.clock;
    return clock ? [{ id, clock }] : [];
  });
  const others = shifted.length === 0 ? "" : `AND log_file_id NOT IN (${shifted.map(() => "?")})`;
  const rows = [
    ...(await selectMany(
      database,
      `${selectBlocks} WHERE point_id = ? AND day >= ? AND day <= ? ${others} ORDER BY day`,
      [pointId, utcDate(fromMs - reach), utcDate(toMs + reach), ...shifted.map(({ id }) => id)],
      transaction,
    )),
  ];
  for (const { id, clock } of shifted) {
    const days = [fromMs - reach, toMs + reach].map((ms) => utcDate(loggerInstantMs(ms, clock)));
    rows.push(
      ...(await selectMany(
        database,
        `${selectBlocks} WHERE point_id = ? AND day >= ? AND day <= ? AND log_file_id = ? ORDER BY day`,
        [pointId, ...days, id],
        transaction,
      )),
    );
  }
  return { files, rows, corrections: standing };
}

const selectBlocks = "SELECT log_file_id, channel_set, row_count, format, data FROM reading_block";

/**
 * What each file of a point holds in [fromMs, toMs) and somewhat beyond: whole UTC days, with room.
 * Clocks and units are put right; what corrects stretches of the point is put on resolved segments.
 */
export async function loadSources(
  database: Database,
  pointId: string,
  fromMs: number,
  toMs: number,
  transaction?: Transaction,
): Promise<ReadingSource[]> {
  return sourcesOf(await loadBlocks(database, pointId, fromMs, toMs, transaction));
}

/** Blocks unpacked, each file's channel set joined to one source. */
function sourcesOf({ files, rows, corrections }: StoredBlocks): ReadingSource[] {
  const blocksBySource = new Map<string, PackedBlock[]>();
  for (const [fileId, channelSet, rowCount, format, data] of rows) {
    if (!Buffer.isBuffer(data))
      throw new Error(`a reading block of file ${String(fileId)} is empty`);
    const key = `${String(fileId)}/${String(channelSet)}`;
    const blocks = blocksBySource.get(key) ?? [];
    blocks.push({ rowCount: Number(rowCount), format: Number(format), data });
    blocksBySource.set(key, blocks);
  }
  const byId = new Map(files.map((file) => [String(file.id), file]));
  return [...blocksBySource].flatMap(([key, blocks]) => {
    const file = byId.get(key.slice(0, key.indexOf("/")));
    if (!file) return [];
    const { precedence, kind, nominalStepMs, meter } = file;
    const corrected = corrections.files.get(String(file.id));
    const columns = joinBlocks(blocks, corrected?.units ?? {});
    const { clock = null } = corrected ?? {};
    return [
      {
        precedence,
        kind,
        nominalStepMs,
        ...(meter && { meter }),
        columns: clock === null ? columns : correctClock(columns, clock),
      },
    ];
  });
}

/**
 * The readings of a point over [fromMs, toMs), resolved: overlapping files settled, temperatures
 * aligned to flow. Besides the rows inside, each end carries the one row beyond it, so that lines
 * and steps can be drawn and integrated up to the edge. Corrections are on them. SI units; see
 * {@link ReadingColumns}. The point must have been found through the organisation's scope.
 */
export async function loadSegments(
  database: Database,
  pointId: string,
  fromMs: number,
  toMs: number,
  transaction?: Transaction,
  corrections?: PointCorrections,
): Promise<ReadingSegment[]> {
  const blocks = await loadBlocks(database, pointId, fromMs, toMs, transaction, corrections);
  return segmentsOf(blocks, fromMs, toMs);
}

/** The second half of {@link loadSegments}, which needs no database. */
export function segmentsOf(blocks: StoredBlocks, fromMs: number, toMs: number): ReadingSegment[] {
  const segments = trimSegments(resolveSegments(sourcesOf(blocks)), fromMs, toMs);
  return [...correctSegments(segments, blocks.corrections.segments)];
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
    ...mapChannels(columns, (values) => values.subarray(from, to)),
    quality: columns.quality.subarray(from, to),
  };
}

interface PackedBlock {
  readonly rowCount: number;
  readonly format: number;
  readonly data: Buffer;
}

/** Blocks of the same channels as one, unpacked straight into the columns they share. */
function joinBlocks(
  blocks: readonly PackedBlock[],
  units: FileCorrections["units"],
): ReadingColumns {
  const room = new JoinedRoom(blocks.reduce((sum, block) => sum + block.rowCount, 0));
  let joined: ReadingColumns | undefined;
  for (const { data, format } of blocks) {
    joined = inSiUnits(inUnits(decodeBlock(data, format, room), units));
    room.next();
  }
  if (joined === undefined || !room.isFull)
    throw new RangeError("reading blocks hold other rows than were counted");
  return {
    instantMs: new Float64Array(joined.instantMs.buffer),
    ...mapChannels(joined, (values) => new Float64Array(values.buffer)),
    quality: new Uint8Array(joined.quality.buffer),
  };
}

/** Room for many blocks one after the other: every column of a block lies in an array of all rows. */
class JoinedRoom implements BlockRoom {
  private at = 0;
  private taken = 0;
  private readonly allInstants: Float64Array;
  private readonly allQuality: Uint8Array;
  private readonly byBit = new Map<number, Float64Array>();

  constructor(private readonly rows: number) {
    this.allInstants = new Float64Array(rows);
    this.allQuality = new Uint8Array(rows);
  }

  instants(count: number): Float64Array {
    if (this.at + count > this.rows)
      throw new RangeError("a reading block holds more rows than were counted");
    this.taken = count;
    return this.allInstants.subarray(this.at, this.at + count);
  }

  numbers(bit: number, count: number): Float64Array {
    const column = this.byBit.get(bit) ?? new Float64Array(this.rows);
    this.byBit.set(bit, column);
    return column.subarray(this.at, this.at + count);
  }

  quality(count: number): Uint8Array {
    return this.allQuality.subarray(this.at, this.at + count);
  }

  next(): void {
    this.at += this.taken;
  }

  get isFull(): boolean {
    return this.at === this.rows;
  }
}
