import type { z } from "zod";
import type {
  createSite as createContract,
  updateSite as updateContract,
} from "@shared/contracts/places";
import { minuteOfClock } from "@shared/domain/analysis/occupied-hours";
import { inTransaction } from "@server/database/transaction";
import { occupiedColumns, Site } from "@server/models/site";
import { changesOf, recordPlaceEvent, type Acting } from "./acting";
import { recalculateSite } from "./recalculate-points";

type NewSite = z.output<(typeof createContract)["body"]>;
type SiteChanges = z.output<(typeof updateContract)["body"]>;

/** The columns of the hours that were sent; none where nothing was said about them. */
function hoursColumns({ occupiedHours: hours }: Pick<SiteChanges, "occupiedHours">) {
  if (hours === undefined) return {};
  if (hours === null) return occupiedColumns(null);
  const [startMinute, endMinute] = [minuteOfClock(hours.start), minuteOfClock(hours.end)];
  return occupiedColumns({ weekdays: hours.weekdays, startMinute, endMinute });
}

/** Adds a site. `isDemo` marks invented data, and only the demo's own generator sets it. */
export async function createSite(
  acting: Acting,
  { occupiedHours, ...fields }: NewSite,
  options: { readonly isDemo?: boolean } = {},
): Promise<Site> {
  return inTransaction(acting.database, async (transaction) => {
    const site = await acting.scope.create(
      Site,
      {
        ...fields,
        ...hoursColumns({ occupiedHours }),
        unitSystem: fields.unitSystem ?? "si",
        address: fields.address || null,
        isDemo: options.isDemo ?? false,
        createdAt: acting.clock.date(),
      },
      { transaction },
    );
    await recordPlaceEvent(
      acting,
      { kind: "site", id: site.id },
      "created",
      { name: site.name },
      transaction,
    );
    return site;
  });
}

/** Changes, archives or restores a site. Another zone moves every day's edges, so days are rebuilt. */
export async function updateSite(
  acting: Acting,
  siteId: string,
  { archived, occupiedHours, ...sent }: SiteChanges,
): Promise<Site> {
  const fields = { ...sent, ...hoursColumns({ occupiedHours }) };
  return inTransaction(acting.database, async (transaction) => {
    const site = await acting.scope.get(Site, siteId, "site", {
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    const changes = changesOf<object>(site.get(), fields);
    site.set(fields);
    if (archived !== undefined && archived !== (site.archivedAt !== null)) {
      site.archivedAt = archived ? acting.clock.date() : null;
      changes.archived = { from: !archived, to: archived };
    }
    await site.save({ transaction });
    if (changes.zone) await recalculateSite(acting, siteId, transaction);
    if (Object.keys(changes).length > 0)
      await recordPlaceEvent(acting, { kind: "site", id: siteId }, "updated", changes, transaction);
    return site;
  });
}
