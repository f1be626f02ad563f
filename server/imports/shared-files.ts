import { Op } from "sequelize";
import type { ImportFile } from "@shared/contracts/imports";
import type { Context } from "@server/http/context";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { ownColumns } from "./also-for-point";
import { importFacts } from "./import-facts";

/**
 * Which other points the same text is imported for, by file. The same file for another point is no
 * mistake, but the same columns for two points may be: they are named.
 */
export async function sharedFiles(
  context: Pick<Context, "scope" | "database">,
  row: LogImport,
  files: readonly LogFile[],
): Promise<ReadonlyMap<string, ImportFile["alsoFor"]>> {
  const { scope } = context;
  const sharers = await scope.list(LogFile, {
    attributes: ["id", "importId", "pointId", "sha256", "recipe"],
    where: { sha256: files.map(({ sha256 }) => sha256), pointId: { [Op.ne]: row.pointId } },
    order: [["id", "ASC"]],
  });
  if (sharers.length === 0) return new Map();
  const imports = await scope.list(LogImport, {
    where: {
      id: sharers.map(({ importId }) => importId),
      state: { [Op.notIn]: ["cancelled", "undone", "failed"] },
    },
    attributes: { exclude: ["checks"] },
  });
  const { places } = await importFacts(context, imports);
  return new Map(
    files.map((file) => {
      const own = ownColumns(file.recipe);
      const entries = sharers
        .filter(({ sha256 }) => sha256 === file.sha256)
        .flatMap((other) => {
          const place = places.get(other.pointId);
          if (!place || !imports.some(({ id }) => id === other.importId)) return [];
          const theirs = ownColumns(other.recipe);
          return [
            {
              importId: other.importId,
              point: { id: place.pointId, code: place.pointCode, name: place.pointName },
              loopTag: place.loopTag,
              sameColumns: own.filter((index) => theirs.includes(index)),
            },
          ];
        });
      return [file.id, entries];
    }),
  );
}
