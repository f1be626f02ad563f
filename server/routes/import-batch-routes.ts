import { Op } from "sequelize";
import * as contracts from "@shared/contracts/import-batches";
import * as commands from "@server/commands/import-batches";
import type { Context } from "@server/http/context";
import { pageOf, readCursor } from "@server/http/cursor";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { receiveLogFile } from "@server/imports/receive-log-file";
import { ImportBatch } from "@server/models/import-batch";
import { ImportBatchFile } from "@server/models/import-batch-file";
import { Site } from "@server/models/site";
import { may } from "@server/policies/policy";
import { batchCsv } from "@server/presenters/batch-csv";
import { presentBatch, presentBatchDetail } from "@server/presenters/present-batch";
import { batchPoints } from "@server/queries/batches/batch-points";
import { batchReport } from "@server/queries/batches/batch-report";

const load = ({ scope }: Context, id: string) => scope.get(ImportBatch, id, "batch");

async function present(
  context: Context,
  row: ImportBatch,
  refused: contracts.BatchDetail["refused"] = [],
) {
  const [site, files, points] = await Promise.all([
    context.scope.get(Site, row.siteId, "site"),
    batchReport(context, row),
    batchPoints(context, row.siteId),
  ]);
  return presentBatchDetail(row, { site, files, points, refused }, context.actor);
}

/** Many files read by one recipe, with one report. */
export const importBatchRoutes: readonly Endpoint[] = [
  defineEndpoint(contracts.listImportBatches, {
    policy: may("seeLogs"),
    async handle({ scope }, { query }) {
      const before = readCursor(query.cursor);
      const found = await scope.list(ImportBatch, {
        where: before === null ? {} : { id: { [Op.lt]: before } },
        order: [["id", "DESC"]],
        limit: query.limit + 1,
      });
      const { rows, nextCursor } = pageOf(found, query.limit);
      const sites = await scope.list(Site, { where: { id: rows.map(({ siteId }) => siteId) } });
      const files = await scope.list(ImportBatchFile, {
        attributes: ["id", "batchId"],
        where: { batchId: rows.map(({ id }) => id) },
      });
      const count = (id: string) => files.filter(({ batchId }) => batchId === id).length;
      return {
        items: rows.flatMap((row) => {
          const site = sites.find(({ id }) => id === row.siteId);
          return site ? [presentBatch(row, site, count(row.id))] : [];
        }),
        nextCursor,
      };
    },
  }),
  defineEndpoint(contracts.createImportBatch, {
    policy: may("importLogs"),
    status: 201,
    async handle(context, { body }) {
      return present(context, await commands.openBatch(context, body));
    },
  }),
  defineEndpoint(contracts.getImportBatch, {
    policy: may("seeLogs"),
    async handle(context, { params }) {
      return present(context, await load(context, params.batchId));
    },
  }),
  defineEndpoint(contracts.addBatchFile, {
    policy: may("importLogs"),
    status: 201,
    limit: { perAddress: 300, minutes: 10 },
    // The handler takes the file in itself, once it knows that the batch is there.
    receive: (_request, _response, next) => next(),
    async handle(context, { params }) {
      const batch = await load(context, params.batchId);
      await commands.addBatchFile(context, batch, await receiveLogFile(context));
      return present(context, batch);
    },
  }),
  defineEndpoint(contracts.chooseBatchPoint, {
    policy: may("importLogs"),
    async handle(context, { params }) {
      const batch = await load(context, params.batchId);
      await commands.choosePoint(context, batch, params.batchFileId, params.pointId);
      return present(context, batch);
    },
  }),
  defineEndpoint(contracts.removeBatchFile, {
    policy: may("importLogs"),
    async handle(context, { params }) {
      const batch = await load(context, params.batchId);
      await commands.removeFile(context, batch, params.batchFileId);
      return present(context, batch);
    },
  }),
  defineEndpoint(contracts.confirmImportBatch, {
    policy: may("importLogs"),
    status: 202,
    async handle(context, { params }) {
      const batch = await load(context, params.batchId);
      const ready = (await batchReport(context, batch)).flatMap(({ id, importId, isReady }) =>
        isReady && importId !== null ? [{ batchFileId: id, importId }] : [],
      );
      return present(context, batch, await commands.confirmReady(context, ready));
    },
  }),
  defineEndpoint(contracts.downloadBatchReport, {
    policy: may("seeLogs"),
    async handle(context, { params }) {
      return batchCsv(await present(context, await load(context, params.batchId)));
    },
  }),
];
