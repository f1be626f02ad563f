import type { Transaction } from "sequelize";
import { sharedSpan } from "@shared/domain/readings/corrections/correction-span";
import type { Database } from "@server/database/connect";
import type { Correction } from "@server/models/correction";
import { spanOf } from "@server/readings/point-corrections";
import { probePlaces } from "@server/readings/probe-places";

type Touching = Pick<Correction, "organisationId" | "pointId" | "change">;

/**
 * Ids of the points whose readings a correction changes: its own, or every point at which the probe
 * sat within its span.
 */
export async function touchedPoints(
  database: Database,
  { organisationId, pointId, change }: Touching,
  transaction?: Transaction,
): Promise<string[]> {
  if (change.kind !== "probeOffset") return pointId === null ? [] : [pointId];
  const { probeId } = change;
  const places = await probePlaces(database, { organisationId, probeId }, transaction);
  const within = places.filter(({ span }) => sharedSpan(span, spanOf(change)) !== null);
  return [...new Set(within.map((place) => String(place.pointId)))];
}
