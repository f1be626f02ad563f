import * as contracts from "@shared/contracts/evidence";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { recordInstallation, withdrawInstallation } from "@server/commands/record-installation";
import type { Context } from "@server/http/context";
import { defineEndpoint } from "@server/http/define-endpoint";
import { Installation } from "@server/models/installation";
import { can } from "@server/policies/can";
import { may } from "@server/policies/policy";
import { presentInstallation } from "@server/presenters/present-installation";
import { loadEvidenceRecords } from "@server/queries/evidence/evidence-records";
import { completeFields, fieldsOf } from "@server/queries/evidence/installation-fields";
import {
  loadPointBackground,
  type PointBackground,
} from "@server/queries/evidence/point-background";
import { requireUsableFields } from "@server/queries/evidence/require-usable-fields";
import { standingCorrections } from "@server/readings/point-corrections";
import { defaultBudget, workOutInstallation } from "@server/queries/evidence/work-out-installation";

async function presentAll(
  { database, scope, actor }: Context,
  background: PointBackground,
  rows: readonly Installation[],
) {
  const [records, corrections] = await Promise.all([
    loadEvidenceRecords(scope, rows.map(fieldsOf)),
    standingCorrections(database, background.point.id),
  ]);
  return rows.map((row) => {
    const workedOut = workOutInstallation(background, fieldsOf(row), records, corrections);
    return presentInstallation(row, workedOut, actor);
  });
}

async function present(context: Context, row: Installation) {
  const background = await loadPointBackground(context.scope, row.pointId);
  const [presented] = await presentAll(context, background, [row]);
  if (presented === undefined) throw new Error("a presented installation went missing");
  return presented;
}

/** How points were measured, version by version. */
export const installationRoutes = [
  defineEndpoint(contracts.listInstallations, {
    policy: may("seeEvidence"),
    async handle(context, { params, query }) {
      const { scope, actor, clock } = context;
      const background = await loadPointBackground(scope, params.pointId);
      const { pointId } = params;
      const rows = await scope.list(Installation, {
        where: query.superseded ? { pointId } : { pointId, supersededAt: null, withdrawnAt: null },
        order: [
          ["startsAt", "DESC"],
          ["id", "DESC"],
        ],
      });
      const today = localDateOf(clock.now(), background.site.zone);
      return {
        items: await presentAll(context, background, rows),
        defaultBudget: defaultBudget(background, today),
        can: { create: can(actor).editEvidence && background.point.archivedAt === null },
      };
    },
  }),
  defineEndpoint(contracts.createInstallation, {
    policy: may("editEvidence"),
    status: 201,
    async handle(context, { params, body }) {
      return present(context, await recordInstallation(context, params.pointId, body));
    },
  }),
  defineEndpoint(contracts.tryInstallation, {
    policy: may("editEvidence"),
    async handle({ database, scope }, { params, body }) {
      const background = await loadPointBackground(scope, params.pointId);
      const fields = completeFields(body);
      await requireUsableFields(scope, fields);
      const records = await loadEvidenceRecords(scope, [fields]);
      const corrections = await standingCorrections(database, params.pointId);
      return workOutInstallation(background, fields, records, corrections);
    },
  }),
  defineEndpoint(contracts.getInstallation, {
    policy: may("seeEvidence"),
    async handle(context, { params }) {
      const { installationId } = params;
      return present(
        context,
        await context.scope.get(Installation, installationId, "installation"),
      );
    },
  }),
  defineEndpoint(contracts.withdrawInstallation, {
    policy: may("editEvidence"),
    async handle(context, { params, body }) {
      const { installationId } = params;
      return present(context, await withdrawInstallation(context, installationId, body.reason));
    },
  }),
];
