import { Invalid } from "./errors";

/**
 * Cursors of lists ordered by id: opaque to callers, so that the order may change one day.
 * @throws Invalid (422) for a cursor that none of our answers gave.
 */
export function readCursor(cursor: string | undefined): string | null {
  if (cursor === undefined) return null;
  const id = Buffer.from(cursor, "base64url").toString("utf8");
  if (/^[1-9]\d{0,18}$/.test(id)) return id;
  throw new Invalid([
    { pointer: "/query/cursor", code: "unknown-cursor", message: "Take nextCursor of an answer." },
  ]);
}

/** One page of rows that were read with `limit + 1`, and the cursor of the next page. */
export function pageOf<Row extends { id: string }>(
  rows: readonly Row[],
  limit: number,
): { rows: Row[]; nextCursor: string | null } {
  const shown = rows.slice(0, limit);
  const last = shown.at(-1);
  const hasMore = rows.length > limit && last !== undefined;
  return {
    rows: shown,
    nextCursor: hasMore ? Buffer.from(last.id, "utf8").toString("base64url") : null,
  };
}
