import { DEFAULT_REPAIR_CHOICES } from "@shared/domain/log-files/recipe";
import type { SeriesKind } from "@shared/domain/readings/reading-columns";
import { inTransaction } from "@server/database/transaction";
import { LogFile } from "@server/models/log-file";
import { LogImport } from "@server/models/log-import";
import { lockPoint, recalculateEnergy } from "@server/readings/recalculate-energy";
import { packBlocks, storeBlocks } from "@server/readings/store-blocks";
import type { StoredRows } from "@server/readings/stored-rows";
import type { TestApp } from "./test-app";

interface Owner {
  readonly organisationId: string;
  readonly pointId: string;
}

/** Rows of a steady step; what a wish leaves out stays the same in every row. */
export interface RowWishes {
  readonly fromMs: number;
  readonly count: number;
  readonly stepMs: number;
  readonly flow?: (row: number) => number;
  readonly supply?: (row: number) => number;
  readonly return?: (row: number) => number;
  readonly quality?: (row: number) => number;
  /** Rows the logger never wrote. */
  readonly without?: (row: number) => boolean;
}

/** Readings as a logger writes them: 28.8 m³/h, 6.90 to 12.80 °C, unless wished otherwise. */
export function loggedRows(wishes: RowWishes): StoredRows {
  const rows = Array.from({ length: wishes.count }, (_, row) => row).filter(
    (row) => !wishes.without?.(row),
  );
  const column = (value: (row: number) => number) => Float64Array.from(rows, value);
  return {
    instantMs: column((row) => wishes.fromMs + row * wishes.stepMs),
    flow: { unit: "m3/h", values: column(wishes.flow ?? (() => 28.8)) },
    supply: { unit: "degC", values: column(wishes.supply ?? (() => 6.9)) },
    return: { unit: "degC", values: column(wishes.return ?? (() => 12.8)) },
    signal: null,
    quality: Uint8Array.from(rows, wishes.quality ?? (() => 0)),
  };
}

/** Stores readings as an import would, and works their energy out. */
export async function storedReadings(
  app: TestApp,
  { organisationId, pointId }: Owner,
  rows: StoredRows,
  stepMs: number,
  seriesKind: SeriesKind = "instantaneous",
): Promise<LogFile> {
  const now = app.clock.date();
  const { id: importId } = await LogImport.create({
    organisationId,
    pointId,
    state: "imported",
    repair: DEFAULT_REPAIR_CHOICES,
    createdByAccountId: null,
    createdByName: "Test",
    createdAt: now,
  });
  const file = await LogFile.create({
    organisationId,
    importId,
    pointId,
    name: "log.csv",
    sha256: "0".repeat(64),
    byteLength: 1,
    uploadedAt: now,
    precedence: Number(importId),
    seriesKind,
    nominalStepMs: stepMs,
  });
  await inTransaction(app.database, async (transaction) => {
    await lockPoint(app.database, transaction, pointId);
    await storeBlocks(
      transaction,
      { organisationId, pointId, logFileId: file.id },
      packBlocks(rows),
    );
    await recalculateEnergy(app.database, transaction, pointId, {
      startMs: rows.instantMs[0] ?? 0,
      endMs: rows.instantMs.at(-1) ?? 0,
    });
  });
  return file;
}
