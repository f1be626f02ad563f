import type { FluidBlock, Loop as LoopAnswer } from "@shared/contracts/places";
import { absolutePressureMPa, fluidForEnergy } from "@shared/domain/fluids/loop-fluid";
import { instantTextOrNull } from "@server/database/conversions";
import type { Loop } from "@server/models/loop";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import { fluidBlock } from "@server/readings/fluid-block";

/** What a loop's fluid cannot be worked out for; its readings are kept, and never read as water. */
export function energyBlockedBy(loop: Loop): FluidBlock | null {
  return fluidBlock(fluidForEnergy(loop.fluid, loop.gaugePressureMPa));
}

/** `holdsFiles` also counts log files of which no row counts: they are kept, so is their place. */
export interface Holdings {
  readonly hasReadings: boolean;
  readonly holdsFiles: boolean;
}

export function presentLoop(loop: Loop, facts: Holdings, actor: Actor): LoopAnswer {
  const { editSites, editPoints } = can(actor);
  const { pressureMPa, assumed } = absolutePressureMPa(loop.gaugePressureMPa);
  return {
    id: loop.id,
    siteId: loop.siteId,
    buildingId: loop.buildingId,
    parentLoopId: loop.parentLoopId,
    tag: loop.tag,
    name: loop.name,
    service: loop.service,
    fluid: loop.fluid,
    gaugePressureMPa: loop.gaugePressureMPa,
    designFlowM3PerHour: loop.designFlowM3PerHour,
    designDeltaTK: loop.designDeltaTK,
    flowCutOffM3PerHour: loop.flowCutOffM3PerHour,
    deltaTCutOffK: loop.deltaTCutOffK,
    notes: loop.notes,
    archivedAt: instantTextOrNull(loop.archivedAt),
    pressure: { absoluteMPa: pressureMPa, assumed },
    energyBlockedBy: energyBlockedBy(loop),
    hasReadings: facts.hasReadings,
    can: {
      edit: editSites,
      archive: editSites,
      remove: editSites && !facts.holdsFiles,
      addPoint: editPoints && loop.archivedAt === null,
    },
  };
}
