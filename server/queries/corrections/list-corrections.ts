import { QueryTypes } from "sequelize";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import { Correction } from "@server/models/correction";
import type { NamedPoint } from "@server/presenters/present-correction";
import { touchedPoints } from "./touched-points";

interface Surroundings {
  readonly database: Database;
  readonly scope: Scope;
}

/** Corrections of a point, newest first: its own, and offsets of every probe it ever had. */
export async function correctionsOfPoint(
  { database, scope }: Surroundings,
  pointId: string,
): Promise<Correction[]> {
  const rows = await database.query<{ id: string }>(
    `SELECT id FROM correction WHERE organisation_id = :organisationId
        AND (proposed_at_point_id = :pointId OR probe_id IN (
          SELECT supply_probe_id FROM installation WHERE point_id = :pointId AND supply_probe_id IS NOT NULL
          UNION ALL
          SELECT return_probe_id FROM installation WHERE point_id = :pointId AND return_probe_id IS NOT NULL))`,
    {
      replacements: { organisationId: scope.organisationId, pointId },
      type: QueryTypes.SELECT,
    },
  );
  if (rows.length === 0) return [];
  return scope.list(Correction, {
    where: { id: rows.map(({ id }) => id) },
    order: [["id", "DESC"]],
  });
}

/** The points each correction touches, by the correction's id. */
export async function pointsOfCorrections(
  { database, scope }: Surroundings,
  corrections: readonly Correction[],
): Promise<Map<string, NamedPoint[]>> {
  const touched = new Map<string, string[]>();
  for (const row of corrections) touched.set(row.id, await touchedPoints(database, row));
  const ids = [...new Set([...touched.values()].flat())];
  if (ids.length === 0) return new Map();
  const named = await database.query<NamedPoint>(
    `SELECT p.id, p.code, l.tag AS loopTag FROM metering_point p JOIN \`loop\` l ON l.id = p.loop_id
      WHERE p.organisation_id = :organisationId AND p.id IN (:ids)`,
    {
      replacements: { organisationId: scope.organisationId, ids },
      type: QueryTypes.SELECT,
    },
  );
  const byId = new Map(
    named.map((point) => [String(point.id), { ...point, id: String(point.id) }]),
  );
  return new Map(
    [...touched].map(([id, pointIds]) => [
      id,
      pointIds.flatMap((pointId) => byId.get(pointId) ?? []),
    ]),
  );
}
