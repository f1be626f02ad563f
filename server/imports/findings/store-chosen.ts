import type { Transaction } from "sequelize";
import { resolveSegments, type ReadingSource } from "@shared/domain/readings/resolve-segments";
import type { Interval } from "@shared/domain/time/interval";
import { databaseNow } from "@server/database/database-now";
import type { Database } from "@server/database/connect";
import type { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import type { EnergySettings } from "@server/readings/energy-settings";
import { loadPointCorrections } from "@server/readings/point-corrections";
import type { CheckedFile } from "../file-checks";
import { sourcesOf, spanOf } from "../import-sources";
import { findingsBasis, loadCheckContext } from "./check-context";
import { chosenChanges } from "./choices";
import { ChoiceEnergy } from "./choice-energy";
import { withClocks } from "./chosen-readings";
import { findFindings } from "./find-findings";
import { isUndecided } from "./import-findings";
import { keepChosenCorrections } from "./keep-corrections";

export interface StoringFindings {
  readonly database: Database;
  readonly transaction: Transaction;
  readonly row: LogImport;
  readonly logFiles: readonly LogFile[];
  readonly files: readonly CheckedFile[];
  readonly stored: readonly ReadingSource[];
  readonly precedence: number;
  readonly settings: EnergySettings;
  readonly span: Interval;
  /** Called between parts of the work; may throw to stop it. */
  readonly onStep: () => void;
}

/** Whether nothing but keeping the readings was chosen. */
const keepsAll = ({ repair }: LogImport) =>
  Object.values(repair.findings ?? {}).every((choice) => choice === "keep");

/**
 * Finds once more what the check found, by the same functions, and keeps what was chosen as
 * corrections; where nothing was chosen and nothing has changed since the check, there is nothing to
 * find. `undecided`: something stops that was not there at the check, because the point's
 * corrections or its records changed since; then nothing is kept.
 */
export async function storeChosen(storing: StoringFindings): Promise<"kept" | "undecided"> {
  const { database, transaction, row, logFiles, files, settings, span } = storing;
  const { stored, precedence, onStep } = storing;
  const { segments: standing } = await loadPointCorrections(database, row.pointId, transaction);
  const context = await loadCheckContext(row, logFiles, settings, span, transaction);
  if (keepsAll(row) && row.checks?.findingsBasis === findingsBasis(context, standing, settings))
    return "kept";
  const own = resolveSegments(sourcesOf(files, 1, settings.meterPlace));
  const found = findFindings(files, own, standing, context, onStep);
  if (isUndecided(found, row.repair)) return "undecided";
  const chosen = chosenChanges(found.findings, row.repair);
  if (chosen.length === 0) return "kept";
  const moved = withClocks(
    files,
    chosen.map(({ change }) => change),
  );
  const wholeSpan = spanOf([...files, ...moved]) ?? span;
  const energy = new ChoiceEnergy({
    files,
    stored,
    precedence,
    settings,
    standing,
    span: wholeSpan,
    onStep,
  });
  await keepChosenCorrections(transaction, row, chosen, {
    findings: found.findings,
    energy,
    fileNames: logFiles.map(({ name }) => name),
    now: await databaseNow(database, transaction),
  });
  return "kept";
}
