import * as contracts from "@shared/contracts/corrections";
import {
  applyCorrection,
  proposeCorrection,
  withdrawCorrection,
} from "@server/commands/correct-readings";
import type { Context } from "@server/http/context";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { NotFound } from "@server/http/errors";
import { Correction } from "@server/models/correction";
import { MeteringPoint } from "@server/models/metering-point";
import { can } from "@server/policies/can";
import { may } from "@server/policies/policy";
import { presentCorrection } from "@server/presenters/present-correction";
import {
  correctionsOfPoint,
  pointsOfCorrections,
} from "@server/queries/corrections/list-corrections";
import { volumePercents } from "@server/queries/corrections/volume-percents";
import { loadResult, loadResults } from "@server/readings/energy-results";

async function presentAll(context: Context, rows: readonly Correction[]) {
  const [points, percents] = await Promise.all([
    pointsOfCorrections(context, rows),
    volumePercents(context, rows),
  ]);
  return rows.map((row) =>
    presentCorrection(row, points.get(row.id) ?? [], context.actor, percents.get(row.id) ?? null),
  );
}

async function present(context: Context, row: Correction) {
  const [presented] = await presentAll(context, [row]);
  if (presented === undefined) throw new Error("a presented correction went missing");
  return presented;
}

/** Corrections of readings, and every result a point's energy has had. */
export const correctionRoutes: readonly Endpoint[] = [
  defineEndpoint(contracts.listCorrections, {
    policy: may("seeEnergy"),
    async handle(context, { params }) {
      const { id } = await context.scope.get(MeteringPoint, params.pointId, "metering point");
      return {
        items: await presentAll(context, await correctionsOfPoint(context, id)),
        can: { create: can(context.actor).correctReadings },
      };
    },
  }),
  defineEndpoint(contracts.proposeCorrection, {
    policy: may("correctReadings"),
    status: 201,
    async handle(context, { params, body }) {
      return present(context, await proposeCorrection(context, params.pointId, body));
    },
  }),
  defineEndpoint(contracts.getCorrection, {
    policy: may("seeEnergy"),
    async handle(context, { params }) {
      const row = await context.scope.get(Correction, params.correctionId, "correction");
      return present(context, row);
    },
  }),
  defineEndpoint(contracts.applyCorrection, {
    policy: may("correctReadings"),
    status: 202,
    async handle(context, { params }) {
      return present(context, await applyCorrection(context, params.correctionId));
    },
  }),
  defineEndpoint(contracts.withdrawCorrection, {
    policy: may("correctReadings"),
    status: 202,
    async handle(context, { params, body }) {
      return present(context, await withdrawCorrection(context, params.correctionId, body.reason));
    },
  }),
  defineEndpoint(contracts.listEnergyResults, {
    policy: may("seeEnergy"),
    async handle({ scope, database }, { params }) {
      const { id } = await scope.get(MeteringPoint, params.pointId, "metering point");
      return { items: await loadResults(database, scope.organisationId, id) };
    },
  }),
  defineEndpoint(contracts.getEnergyResult, {
    policy: may("seeEnergy"),
    async handle({ scope, database }, { params }) {
      const found = await loadResult(database, scope.organisationId, params.resultId);
      if (found === null) throw new NotFound("result");
      return found;
    },
  }),
];
