import { UniqueConstraintError, type Transaction } from "sequelize";
import type { z } from "zod";
import type {
  addCertificate as addContract,
  createInstrument as createContract,
  updateInstrument as updateContract,
} from "@shared/contracts/evidence";
import { inTransaction } from "@server/database/transaction";
import { Conflict, Invalid } from "@server/http/errors";
import { Certificate } from "@server/models/certificate";
import { Instrument } from "@server/models/instrument";
import { changesOf, type Acting } from "./acting";
import { recordAudit } from "./record-audit";

type NewInstrument = z.output<(typeof createContract)["body"]>;
type InstrumentChanges = z.output<(typeof updateContract)["body"]>;
type NewCertificate = z.output<(typeof addContract)["body"]>;

const taken = "Another instrument of this kind has this serial.";

/** The database decides who has a serial, so two people saving at once cannot both win. */
async function namingSerial<Result>(
  write: () => Promise<Result>,
  restoring = false,
): Promise<Result> {
  try {
    return await write();
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    if (restoring)
      throw new Conflict(
        "serial-taken",
        taken,
        "Correct the serial of one of the two, then restore it.",
      );
    throw Invalid.field("serial", "serial-taken", taken);
  }
}

function requireClassOnProbeOnly(kind: Instrument["kind"], probeClass: string | null): void {
  if (probeClass !== null && kind !== "probe")
    throw Invalid.field("probeClass", "probes-only", "Only a temperature probe has such a class.");
}

export async function createInstrument(
  acting: Acting,
  { range, ...fields }: NewInstrument,
): Promise<Instrument> {
  requireClassOnProbeOnly(fields.kind, fields.probeClass ?? null);
  return inTransaction(acting.database, async (transaction) => {
    const createdAt = acting.clock.date();
    const values = {
      ...fields,
      measuringRange: range ?? null,
      notes: fields.notes || null,
      createdAt,
    };
    const row = await namingSerial(() => acting.scope.create(Instrument, values, { transaction }));
    await record(acting, "instrument-created", row, { kind: row.kind }, transaction);
    return row;
  });
}

/** Changes, archives or restores an instrument. */
export async function updateInstrument(
  acting: Acting,
  instrumentId: string,
  { archived, range, ...fields }: InstrumentChanges,
): Promise<Instrument> {
  return inTransaction(acting.database, async (transaction) => {
    const row = await lockInstrument(acting, instrumentId, transaction);
    const values = { ...fields, ...(range === undefined ? {} : { measuringRange: range }) };
    requireClassOnProbeOnly(row.kind, values.probeClass ?? null);
    const changes = changesOf<object>(row.get(), values);
    row.set(values);
    const flips = archived !== undefined && archived !== (row.archivedAt !== null);
    if (flips) {
      row.archivedAt = archived ? acting.clock.date() : null;
      changes.archived = { from: !archived, to: archived };
    }
    await namingSerial(() => row.save({ transaction }), flips && !archived);
    if (Object.keys(changes).length > 0)
      await record(acting, "instrument-updated", row, changes, transaction);
    return row;
  });
}

export async function addCertificate(
  acting: Acting,
  instrumentId: string,
  fields: NewCertificate,
): Promise<Instrument> {
  if (fields.dueOn && fields.dueOn <= fields.issuedOn)
    throw Invalid.field("dueOn", "due-before-issue", "Must be after the day it was issued.");
  return inTransaction(acting.database, async (transaction) => {
    const row = await lockInstrument(acting, instrumentId, transaction);
    const recorded = { recordedAt: acting.clock.date(), recordedByName: acting.actor.accountName };
    const values = { ...fields, ...recorded, instrumentId };
    const { id } = await acting.scope.create(Certificate, values, { transaction });
    const details = { certificateId: id, ...fields };
    await record(acting, "certificate-added", row, details, transaction);
    return row;
  });
}

/** A certificate entered by mistake stops counting and stays readable. */
export async function withdrawCertificate(
  acting: Acting,
  certificateId: string,
  reason: string,
): Promise<Instrument> {
  return inTransaction(acting.database, async (transaction) => {
    const certificate = await acting.scope.get(Certificate, certificateId, "certificate", {
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (certificate.withdrawnAt !== null)
      throw new Conflict(
        "withdrawn-already",
        `Certificate ${certificate.number} was withdrawn before.`,
        "Add the right one to the instrument.",
      );
    await certificate.update(
      { withdrawnAt: acting.clock.date(), withdrawnReason: reason },
      { transaction },
    );
    const options = { transaction };
    const row = await acting.scope.get(Instrument, certificate.instrumentId, "instrument", options);
    const details = { certificateId, number: certificate.number, reason };
    await record(acting, "certificate-withdrawn", row, details, transaction);
    return row;
  });
}

function lockInstrument(acting: Acting, instrumentId: string, transaction: Transaction) {
  const options = { transaction, lock: transaction.LOCK.UPDATE };
  return acting.scope.get(Instrument, instrumentId, "instrument", options);
}

function record(
  acting: Acting,
  kind: string,
  { id, serial }: Instrument,
  details: Record<string, unknown>,
  transaction: Transaction,
): Promise<void> {
  const subject = { kind: "instrument", id };
  return recordAudit(acting, { kind, subject, details: { serial, ...details } }, transaction);
}
