import type {
  Certificate as CertificateAnswer,
  CertificateState,
  Instrument as InstrumentAnswer,
  Placement,
} from "@shared/contracts/evidence";
import { addDays } from "@shared/domain/time/local-calendar";
import { instantText, instantTextOrNull } from "@server/database/conversions";
import type { Certificate } from "@server/models/certificate";
import type { Instrument } from "@server/models/instrument";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import type { InstrumentPlacement } from "@server/queries/evidence/placements";

const noticeDays = 30;

/** How a certificate stands on a day; it counts on the day it is due. */
export function certificateState(dueOn: string | null, today: string): CertificateState {
  if (dueOn === null) return "openEnded";
  if (dueOn < today) return "lapsed";
  return dueOn <= addDays(today, noticeDays) ? "dueSoon" : "inDate";
}

export interface InstrumentFacts {
  /** Withdrawn ones too. */
  readonly certificates: readonly Certificate[];
  readonly placements: readonly InstrumentPlacement[];
  readonly today: string;
}

function presentCertificate(row: Certificate, today: string): CertificateAnswer {
  return {
    id: row.id,
    number: row.number,
    laboratory: row.laboratory,
    accredited: row.accredited,
    issuedOn: row.issuedOn,
    dueOn: row.dueOn,
    expanded: row.expanded,
    k: row.k,
    state: certificateState(row.dueOn, today),
    recordedBy: row.recordedByName,
    withdrawnAt: instantTextOrNull(row.withdrawnAt),
    withdrawnReason: row.withdrawnReason,
  };
}

function presentPlacement(row: InstrumentPlacement): Placement {
  return {
    installationId: String(row.installationId),
    siteId: String(row.siteId),
    siteName: row.siteName,
    loopId: String(row.loopId),
    loopTag: row.loopTag,
    service: row.service,
    pointId: String(row.pointId),
    pointCode: row.pointCode,
    zone: row.zone,
    startsAt: instantText(row.startsAt),
    endsAt: instantTextOrNull(row.endsAt),
  };
}

export function presentInstrument(
  row: Instrument,
  { certificates, placements, today }: InstrumentFacts,
  actor: Actor,
): InstrumentAnswer {
  const counts = certificates.find(
    ({ withdrawnAt, issuedOn }) => withdrawnAt === null && issuedOn <= today,
  );
  const order = [...certificates].sort(
    (a, b) => Number(a.withdrawnAt !== null) - Number(b.withdrawnAt !== null),
  );
  return {
    id: row.id,
    kind: row.kind,
    serial: row.serial,
    label: row.label,
    make: row.make,
    range: row.measuringRange,
    probeClass: row.probeClass,
    outOfService: row.outOfService,
    notes: row.notes,
    certificates: order.map((certificate) => presentCertificate(certificate, today)),
    calibration: counts ? certificateState(counts.dueOn, today) : "none",
    placements: placements.map(presentPlacement),
    archivedAt: instantTextOrNull(row.archivedAt),
    can: { edit: can(actor).editEvidence },
  };
}
