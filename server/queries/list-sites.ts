import { Op, type WhereOptions } from "sequelize";
import type { Scope } from "@server/database/scoped";
import { Site } from "@server/models/site";
import { Invalid } from "@server/http/errors";

interface Wanted {
  readonly cursor?: string | undefined;
  readonly limit: number;
  readonly archived?: boolean | undefined;
}

/** Where a page ended: the next one starts after this name, and after this id among equal names. */
function readCursor(cursor: string): [name: string, id: string] {
  try {
    const read: unknown = JSON.parse(Buffer.from(cursor, "base64url").toString("utf8"));
    if (Array.isArray(read) && typeof read[0] === "string" && typeof read[1] === "string")
      return [read[0], read[1]];
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error;
  }
  throw new Invalid([
    {
      pointer: "/query/cursor",
      code: "unknown-cursor",
      message: "This cursor was not made here: start again without one.",
    },
  ]);
}

/** Sites by name, a page at a time; archived ones among them only where asked for. */
export async function listSitesPage(
  scope: Scope,
  { cursor, limit, archived }: Wanted,
): Promise<{ sites: Site[]; nextCursor: string | null }> {
  const conditions: WhereOptions[] = archived ? [] : [{ archivedAt: null }];
  if (cursor !== undefined) {
    const [name, id] = readCursor(cursor);
    conditions.push({
      [Op.or]: [{ name: { [Op.gt]: name } }, { name, id: { [Op.gt]: id } }],
    });
  }
  const rows = await scope.list(Site, {
    where: { [Op.and]: conditions },
    order: [
      ["name", "ASC"],
      ["id", "ASC"],
    ],
    limit: limit + 1,
  });
  const sites = rows.slice(0, limit);
  const last = sites.at(-1);
  const more = rows.length > limit && last !== undefined;
  const nextCursor = more
    ? Buffer.from(JSON.stringify([last.name, last.id])).toString("base64url")
    : null;
  return { sites, nextCursor };
}
