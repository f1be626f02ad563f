import type { Site as SiteAnswer } from "@shared/contracts/places";
import { clockOfMinute } from "@shared/domain/analysis/occupied-hours";
import { instantTextOrNull } from "@server/database/conversions";
import type { Site } from "@server/models/site";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";

/** What is counted about a site beside its own row. */
export interface SiteFacts {
  /** Of buildings and loops in use. */
  readonly buildingCount: number;
  readonly loopCount: number;
  /** Readings or log files hang on one of its points. */
  readonly holdsFiles: boolean;
}

export function presentOccupied({ occupied }: Site): SiteAnswer["occupiedHours"] {
  return {
    weekdays: [...occupied.weekdays],
    start: clockOfMinute(occupied.startMinute),
    end: clockOfMinute(occupied.endMinute),
    assumed: occupied.assumed,
  };
}

export function presentSite(site: Site, facts: SiteFacts, actor: Actor): SiteAnswer {
  const { editSites, importLogs } = can(actor);
  const inUse = site.archivedAt === null;
  return {
    id: site.id,
    name: site.name,
    zone: site.zone,
    currency: site.currency,
    unitSystem: site.unitSystem,
    address: site.address,
    occupiedHours: presentOccupied(site),
    isDemo: site.isDemo,
    archivedAt: instantTextOrNull(site.archivedAt),
    buildingCount: facts.buildingCount,
    loopCount: facts.loopCount,
    can: {
      edit: editSites,
      archive: editSites,
      remove: editSites && !facts.holdsFiles,
      addLoop: editSites && inUse,
      import: importLogs && inUse,
    },
  };
}
