import type { BoreVersionAnswer, Point as PointAnswer } from "@shared/contracts/places";
import { pipeLabel } from "@shared/domain/pipes/resolve-pipe";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { BoreVersion } from "@server/models/bore-version";
import type { MeteringPoint } from "@server/models/metering-point";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import type { Holdings } from "./present-loop";

/** What belongs to a point beside its own row; `bore` is the pipe as it is known now. */
export interface PointFacts extends Holdings {
  readonly bore: BoreVersion | null;
}

function presentBore(version: BoreVersion): BoreVersionAnswer["bore"] {
  return {
    outsideDiameterMm: version.outsideDiameterMm,
    wallMm: version.wallMm,
    liningMm: version.liningMm,
    insideDiameterMm: version.insideDiameterMm,
    label: pipeLabel(version.pipe, version),
  };
}

export function presentPoint(
  point: MeteringPoint,
  { bore, hasReadings, holdsFiles }: PointFacts,
  actor: Actor,
): PointAnswer {
  const { editPoints, importLogs } = can(actor);
  return {
    id: point.id,
    loopId: point.loopId,
    parentPointId: point.parentPointId,
    code: point.code,
    name: point.name,
    role: point.role,
    meterSide: point.meterSide,
    gapRule: point.gapRule,
    pipe: bore && bore.pipe,
    bore: bore && presentBore(bore),
    notes: point.notes,
    archivedAt: instantTextOrNull(point.archivedAt),
    hasReadings,
    can: {
      edit: editPoints,
      archive: editPoints,
      remove: editPoints && !holdsFiles,
      import: importLogs && point.archivedAt === null,
    },
  };
}

export function presentBoreVersion(version: BoreVersion): BoreVersionAnswer {
  return {
    validFrom: instantText(version.validFrom),
    validTo: instantTextOrNull(version.validTo),
    pipe: version.pipe,
    bore: presentBore(version),
  };
}
