import type { Transaction } from "sequelize";
import { fluidForEnergy, type FluidForEnergy } from "@shared/domain/fluids/loop-fluid";
import type { Scope } from "@server/database/scoped";
import type { BoreVersion } from "@server/models/bore-version";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { Site } from "@server/models/site";
import { currentBores } from "@server/queries/current-bores";

/** What the record of a point says beside its installations: loop, fluid, pipe and the site's zone. */
export interface PointBackground {
  readonly point: MeteringPoint;
  readonly loop: Loop;
  readonly site: Site;
  readonly fluid: FluidForEnergy;
  /** The pipe as it is known now; null where nobody knows. */
  readonly pipe: BoreVersion | null;
}

/** @throws NotFound where the organisation has no such point. */
export async function loadPointBackground(
  scope: Scope,
  pointId: string,
  transaction?: Transaction,
): Promise<PointBackground> {
  const point = await scope.get(MeteringPoint, pointId, "metering point", { transaction });
  const loop = await scope.get(Loop, point.loopId, "loop", { transaction });
  const [site, bores] = await Promise.all([
    scope.get(Site, loop.siteId, "site", { transaction }),
    currentBores(scope, [pointId], transaction),
  ]);
  const fluid = fluidForEnergy(loop.fluid, loop.gaugePressureMPa);
  return { point, loop, site, fluid, pipe: bores.get(pointId) ?? null };
}
