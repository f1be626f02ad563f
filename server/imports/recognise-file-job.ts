import type { LoopService } from "@shared/domain/energy/power";
import { createFileScan } from "@shared/domain/log-files/file-scan";
import { finishRecognition } from "@shared/domain/log-files/finish-recognition";
import {
  HEAD_BYTES,
  isUnreadable,
  recogniseHead,
  type GivenDialect,
} from "@shared/domain/log-files/recognise-head";
import type { Recognition, Unreadable } from "@shared/domain/log-files/recognition";
import { inTransaction } from "@server/database/transaction";
import type { JobContext } from "@server/jobs/job-context";
import { databaseNow } from "@server/database/database-now";
import { JobDropped } from "@server/jobs/job-outcome";
import { LogFile } from "@server/models/log-file";
import { loadEnergySettings } from "@server/readings/energy-settings";
import { SERVICE_OF_ENERGY } from "@server/readings/meter-facts";
import { applyBatchRecipe } from "./batch-recipe";
import { importOfJob } from "./load-files";
import { boresOf } from "./point-bores";
import { readChunks } from "./read-log-file";
import { settleImport } from "./settle-import";

/** Finds out how a file is written, from all of its bytes: the last row may be what proves it. */
export async function recogniseFileJob(context: JobContext): Promise<void> {
  const { database, job } = context;
  const file = await LogFile.findOne({ where: { id: job.logFileId ?? "0" } });
  if (file === null) throw new JobDropped();
  const { service } = await loadEnergySettings(database, file.pointId);
  const found = await recognise(context, file, SERVICE_OF_ENERGY[service]);
  const hasBore = (await boresOf(file.pointId)).length > 0;
  await inTransaction(database, async (transaction) => {
    const row = await importOfJob(context, transaction);
    const fresh = await LogFile.findOne({ where: { id: file.id }, transaction });
    if (fresh === null) throw new JobDropped();
    if ("code" in found) {
      await fresh.update({ unreadable: found, recognition: null }, { transaction });
    } else {
      const { recipe, questions, ...findings } = found;
      await fresh.update(
        {
          recognition: { ...findings, asked: questions, proposed: recipe },
          recipe,
          questions: questions.filter(({ code }) => code !== "pointBore" || !hasBore),
          unreadable: null,
        },
        { transaction },
      );
      const now = await databaseNow(database, transaction);
      await applyBatchRecipe(database, row, fresh, now, transaction);
    }
    await settleImport(database, transaction, row);
    await context.finish(transaction);
  });
}

async function recognise(
  { files, checkpoint, report }: JobContext,
  file: LogFile,
  service: LoopService,
): Promise<Recognition | Unreadable> {
  const path = await files.localPath(file.sha256);
  // A recipe before recognition is one whose separator, header line or encoding somebody changed.
  const given: GivenDialect = file.recipe
    ? {
        encoding: file.recipe.dialect.encoding,
        separator: file.recipe.dialect.separator,
        columnStarts: file.recipe.dialect.columnStarts,
        headerLine: file.recipe.dialect.headerLine,
      }
    : {};
  const wholeIsHead = file.byteLength <= HEAD_BYTES;
  let scan: ReturnType<typeof createFileScan> | undefined;
  let head: ReturnType<typeof recogniseHead> | undefined;
  let bytesRead = 0;
  let rowsTotal: number | null = null;
  readChunks(path, (bytes) => {
    checkpoint();
    // The first chunk is larger than the head that recognition wants.
    head ??= recogniseHead(bytes.subarray(0, HEAD_BYTES), wholeIsHead, given);
    if (isUnreadable(head)) return;
    scan ??= createFileScan(head);
    scan.push(bytes);
    bytesRead += bytes.length;
    // How many rows there are is not known yet; rows are much of a length, so the bytes tell.
    rowsTotal ??= Math.round((scan.rowsRead * file.byteLength) / Math.max(1, bytesRead));
    report({ stage: "recognising", rowsRead: scan.rowsRead, rowsTotal });
  });
  head ??= recogniseHead(new Uint8Array(0), true);
  if (isUnreadable(head)) return head;
  return finishRecognition(head, (scan ?? createFileScan(head)).end(), service);
}
