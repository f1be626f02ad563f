import { Op } from "sequelize";
import * as contracts from "@shared/contracts/imports";
import type { Context } from "@server/http/context";
import { pageOf, readCursor } from "@server/http/cursor";
import { defineEndpoint } from "@server/http/define-endpoint";
import { Conflict } from "@server/http/errors";
import { FileAnswer } from "@server/http/file-answer";
import { importAlsoFor } from "@server/imports/also-for-point";
import * as commands from "@server/imports/change-import";
import { importFacts } from "@server/imports/import-facts";
import { presentImport } from "@server/imports/present-import";
import { previewRows } from "@server/imports/preview-rows";
import { receiveLogFile } from "@server/imports/receive-log-file";
import type { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { MeteringPoint } from "@server/models/metering-point";
import { may } from "@server/policies/policy";
import { pointsOfSite } from "@server/queries/points-of-site";
import { fileOfImport, presentWholeImport } from "./present-whole-import";

const present = presentWholeImport;

function fileOf(context: Context, importId: string, fileId: string): Promise<LogFile> {
  return fileOfImport(context, { importId, fileId });
}

/** The points a list is narrowed to, or null for all of the organisation. */
async function wantedPoints(
  context: Context,
  { pointId, siteId }: { pointId?: string; siteId?: string },
): Promise<string[] | null> {
  if (pointId !== undefined) await context.scope.get(MeteringPoint, pointId, "point");
  const ofSite = siteId === undefined ? null : await pointsOfSite(context, siteId);
  if (pointId === undefined) return ofSite;
  return ofSite === null || ofSite.includes(pointId) ? [pointId] : [];
}

export const importRoutes = [
  defineEndpoint(contracts.listImports, {
    policy: may("seeLogs"),
    async handle(context, { query }) {
      const { scope, actor } = context;
      const before = readCursor(query.cursor);
      const pointIds = await wantedPoints(context, query);
      const found = await scope.list(LogImport, {
        where: {
          ...(pointIds === null ? {} : { pointId: pointIds }),
          ...(query.state ? { state: query.state } : {}),
          ...(query.personId ? { createdByAccountId: query.personId } : {}),
          ...(before === null ? {} : { id: { [Op.lt]: before } }),
        },
        attributes: { exclude: ["checks"] },
        order: [["id", "DESC"]],
        limit: query.limit + 1,
      });
      const { rows, nextCursor } = pageOf(found, query.limit);
      const facts = await importFacts(context, rows);
      return { items: rows.map((row) => presentImport(row, facts, actor)), nextCursor };
    },
  }),
  defineEndpoint(contracts.createImport, {
    policy: may("importLogs"),
    status: 201,
    async handle(context, { params }) {
      return present(context, await commands.openImport(context, params.pointId));
    },
  }),
  defineEndpoint(contracts.getImport, {
    policy: may("seeLogs"),
    async handle(context, { params }) {
      return present(context, await context.scope.get(LogImport, params.importId, "import"));
    },
  }),
  defineEndpoint(contracts.addImportFile, {
    policy: may("importLogs"),
    status: 201,
    limit: { perAddress: 300, minutes: 10 },
    // The handler takes the file in itself, once it knows that the import is there.
    receive: (_request, _response, next) => next(),
    async handle(context, { params }) {
      await context.scope.get(LogImport, params.importId, "import");
      const received = await receiveLogFile(context);
      return present(context, await commands.addFile(context, params.importId, received));
    },
  }),
  defineEndpoint(contracts.removeImportFile, {
    policy: may("importLogs"),
    async handle(context, { params }) {
      const { importId, fileId } = params;
      return present(context, await commands.removeFile(context, importId, fileId));
    },
  }),
  defineEndpoint(contracts.alsoForPoint, {
    policy: may("importLogs"),
    status: 201,
    async handle(context, { params, body }) {
      return present(context, await importAlsoFor(context, { ...params, ...body }));
    },
  }),
  defineEndpoint(contracts.chooseRecipe, {
    policy: may("importLogs"),
    async handle(context, { params, body }) {
      const { importId, fileId } = params;
      return present(context, await commands.giveRecipe(context, importId, fileId, body));
    },
  }),
  defineEndpoint(contracts.chooseRepairs, {
    policy: may("importLogs"),
    async handle(context, { params, body }) {
      return present(context, await commands.giveRepairs(context, params.importId, body));
    },
  }),
  defineEndpoint(contracts.checkImport, {
    policy: may("importLogs"),
    status: 202,
    async handle(context, { params }) {
      return present(context, await commands.startCheck(context, params.importId));
    },
  }),
  defineEndpoint(contracts.confirmImport, {
    policy: may("importLogs"),
    status: 202,
    async handle(context, { params }) {
      return present(context, await commands.confirm(context, params.importId));
    },
  }),
  defineEndpoint(contracts.cancelImport, {
    policy: may("importLogs"),
    async handle(context, { params }) {
      return present(context, await commands.cancel(context, params.importId));
    },
  }),
  defineEndpoint(contracts.undoImport, {
    policy: may("importLogs"),
    status: 202,
    async handle(context, { params }) {
      return present(context, await commands.startUndo(context, params.importId));
    },
  }),
  defineEndpoint(contracts.reopenImport, {
    policy: may("importLogs"),
    async handle(context, { params }) {
      return present(context, await commands.reopen(context, params.importId));
    },
  }),
  defineEndpoint(contracts.downloadLogFile, {
    policy: may("seeLogs"),
    async handle(context, { params }) {
      const file = await fileOf(context, params.importId, params.fileId);
      return new FileAnswer({
        name: file.sourceName ?? file.name,
        contentType: "application/octet-stream",
        body: context.services.files.read(file.sourceSha256 ?? file.sha256),
        byteLength: file.sourceByteLength ?? file.byteLength,
      });
    },
  }),
  defineEndpoint(contracts.downloadLogText, {
    policy: may("seeLogs"),
    async handle(context, { params }) {
      const file = await fileOf(context, params.importId, params.fileId);
      if (file.isPacked)
        throw new Conflict(
          "file-not-unpacked",
          "There is no text of this file yet.",
          file.unreadable ? "Take it out of the import." : "Wait until it is unpacked.",
        );
      return new FileAnswer({
        name: file.sourceKind === "xlsx" ? `${file.name}.txt` : file.name,
        contentType: "application/octet-stream",
        body: context.services.files.read(file.sha256),
        byteLength: file.byteLength,
      });
    },
  }),
  defineEndpoint(contracts.previewLogRows, {
    policy: may("seeLogs"),
    async handle(context, { params, query }) {
      const file = await fileOf(context, params.importId, params.fileId);
      if (file.recipe === null)
        throw new Conflict(
          "file-not-recognised",
          "Nobody knows yet how this file is written.",
          "Wait until it is recognised.",
        );
      const content = context.services.files.read(file.sha256);
      return { rows: await previewRows(content, file.recipe.dialect, query.line, query.limit) };
    },
  }),
];
