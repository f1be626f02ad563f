import { QueryTypes } from "sequelize";
import { Correction } from "@server/models/correction";
import { EnergyFill } from "@server/models/energy-fill";
import { loggedRows, storedReadings } from "./reading-factories";
import type { TestApp } from "./test-app";

interface Owner {
  readonly organisationId: string;
  readonly pointId: string;
}

/** Readings of a point with a proposed correction, a proposed fill and the first result. */
export async function correctedPoint(
  app: TestApp,
  owner: Owner,
): Promise<{ correctionId: string; fillId: string; resultId: string }> {
  const { organisationId, pointId } = owner;
  const fromMs = Date.UTC(2026, 1, 2);
  await storedReadings(app, owner, loggedRows({ fromMs, count: 13, stepMs: 300_000 }), 300_000);
  const made = { createdAt: app.clock.date(), createdByName: "Test" };
  const correction = await Correction.create({
    organisationId,
    proposedAtPointId: pointId,
    pointId,
    kind: "flipFlow",
    document: { kind: "flipFlow", from: new Date(fromMs).toISOString(), to: null },
    reason: "Arrow against the flow",
    state: "proposed",
    ...made,
  });
  const fill = await EnergyFill.create({
    organisationId,
    pointId,
    fromMs: fromMs + 3_600_000,
    toMs: fromMs + 7_200_000,
    method: "likeDays",
    reason: "Flat battery",
    heatingKwh: 0,
    coolingKwh: 100,
    filledS: 3600,
    uncertaintyPercent: 5,
    days: [],
    state: "proposed",
    ...made,
  });
  const [result] = await app.database.query<{ id: string }>(
    "SELECT id FROM energy_result WHERE point_id = :pointId",
    { replacements: { pointId }, type: QueryTypes.SELECT },
  );
  if (!result) throw new Error("working energy out kept no result");
  return { correctionId: correction.id, fillId: fill.id, resultId: String(result.id) };
}
