import * as contracts from "@shared/contracts/corrections";
import { approveFill, proposeFill, withdrawFill } from "@server/commands/fill-gaps";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { EnergyFill } from "@server/models/energy-fill";
import { MeteringPoint } from "@server/models/metering-point";
import { can } from "@server/policies/can";
import { may } from "@server/policies/policy";
import { presentFill } from "@server/presenters/present-fill";

/** Proposals for time without readings. */
export const fillRoutes: readonly Endpoint[] = [
  defineEndpoint(contracts.listFills, {
    policy: may("seeEnergy"),
    async handle({ scope, actor }, { params }) {
      const { id: pointId } = await scope.get(MeteringPoint, params.pointId, "metering point");
      const rows = await scope.list(EnergyFill, { where: { pointId }, order: [["id", "DESC"]] });
      return {
        items: rows.map((row) => presentFill(row, actor)),
        can: { create: can(actor).correctReadings },
      };
    },
  }),
  defineEndpoint(contracts.proposeFill, {
    policy: may("correctReadings"),
    status: 201,
    async handle(context, { params, body }) {
      return presentFill(await proposeFill(context, params.pointId, body), context.actor);
    },
  }),
  defineEndpoint(contracts.approveFill, {
    policy: may("approveFills"),
    async handle(context, { params }) {
      return presentFill(await approveFill(context, params.fillId), context.actor);
    },
  }),
  defineEndpoint(contracts.withdrawFill, {
    policy: may("correctReadings"),
    async handle(context, { params }) {
      return presentFill(await withdrawFill(context, params.fillId), context.actor);
    },
  }),
];
