import { Op, type Transaction } from "sequelize";
import type { InstallationFields } from "@shared/contracts/evidence";
import type { Scope } from "@server/database/scoped";
import { BathCheck } from "@server/models/bath-check";
import { Certificate } from "@server/models/certificate";
import { Instrument } from "@server/models/instrument";

/** The kit and the checks that installations name, loaded together for any number of them. */
export interface EvidenceRecords {
  readonly instruments: ReadonlyMap<string, Instrument>;
  /** By instrument; newest issue first, withdrawn ones left out. */
  readonly certificates: ReadonlyMap<string, readonly Certificate[]>;
  /** Every check of the probes named, replaced ones too. */
  readonly bathChecks: readonly BathCheck[];
}

/** Three queries, however many installations. */
export async function loadEvidenceRecords(
  scope: Scope,
  installations: readonly InstallationFields[],
  transaction?: Transaction,
): Promise<EvidenceRecords> {
  const ids = new Set<string>();
  const probeIds = new Set<string>();
  for (const { flowMeterId, loggerId, probes } of installations) {
    if (flowMeterId !== null) ids.add(flowMeterId);
    if (loggerId !== null) ids.add(loggerId);
    for (const probe of probes ? [probes.supply, probes.return] : []) probeIds.add(probe.probeId);
  }
  const all = [...ids, ...probeIds];
  const [instruments, certificates, bathChecks] = await Promise.all([
    all.length === 0 ? [] : scope.list(Instrument, { where: { id: all }, transaction }),
    loadCertificates(scope, all, transaction),
    probeIds.size === 0 ? [] : loadBathChecks(scope, [...probeIds], transaction),
  ]);
  return {
    instruments: new Map(instruments.map((row) => [row.id, row])),
    certificates,
    bathChecks,
  };
}

/** Certificates that count, by instrument, newest issue first. */
export function loadCertificates(
  scope: Scope,
  instrumentIds: readonly string[],
  transaction?: Transaction,
): Promise<Map<string, Certificate[]>> {
  return certificatesWhere(scope, { withdrawnAt: null }, instrumentIds, transaction);
}

/** The same with those withdrawn. */
export function loadAllCertificates(
  scope: Scope,
  instrumentIds: readonly string[],
): Promise<Map<string, Certificate[]>> {
  return certificatesWhere(scope, {}, instrumentIds);
}

async function certificatesWhere(
  scope: Scope,
  condition: { readonly withdrawnAt?: null },
  instrumentIds: readonly string[],
  transaction?: Transaction,
): Promise<Map<string, Certificate[]>> {
  const byInstrument = new Map<string, Certificate[]>();
  if (instrumentIds.length === 0) return byInstrument;
  const rows = await scope.list(Certificate, {
    where: { ...condition, instrumentId: [...instrumentIds] },
    order: [
      ["issuedOn", "DESC"],
      ["id", "DESC"],
    ],
    transaction,
  });
  for (const row of rows) {
    const list = byInstrument.get(row.instrumentId);
    if (list) list.push(row);
    else byInstrument.set(row.instrumentId, [row]);
  }
  return byInstrument;
}

/** Every check in which both probes are among the given ones, replaced ones too. */
export function loadBathChecks(
  scope: Scope,
  probeIds: readonly string[],
  transaction?: Transaction,
): Promise<BathCheck[]> {
  const among = { [Op.in]: [...probeIds] };
  return scope.list(BathCheck, {
    where: { firstProbeId: among, secondProbeId: among },
    order: [
      ["checkedOn", "ASC"],
      ["id", "ASC"],
    ],
    transaction,
  });
}

/** The certificate that speaks for a day: the newest issued by then; null where there is none. */
export function certificateOn(
  certificates: readonly Certificate[],
  day: string,
): Certificate | null {
  return certificates.find(({ issuedOn }) => issuedOn <= day) ?? null;
}
