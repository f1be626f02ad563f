import type { Transaction } from "sequelize";
import { Conflict } from "@server/http/errors";
import { Site } from "@server/models/site";
import type { Acting } from "./acting";

/**
 * The site, locked, so that what depends on all of its loops (a tag, a ring of parents) cannot
 * change under the check.
 * @throws NotFound; Conflict where the site is archived and so takes nothing new.
 */
export async function siteInUse(
  { scope }: Acting,
  siteId: string,
  transaction: Transaction,
): Promise<Site> {
  const site = await scope.get(Site, siteId, "site", {
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (site.archivedAt !== null)
    throw new Conflict(
      "site-archived",
      `${site.name} is archived, so nothing can be added to it.`,
      "Restore the site first.",
    );
  return site;
}
