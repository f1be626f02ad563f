import { Op } from "sequelize";
import * as contracts from "@shared/contracts/evidence";
import {
  addCertificate,
  createInstrument,
  updateInstrument,
  withdrawCertificate,
} from "@server/commands/save-instrument";
import type { Context } from "@server/http/context";
import { pageOf, readCursor } from "@server/http/cursor";
import { defineEndpoint } from "@server/http/define-endpoint";
import { Instrument } from "@server/models/instrument";
import { can } from "@server/policies/can";
import { may } from "@server/policies/policy";
import { presentInstrument } from "@server/presenters/present-instrument";
import { loadAllCertificates } from "@server/queries/evidence/evidence-records";
import { placementsOf } from "@server/queries/evidence/placements";

/** Calibration is judged by one day for the whole kit, wherever it lies. */
const todayOf = ({ clock }: Context) => clock.date().toISOString().slice(0, 10);

async function presentAll(context: Context, rows: readonly Instrument[]) {
  const { database, scope, actor } = context;
  const ids = rows.map(({ id }) => id);
  const [certificates, placements] = await Promise.all([
    loadAllCertificates(scope, ids),
    placementsOf(database, scope.organisationId, ids),
  ]);
  return rows.map((row) => {
    const facts = {
      certificates: certificates.get(row.id) ?? [],
      placements: placements.get(row.id) ?? [],
      today: todayOf(context),
    };
    return presentInstrument(row, facts, actor);
  });
}

async function present(context: Context, row: Instrument) {
  const [presented] = await presentAll(context, [row]);
  if (presented === undefined) throw new Error("a presented instrument went missing");
  return presented;
}

/** The kit: instruments and their certificates. */
export const instrumentRoutes = [
  defineEndpoint(contracts.listInstruments, {
    policy: may("seeEvidence"),
    async handle(context, { query }) {
      const after = readCursor(query.cursor);
      const rows = await context.scope.list(Instrument, {
        where: {
          ...(after === null ? {} : { id: { [Op.gt]: after } }),
          ...(query.kind === undefined ? {} : { kind: query.kind }),
          ...(query.archived ? {} : { archivedAt: null }),
        },
        order: [["id", "ASC"]],
        limit: query.limit + 1,
      });
      const page = pageOf(rows, query.limit);
      return {
        items: await presentAll(context, page.rows),
        nextCursor: page.nextCursor,
        today: todayOf(context),
        can: { create: can(context.actor).editEvidence },
      };
    },
  }),
  defineEndpoint(contracts.createInstrument, {
    policy: may("editEvidence"),
    status: 201,
    async handle(context, { body }) {
      return present(context, await createInstrument(context, body));
    },
  }),
  defineEndpoint(contracts.getInstrument, {
    policy: may("seeEvidence"),
    async handle(context, { params }) {
      const row = await context.scope.get(Instrument, params.instrumentId, "instrument");
      return present(context, row);
    },
  }),
  defineEndpoint(contracts.updateInstrument, {
    policy: may("editEvidence"),
    async handle(context, { params, body }) {
      return present(context, await updateInstrument(context, params.instrumentId, body));
    },
  }),
  defineEndpoint(contracts.addCertificate, {
    policy: may("editEvidence"),
    status: 201,
    async handle(context, { params, body }) {
      return present(context, await addCertificate(context, params.instrumentId, body));
    },
  }),
  defineEndpoint(contracts.withdrawCertificate, {
    policy: may("editEvidence"),
    async handle(context, { params, body }) {
      const { certificateId } = params;
      return present(context, await withdrawCertificate(context, certificateId, body.reason));
    },
  }),
];
