import type { Scope } from "@server/database/scoped";
import { MeteringPoint } from "@server/models/metering-point";

/**
 * The point whose energy stands for each loop, by loop id: the main one, else the oldest point that
 * no other point of the loop feeds. A loop without points in use is absent.
 */
export async function mainPoints(
  scope: Scope,
  loopIds: readonly string[],
): Promise<Map<string, MeteringPoint>> {
  if (loopIds.length === 0) return new Map();
  const points = await scope.list(MeteringPoint, {
    where: { loopId: [...loopIds], archivedAt: null },
    order: [["id", "ASC"]],
  });
  const rank = (point: MeteringPoint): number =>
    point.role === "main" ? 0 : point.parentPointId === null ? 1 : 2;
  const chosen = new Map<string, MeteringPoint>();
  for (const point of points) {
    const sofar = chosen.get(point.loopId);
    if (sofar === undefined || rank(point) < rank(sofar)) chosen.set(point.loopId, point);
  }
  return chosen;
}
