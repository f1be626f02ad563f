import * as contracts from "@shared/contracts/import-results";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { FileAnswer } from "@server/http/file-answer";
import { changeChoices } from "@server/imports/change-choices";
import { problemRowsFile } from "@server/imports/problem-rows-file";
import { LogImport } from "@server/models/log-import";
import { may } from "@server/policies/policy";
import { importHistory, importPeople } from "@server/queries/import-history";
import { presentWholeImport } from "./present-whole-import";

/** What became of an import, and the way back into it. */
export const importResultRoutes: readonly Endpoint[] = [
  defineEndpoint(contracts.getImportHistory, {
    policy: may("seeLogs"),
    async handle({ scope }, { params }) {
      const { id } = await scope.get(LogImport, params.importId, "import");
      return { items: await importHistory(scope, id) };
    },
  }),
  defineEndpoint(contracts.downloadProblemRows, {
    policy: may("seeLogs"),
    async handle(context, { params, query }) {
      const row = await context.scope.get(LogImport, params.importId, "import");
      return new FileAnswer(await problemRowsFile(context, row, query.language));
    },
  }),
  defineEndpoint(contracts.changeImportChoices, {
    policy: may("importLogs"),
    status: 202,
    async handle(context, { params }) {
      return presentWholeImport(context, await changeChoices(context, params.importId));
    },
  }),
  defineEndpoint(contracts.listImportPeople, {
    policy: may("seeLogs"),
    async handle(context) {
      return { items: await importPeople(context) };
    },
  }),
];
