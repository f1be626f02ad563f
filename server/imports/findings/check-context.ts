import { createHash } from "node:crypto";
import type { Transaction } from "sequelize";
import type { PlaceContext } from "@shared/domain/readings/checks/check-readings";
import type { ClockNote } from "@shared/domain/readings/checks/clock-notes";
import type { SegmentCorrection } from "@shared/domain/readings/corrections/correct-segments";
import type { Interval } from "@shared/domain/time/interval";
import { HOUR_MS } from "@shared/domain/time/interval";
import { zeroLeft } from "@shared/domain/uncertainty/zero-term";
import { scoped } from "@server/database/scoped";
import type { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import { loadInstallationsOf } from "@server/queries/evidence/point-evidence";
import type { EnergySettings } from "@server/readings/energy-settings";
import { SERVICE_OF_ENERGY } from "@server/readings/meter-facts";
import { boresOf } from "../point-bores";

/** What the checks of an import know of its point, its loop and how it was measured then. */
export interface ImportCheckContext {
  readonly place: PlaceContext;
  /** What the installation's record says of its one logger's clock; empty where it says nothing. */
  readonly clockNotes: readonly ClockNote[];
  /** No reading can be later: when the last file came, with room for a clock ahead of the site's. */
  readonly latestMs: number | null;
}

/** A clock in the farthest zone is 26 hours ahead of one in the last. */
const ZONES_APART_MS = 26 * HOUR_MS;

/** @param span the time the files speak for; null where they hold no row */
export async function loadCheckContext(
  row: LogImport,
  files: readonly LogFile[],
  settings: EnergySettings,
  span: Interval | null,
  transaction?: Transaction,
): Promise<ImportCheckContext> {
  const { meterPlace, cutOffs } = settings;
  const range = span && { startMs: span.startMs, endMs: span.endMs + 1 };
  const [bores, { installations }] = await Promise.all([
    boresOf(row.pointId, transaction),
    loadInstallationsOf(scoped(row.organisationId), row.pointId, range, transaction),
  ]);
  const middleMs = span === null ? null : (span.startMs + span.endMs) / 2;
  const bore = bores.find(
    ({ fromMs, toMs }) =>
      middleMs !== null && fromMs <= middleMs && (toMs === null || middleMs < toMs),
  );
  const [installation] = range === null ? [] : installations;
  const zero = installation?.evidence.zero ?? null;
  const uploads = files.map(({ uploadedAt }) => uploadedAt.getTime());
  return {
    place: {
      service: SERVICE_OF_ENERGY[meterPlace.service],
      boreMm: bore?.insideDiameterMm ?? meterPlace.insideDiameterMm,
      designFlowM3PerHour: meterPlace.designFlowM3PerHour,
      designDeltaTK: meterPlace.designDeltaTK,
      flowCutOffM3PerHour: cutOffs.flowM3PerHour,
      zeroUncertaintyMPerS: zero && zeroLeft(zero).widthMPerS,
    },
    clockNotes: installation ? notesOf(installation) : [],
    latestMs: uploads.length === 0 ? null : Math.max(...uploads) + ZONES_APART_MS,
  };
}

/**
 * What findings rest on besides the files and the choices, as a hash: where it is that of the check,
 * looking again finds the same.
 */
export function findingsBasis(
  context: ImportCheckContext,
  standing: readonly SegmentCorrection[],
  { meterPlace, cutOffs }: EnergySettings,
): string {
  const basis = JSON.stringify([context, standing, meterPlace, cutOffs]);
  return createHash("sha256").update(basis).digest("hex").slice(0, 32);
}

/** Notes of the only logger an installation names; of several nobody can tell which wrote the file. */
function notesOf(installation: {
  readonly startMs: number;
  readonly endMs: number | null;
  readonly evidence: {
    readonly clocks: readonly {
      readonly startOffsetS: number | null;
      readonly endOffsetS: number | null;
    }[];
  };
}): ClockNote[] {
  const [clock, ...others] = installation.evidence.clocks;
  if (!clock || others.length > 0) return [];
  const note = (referenceMs: number | null, offsetS: number | null): ClockNote[] =>
    referenceMs === null || offsetS === null
      ? []
      : [{ referenceMs, loggerMs: referenceMs + offsetS * 1000 }];
  return [
    ...note(installation.startMs, clock.startOffsetS),
    ...note(installation.endMs, clock.endOffsetS),
  ];
}
