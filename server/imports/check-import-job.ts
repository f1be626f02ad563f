import type { Question } from "@shared/domain/log-files/recognition";
import { inTransaction } from "@server/database/transaction";
import type { JobContext } from "@server/jobs/job-context";
import { JobDropped } from "@server/jobs/job-outcome";
import { LogFile } from "@server/models/log-file";
import { loadEnergySettings } from "@server/readings/energy-settings";
import { loadSources } from "@server/readings/load-segments";
import { loadPointCorrections } from "@server/readings/point-corrections";
import { checkImport } from "./check-import";
import type { CheckedFile } from "./file-checks";
import { loadCheckContext } from "./findings/check-context";
import { spanOf } from "./import-sources";
import { importOfJob, loadFile, openFiles } from "./load-files";
import { move } from "./settle-import";

/** Runs the whole import without storing readings, and keeps what it found for the Checks step. */
export async function checkImportJob(context: JobContext): Promise<void> {
  const { database, job } = context;
  const row = await importOfJob(context);
  if (row.revision !== job.revision) throw new JobDropped();
  const settings = await loadEnergySettings(database, row.pointId);
  const { files, rows } = await openFiles(row);
  const loaded: CheckedFile[] = [];
  for (const file of files)
    loaded.push(await loadFile(context, file, row.repair, settings.zone, rows));
  context.report({ stage: "checking", rowsRead: rows.read, rowsTotal: rows.total });
  const span = spanOf(loaded);
  const stored = span ? await loadSources(database, row.pointId, span.startMs, span.endMs + 1) : [];
  context.checkpoint();
  const { segments: corrections } = await loadPointCorrections(database, row.pointId);
  const checks = checkImport({
    onStep: context.checkpoint,
    files: loaded,
    stored,
    settings,
    choices: row.repair,
    corrections,
    context: await loadCheckContext(row, files, settings, span),
  });
  const unclear = unclearFiles(loaded);

  await inTransaction(database, async (transaction) => {
    const fresh = await importOfJob(context, transaction);
    if (fresh.revision !== job.revision) throw new JobDropped();
    for (const [id, questions] of unclear)
      await LogFile.update({ questions }, { where: { id }, transaction });
    fresh.checks = checks;
    if (unclear.size > 0) move(fresh, "questionsOpen");
    else move(fresh, checks.undecided.length > 0 ? "checkUndecided" : "checkPassed");
    await fresh.save({ transaction });
    await context.finish(transaction);
  });
}

/** Files whose recipe proved not to be enough once all rows were read, with what to ask. */
function unclearFiles(files: readonly CheckedFile[]): Map<string, Question[]> {
  const unclear = new Map<string, Question[]>();
  for (const { fileId, resolved } of files) {
    if (resolved.questions.some(({ code }) => code === "loggerClock"))
      unclear.set(fileId, [{ code: "loggerClock" }]);
  }
  return unclear;
}
