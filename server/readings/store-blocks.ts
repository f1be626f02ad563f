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

function* blocksOf(owner: BlockOwner, rows: StoredRows): Generator<SqlValue[]> {
  const { instantMs } = rows;
  const channelSet = channelSetOf(rows);
  for (let from = 0; from < instantMs.length;) {
    const day = Math.floor((instantMs[from] as number) / DAY_MS);
    const dayEnd = (day + 1) * DAY_MS;
    let to = from + 1;
    while (to < instantMs.length && (instantMs[to] as number) < dayEnd) to++;
    yield [
      owner.pointId,
      new Date(day * DAY_MS).toISOString().slice(0, 10),
      channelSet,
      owner.logFileId,
      owner.organisationId,
      to - from,
      instantMs[from] as number,
      instantMs[to - 1] as number,
      BLOCK_FORMAT,
      encodeBlock(sliceRows(rows, from, to)),
    ];
    from = to;
  }
}

/**
 * Stores the rows of one file, a block per UTC day. Instants must ascend strictly. Storing the same
 * file again leaves the same blocks.
 */
export async function storeBlocks(
  transaction: Transaction,
  owner: BlockOwner,
  rows: StoredRows,
): Promise<void> {
  await insertMany(transaction, insert, blocksOf(owner, rows), blocksAtOnce);
}
