import type { ImportDetail } from "@shared/contracts/imports";
import type { Context } from "@server/http/context";
import { NotFound } from "@server/http/errors";
import { sameFiles } from "@server/imports/change-import";
import { factsOfFiles } from "@server/imports/file-facts";
import { importFacts } from "@server/imports/import-facts";
import { presentImportDetail } from "@server/imports/present-import";
import { sharedFiles } from "@server/imports/shared-files";
import { filesOf } from "@server/imports/settle-import";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { currentBores } from "@server/queries/current-bores";

/** An import as every call that changes it answers. */
export async function presentWholeImport(context: Context, row: LogImport): Promise<ImportDetail> {
  const { scope, actor } = context;
  const [facts, files, bores] = await Promise.all([
    importFacts(context, [row]),
    filesOf(row),
    currentBores(scope, [row.pointId]),
  ]);
  const alsoFor = await sharedFiles(context, row, files);
  const said = await factsOfFiles(scope, row, files);
  const same = await sameFiles(row, files);
  const earlier = await scope.list(LogImport, {
    where: { id: same.map((twin) => twin.earlier.importId) },
  });
  const twins = same.flatMap((twin) => {
    const importedAt = earlier.find(({ id }) => id === twin.earlier.importId)?.importedAt;
    return importedAt ? [{ ...twin, importedAt }] : [];
  });
  return presentImportDetail(
    row,
    facts,
    { files, twins, alsoFor, said, bore: bores.get(row.pointId) ?? null },
    actor,
  );
}

/** @throws NotFound also for a file of another import */
export async function fileOfImport(
  { scope }: Context,
  { importId, fileId }: { readonly importId: string; readonly fileId: string },
): Promise<LogFile> {
  const file = await scope.get(LogFile, fileId, "file");
  if (file.importId !== importId) throw new NotFound("file");
  return file;
}
