import type { Transaction } from "sequelize";
import type { CorrectionEffect } from "@shared/contracts/corrections";
import type { RepairChoices } from "@shared/domain/log-files/recipe";
import { rowsInSpan } from "@shared/domain/readings/corrections/correction-span";
import type { ReadingSegment } from "@shared/domain/readings/reading-columns";
import { Correction } from "@server/models/correction";
import type { LogImport } from "@server/models/log-import";
import type { Language } from "@shared/formats/language";
import { recordAudit } from "@server/commands/record-audit";
import { instantText } from "@server/database/conversions";
import { Account } from "@server/models/account";
import { chosenReason, undoneReason } from "@server/words/finding-reasons";
import { spanOf, spanOfChange } from "@server/readings/point-corrections";
import { changesIf, chosenChanges, type ChosenChange } from "./choices";
import type { FoundFinding } from "./find-findings";
import type { ChoiceEnergy } from "./choice-energy";

/**
 * Keeps what was chosen in an import's checks as corrections of the point, applied in the name of who
 * confirmed the import and tied to it. Each carries what it does to the energy, the others being made.
 * In the transaction that stores the readings; `now` is the database's.
 */
export async function keepChosenCorrections(
  transaction: Transaction,
  row: LogImport,
  chosen: readonly ChosenChange[],
  {
    findings,
    energy,
    fileNames,
    now,
  }: {
    readonly findings: readonly FoundFinding[];
    readonly energy: ChoiceEnergy;
    readonly fileNames: readonly string[];
    readonly now: Date;
  },
): Promise<void> {
  if (chosen.length === 0) return;
  const language = await languageOf(row, transaction);
  const byName = row.confirmedByName ?? row.createdByName;
  const byAccountId = row.confirmedByAccountId ?? row.createdByAccountId;
  for (const one of chosen) {
    const { change, found } = one;
    const correction = await Correction.create(
      {
        organisationId: row.organisationId,
        proposedAtPointId: row.pointId,
        pointId: row.pointId,
        logFileId: "logFileId" in change ? change.logFileId : null,
        importId: row.id,
        kind: change.kind,
        document: change,
        reason: chosenReason(language, found.finding, fileNames),
        state: "applied",
        effect: effectOf(one, findings, row.repair, energy),
        createdAt: now,
        createdByAccountId: byAccountId,
        createdByName: byName,
        appliedAt: now,
        appliedByName: byName,
      },
      { transaction },
    );
    const by = { accountId: byAccountId, name: byName };
    await recordEvent(transaction, row, correction, "correction-applied", by, now);
  }
}

/** The language of who confirmed the import: the corrections are theirs. */
async function languageOf(row: LogImport, transaction: Transaction): Promise<Language> {
  const id = row.confirmedByAccountId ?? row.createdByAccountId;
  const account = id === null ? null : await Account.findByPk(id, { transaction });
  return account?.language ?? "en";
}

/** Null where the loop's fluid gives no energy to compare. */
function effectOf(
  one: ChosenChange,
  findings: readonly FoundFinding[],
  choices: RepairChoices,
  energy: ChoiceEnergy,
): CorrectionEffect | null {
  const all = chosenChanges(findings, choices).map(({ change }) => change);
  const others = changesIf(findings, choices, one.found, "keep");
  const weight = energy.weigh(others, all, [one.change]);
  if (weight === null) return null;
  return {
    from: instantText(new Date(weight.startMs)),
    to: instantText(new Date(weight.endMs)),
    before: { heatingKwh: weight.before.heatingKwh, coolingKwh: weight.before.coolingKwh },
    after: { heatingKwh: weight.after.heatingKwh, coolingKwh: weight.after.coolingKwh },
    volume: { beforeM3: weight.before.volumeM3, afterM3: weight.after.volumeM3 },
    rowsChanged: rowsChangedBy(one, energy.segmentsWith([])),
  };
}

function rowsChangedBy({ change, found }: ChosenChange, segments: readonly ReadingSegment[]) {
  if (change.kind === "split") return 0;
  const span = spanOfChange(change);
  if (span === null) return found.finding.rowCount;
  const parts = change.kind === "exclude" ? change.parts : undefined;
  const spans = parts ? parts.map(spanOf) : [span];
  return spans.reduce(
    (sum, each) =>
      sum +
      segments.reduce((rows, segment) => {
        const { from, to } = rowsInSpan(segment, each);
        return rows + to - from;
      }, 0),
    0,
  );
}

/**
 * Withdraws what was chosen in an import's checks, as undoing the import takes its readings out. Those
 * that somebody withdrew before stay as they are.
 * @returns whether one of them moved a file's rows in time
 */
export async function withdrawChosenCorrections(
  transaction: Transaction,
  row: LogImport,
  { fileNames, now }: { readonly fileNames: readonly string[]; readonly now: Date },
): Promise<{ readonly movedRows: boolean }> {
  const standing = await Correction.findAll({
    where: { organisationId: row.organisationId, importId: row.id, state: "applied" },
    transaction,
  });
  const name = row.undoneByName ?? row.createdByName;
  const withdrawnReason = undoneReason(await languageOf(row, transaction), fileNames);
  for (const correction of standing) {
    await correction.update(
      { state: "withdrawn", withdrawnAt: now, withdrawnByName: name, withdrawnReason },
      { transaction },
    );
    const by = { accountId: null, name };
    await recordEvent(transaction, row, correction, "correction-withdrawn", by, now);
  }
  return { movedRows: standing.some(({ kind }) => kind === "clock") };
}

function recordEvent(
  transaction: Transaction,
  row: LogImport,
  correction: Correction,
  kind: string,
  by: { readonly accountId: string | null; readonly name: string },
  now: Date,
): Promise<void> {
  return recordAudit(
    { actor: null, clock: { date: () => now, now: () => now.getTime() } },
    {
      kind,
      subject: { kind: "correction", id: correction.id },
      details: { correction: correction.kind, pointId: row.pointId, importId: row.id },
      by: { ...by, organisationId: row.organisationId },
    },
    transaction,
  );
}
