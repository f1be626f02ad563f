import { Op, type Transaction } from "sequelize";
import { isCompanion, needsUnit } from "@shared/domain/log-files/column-units";
import { DEFAULT_REPAIR_CHOICES, type FileRecipe } from "@shared/domain/log-files/recipe";
import type { PointSet, Question } from "@shared/domain/log-files/recognition";
import { recordAudit } from "@server/commands/record-audit";
import { inTransaction } from "@server/database/transaction";
import { Conflict, NotFound } from "@server/http/errors";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { Loop } from "@server/models/loop";
import { MeteringPoint } from "@server/models/metering-point";
import { loadEnergySettings } from "@server/readings/energy-settings";
import type { Importing } from "./change-import";
import { questionsLeftBy } from "./open-questions";
import { boresOf } from "./point-bores";
import { settleImport } from "./settle-import";

/**
 * Opens an import of the same bytes for another point of the same site: nothing is uploaded again.
 * Columns that an import of these bytes reads already are skipped, and the first set of columns that
 * none reads is proposed; where there is none, somebody must say which columns hold this point's.
 */
export async function importAlsoFor(
  context: Importing,
  given: { readonly importId: string; readonly fileId: string; readonly pointId: string },
): Promise<LogImport> {
  const { scope, actor, clock, database } = context;
  const file = await scope.get(LogFile, given.fileId, "file");
  if (file.importId !== given.importId) throw new NotFound("file");
  const { recognition, recipe } = file;
  if (recognition === null || recipe === null)
    throw new Conflict(
      "file-not-recognised",
      "This file is not read yet.",
      "Wait until it is recognised, then use it for another point as well.",
    );
  await requireSibling(context, file.pointId, given.pointId);
  const row = await inTransaction(database, async (transaction) => {
    const others = await sharersOf(file, transaction);
    const wanted = recipeFor(recipe, recognition.pointSets ?? [], [file, ...others]);
    const row = await scope.create(
      LogImport,
      {
        pointId: given.pointId,
        state: "open",
        repair: DEFAULT_REPAIR_CHOICES,
        createdByAccountId: actor.accountId,
        createdByName: actor.accountName,
        createdAt: clock.date(),
      },
      { transaction },
    );
    const { name, sha256, byteLength, sourceKind, sourceSha256, sourceName } = file;
    const { sourceByteLength, member, unpackNotes } = file;
    const { service } = await loadEnergySettings(database, given.pointId, transaction);
    const hasBore = (await boresOf(given.pointId, transaction)).length > 0;
    await scope.create(
      LogFile,
      {
        importId: row.id,
        pointId: given.pointId,
        uploadedAt: clock.date(),
        ...{ name, sha256, byteLength, sourceKind, sourceSha256, sourceName },
        ...{ sourceByteLength, member, unpackNotes, recognition },
        recipe: wanted,
        questions: [
          ...questionsLeftBy(wanted, recognition, { service, hasBore }),
          ...whichColumns(wanted),
        ],
      },
      { transaction },
    );
    await row.reload({ transaction });
    await settleImport(database, transaction, row);
    const details = { name, sha256, fromImport: given.importId };
    const subject = { kind: "import", id: row.id };
    await recordAudit(context, { kind: "import-opened", subject, details }, transaction);
    return row;
  });
  context.services.jobs.poke();
  return row;
}

async function requireSibling({ scope }: Importing, fromId: string, toId: string): Promise<void> {
  const [from, to] = [
    await scope.get(MeteringPoint, fromId, "metering point"),
    await scope.get(MeteringPoint, toId, "metering point"),
  ];
  const [loop, otherLoop] = [
    await scope.get(Loop, from.loopId, "loop"),
    await scope.get(Loop, to.loopId, "loop"),
  ];
  if (from.id === to.id || loop.siteId !== otherLoop.siteId || to.archivedAt !== null)
    throw new Conflict(
      "not-another-point",
      "The file can only be used for another metering point of the same site that is in use.",
      "Choose such a point, or upload the file for the one meant.",
    );
}

/** Files of the same text in imports of other points that are not cancelled. */
export async function sharersOf(
  file: LogFile,
  transaction?: Transaction,
): Promise<readonly LogFile[]> {
  const { organisationId, sha256, pointId } = file;
  const files = await LogFile.findAll({
    where: { organisationId, sha256, pointId: { [Op.ne]: pointId } },
    transaction,
  });
  if (files.length === 0) return [];
  const imports = await LogImport.findAll({
    attributes: ["id"],
    where: {
      organisationId,
      id: files.map(({ importId }) => importId),
      state: { [Op.notIn]: ["cancelled", "undone", "failed"] },
    },
    transaction,
  });
  const living = new Set(imports.map(({ id }) => id));
  return files.filter(({ importId }) => living.has(importId));
}

/** Columns of a point's own readings; outdoor temperature and words are everybody's. */
export function ownColumns(recipe: FileRecipe | null): readonly number[] {
  return (recipe?.columns ?? [])
    .filter(({ meaning }) => (needsUnit(meaning) || meaning === "signal") && !isCompanion(meaning))
    .map(({ index }) => index);
}

function recipeFor(
  recipe: FileRecipe,
  sets: readonly PointSet[],
  sharers: readonly LogFile[],
): FileRecipe {
  const used = new Set(sharers.flatMap((file) => ownColumns(file.recipe)));
  const free = sets.find(({ columns }) => columns.every(({ index }) => !used.has(index)));
  return {
    ...recipe,
    columns: recipe.columns.map((column) => {
      const proposed = free?.columns.find(({ index }) => index === column.index);
      if (proposed) return { ...column, meaning: proposed.meaning, unit: proposed.unit };
      if (!used.has(column.index)) return column;
      const { capacity: _, pulseValue: __, ...rest } = column;
      return { ...rest, meaning: "skip", unit: null };
    }),
  };
}

function whichColumns(recipe: FileRecipe): Question[] {
  return ownColumns(recipe).length > 0 ? [] : [{ code: "columnMeaning", meaning: "flow" }];
}
