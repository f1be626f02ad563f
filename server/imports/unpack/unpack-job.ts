import { MAX_FILES_PER_IMPORT } from "@shared/contracts/imports";
import type { LeftOut } from "@shared/domain/log-files/containers";
import type { Unreadable } from "@shared/domain/log-files/recognition";
import { inTransaction } from "@server/database/transaction";
import type { JobContext } from "@server/jobs/job-context";
import { JobDropped } from "@server/jobs/job-outcome";
import { LogFile } from "@server/models/log-file";
import { importOfJob } from "../load-files";
import { enqueueReading, filesOf, settleImport } from "../settle-import";
import { unpack, type Member, type Unpacked } from "./unpack";
import { UnpackRefused } from "./unpack-refused";

/**
 * Turns an upload that holds logs into the files of the import: the row of the upload becomes its first
 * member, further members get rows of their own. All or nothing: what is refused leaves nothing behind.
 */
export async function unpackJob(context: JobContext): Promise<void> {
  const file = await LogFile.findOne({ where: { id: context.job.logFileId ?? "0" } });
  if (file === null || !file.isPacked) throw new JobDropped();
  let unpacked: Unpacked;
  try {
    unpacked = await unpackFile(context, file);
  } catch (error) {
    if (!(error instanceof UnpackRefused)) throw error;
    await refuse(context, file, error.unreadable);
    return;
  }
  try {
    await store(context, file, unpacked);
  } catch (error) {
    if (!(error instanceof UnpackRefused)) throw error;
    await refuse(context, file, error.unreadable);
  } finally {
    for (const { staged } of unpacked.members) await staged.discard();
  }
}

async function unpackFile(context: JobContext, file: LogFile): Promise<Unpacked> {
  const { files, checkpoint, report } = context;
  const path = await files.localPath(file.sourceSha256 ?? file.sha256);
  return unpack(
    { path, name: file.sourceName ?? file.name, byteLength: file.byteLength },
    {
      stage: (content) => files.stage(content),
      checkpoint,
      onMember: () => report({ stage: "recognising", rowsRead: 0, rowsTotal: null }),
    },
  );
}

async function refuse(context: JobContext, file: LogFile, unreadable: Unreadable): Promise<void> {
  const { database } = context;
  await inTransaction(database, async (transaction) => {
    const row = await importOfJob(context, transaction);
    const fresh = await LogFile.findOne({ where: { id: file.id }, transaction });
    if (fresh === null) throw new JobDropped();
    await fresh.update({ unreadable }, { transaction });
    await settleImport(database, transaction, row);
    await context.finish(transaction);
  });
}

async function store(context: JobContext, file: LogFile, unpacked: Unpacked): Promise<void> {
  const { database } = context;
  await inTransaction(database, async (transaction) => {
    const row = await importOfJob(context, transaction);
    const present = await filesOf(row, transaction);
    const fresh = present.find(({ id }) => id === file.id);
    if (fresh === undefined) throw new JobDropped();
    const others = present.filter(({ id }) => id !== file.id);
    const { members, repeated } = withoutRepeats(unpacked.members, others);
    const [first, ...more] = members;
    if (first === undefined)
      throw new UnpackRefused("alreadyThere", repeated.map(({ name }) => name).join(", "));
    if (others.length + members.length > MAX_FILES_PER_IMPORT)
      throw new UnpackRefused("archiveTooManyFiles", members.map(({ name }) => name).join(", "));
    // Kept before the rows that name them: a row without its file would be a loss.
    for (const { staged } of members) await staged.keep();
    const { kind, notes } = unpacked;
    const common = {
      sourceKind: kind,
      unpackNotes: { ...notes, leftOut: [...notes.leftOut, ...repeated] },
    };
    await fresh.update({ ...common, ...columnsOf(first) }, { transaction });
    const created = [fresh];
    for (const member of more) {
      const { organisationId, importId, pointId, uploadedAt } = fresh;
      const { sourceSha256, sourceName, sourceByteLength } = fresh;
      const source = { sourceSha256, sourceName, sourceByteLength };
      created.push(
        await LogFile.create(
          {
            ...{ organisationId, importId, pointId, uploadedAt },
            ...source,
            ...common,
            ...columnsOf(member),
          },
          { transaction },
        ),
      );
    }
    for (const each of created) await enqueueReading(database, transaction, each);
    await settleImport(database, transaction, row);
    await context.finish(transaction);
  });
}

function columnsOf({ name, member, staged }: Member) {
  return {
    name: name.slice(0, 255),
    member: member.slice(0, 255),
    sha256: staged.sha256,
    byteLength: staged.byteLength,
  };
}

/** The same text twice would be counted once and asked about twice. */
function withoutRepeats(members: readonly Member[], others: readonly LogFile[]) {
  const known = new Set(others.map(({ sha256 }) => sha256));
  const kept: Member[] = [];
  const repeated: LeftOut[] = [];
  for (const member of members) {
    if (known.has(member.staged.sha256)) repeated.push({ name: member.name, because: "sameFile" });
    else kept.push(member);
    known.add(member.staged.sha256);
  }
  return { members: kept, repeated };
}
