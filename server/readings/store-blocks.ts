import type { Transaction } from "sequelize";
import { DAY_MS } from "@shared/domain/time/interval";
import { insertMany, type SqlValue } from "@server/database/bulk";
import { BLOCK_FORMAT, encodeBlock } from "./block-codec";
import { channelSetOf, sliceRows, type StoredRows } from "./stored-rows";

/** Whose rows they are. The file must belong to the point, and both to the organisation. */
export interface BlockOwner {
  readonly organisationId: string;
  readonly pointId: string;
  readonly logFileId: string;
}

const insert = `INSERT INTO reading_block
    (point_id, day, channel_set, log_file_id, organisation_id, row_count, first_ms, last_ms, format, data)
  VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?)
  ON DUPLICATE KEY UPDATE row_count = VALUES(row_count), first_ms = VALUES(first_ms),
    last_ms = VALUES(last_ms), format = VALUES(format), data = VALUES(data)`;

/** A day of seconds packs into a quarter of a megabyte. */
const blocksAtOnce = 16;

/** The rows of one UTC day, packed. */
export interface PackedBlock {
  /** UTC ms. */
  readonly dayMs: number;
  readonly channelSet: number;
  readonly rowCount: number;
  readonly firstMs: number;
  readonly lastMs: number;
  readonly data: Buffer;
}

/** Packs the rows of one file, a block per UTC day. Instants must ascend strictly. */
export function* packBlocks(rows: StoredRows): Generator<PackedBlock> {
  const { instantMs } = rows;
  const channelSet = channelSetOf(rows);
  for (let from = 0; from < instantMs.length;) {
    const firstMs = instantMs[from] as number;
    const dayMs = Math.floor(firstMs / DAY_MS) * DAY_MS;
    let to = from + 1;
    while (to < instantMs.length && (instantMs[to] as number) < dayMs + DAY_MS) to++;
    yield {
      dayMs,
      channelSet,
      rowCount: to - from,
      firstMs,
      lastMs: instantMs[to - 1] as number,
      data: encodeBlock(sliceRows(rows, from, to)),
    };
    from = to;
  }
}

/** Stores the blocks of one file. Storing the same file again leaves the same blocks. */
export async function storeBlocks(
  transaction: Transaction,
  owner: BlockOwner,
  blocks: Iterable<PackedBlock>,
): Promise<void> {
  await insertMany(transaction, insert, valuesOf(owner, blocks), blocksAtOnce);
}

function* valuesOf(owner: BlockOwner, blocks: Iterable<PackedBlock>): Generator<SqlValue[]> {
  for (const { dayMs, channelSet, rowCount, firstMs, lastMs, data } of blocks)
    yield [
      owner.pointId,
      new Date(dayMs).toISOString().slice(0, 10),
      channelSet,
      owner.logFileId,
      owner.organisationId,
      rowCount,
      firstMs,
      lastMs,
      BLOCK_FORMAT,
      data,
    ];
}
