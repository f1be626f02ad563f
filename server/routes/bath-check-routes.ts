import { Op } from "sequelize";
import * as contracts from "@shared/contracts/evidence";
import { recordBathCheck } from "@server/commands/record-bath-check";
import type { Context } from "@server/http/context";
import { defineEndpoint } from "@server/http/define-endpoint";
import { BathCheck } from "@server/models/bath-check";
import { Instrument } from "@server/models/instrument";
import { can } from "@server/policies/can";
import { may } from "@server/policies/policy";
import { presentBathCheck } from "@server/presenters/present-bath-check";
import { bathCheckPage } from "@server/queries/evidence/bath-check-page";
import { loadBathChecks } from "@server/queries/evidence/evidence-records";

async function presentAll({ scope, actor }: Context, rows: readonly BathCheck[]) {
  const ids = [...new Set(rows.flatMap((row) => [row.firstProbeId, row.secondProbeId]))];
  const [checks, probes] = await Promise.all([
    loadBathChecks(scope, ids),
    scope.list(Instrument, { where: { id: { [Op.in]: ids } } }),
  ]);
  const serials = new Map(probes.map(({ id, serial }) => [id, serial]));
  return rows.map((row) => presentBathCheck(row, checks, (id) => serials.get(id) ?? "", actor));
}

async function present(context: Context, row: BathCheck) {
  const [presented] = await presentAll(context, [row]);
  if (presented === undefined) throw new Error("a presented bath check went missing");
  return presented;
}

/** Same-bath checks of probe pairs. */
export const bathCheckRoutes = [
  defineEndpoint(contracts.listBathChecks, {
    policy: may("seeEvidence"),
    async handle(context, { query }) {
      const page = await bathCheckPage(context.scope, query);
      return {
        items: await presentAll(context, page.rows),
        nextCursor: page.nextCursor,
        can: { create: can(context.actor).editEvidence },
      };
    },
  }),
  defineEndpoint(contracts.createBathCheck, {
    policy: may("editEvidence"),
    status: 201,
    async handle(context, { body }) {
      return present(context, await recordBathCheck(context, body));
    },
  }),
  defineEndpoint(contracts.getBathCheck, {
    policy: may("seeEvidence"),
    async handle(context, { params }) {
      return present(context, await context.scope.get(BathCheck, params.bathCheckId, "bath check"));
    },
  }),
];
