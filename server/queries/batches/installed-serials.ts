import { Op } from "sequelize";
import type { Scope } from "@server/database/scoped";
import type { InstalledSerial } from "@server/imports/find-point";
import { Installation } from "@server/models/installation";
import { Instrument } from "@server/models/instrument";

/** Where the flow meter or logger with this serial number is or was installed, by what stands. */
export async function installedSerials(scope: Scope, serial: string): Promise<InstalledSerial[]> {
  const instruments = await scope.list(Instrument, { where: { serial, archivedAt: null } });
  const ids = instruments.map(({ id }) => id);
  if (ids.length === 0) return [];
  const rows = await scope.list(Installation, {
    where: {
      [Op.or]: [{ flowMeterId: ids }, { loggerId: ids }],
      supersededAt: null,
      withdrawnAt: null,
    },
  });
  return rows.map(({ pointId, startsAt, endsAt }) => ({
    pointId,
    startsMs: startsAt.getTime(),
    endsMs: endsAt?.getTime() ?? null,
  }));
}
