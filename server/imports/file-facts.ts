import type { FileFact } from "@shared/contracts/imports";
import { compareFacts, type RecordedFacts } from "@shared/domain/log-files/compare-facts";
import { preambleFacts } from "@shared/domain/log-files/preamble-facts";
import { outsideDiameterFromCircumferenceMm } from "@shared/domain/pipes/bore";
import { boreFromEvidence } from "@shared/domain/uncertainty/bore-from-evidence";
import type { Scope } from "@server/database/scoped";
import type { LogFile } from "@server/models/log-file";
import type { LogImport } from "@server/models/log-import";
import { loadEvidenceRecords } from "@server/queries/evidence/evidence-records";
import {
  loadInstallationsOf,
  type PointInstallations,
  type StandingInstallation,
} from "@server/queries/evidence/point-evidence";

export interface SaidByFile {
  readonly facts: FileFact[];
  /** The installation they were held against; null where none speaks for that time. */
  readonly installationId: string | null;
}

/** What each file of an import says above its header, held against the point's record of that time. */
export async function factsOfFiles(
  scope: Scope,
  row: LogImport,
  files: readonly LogFile[],
): Promise<Map<string, SaidByFile>> {
  const said = files.flatMap((file) => {
    const facts = preambleFacts(file.recognition?.preamble ?? []);
    return facts.length > 0 ? [{ file, facts }] : [];
  });
  if (said.length === 0) return new Map();
  const found = await loadInstallationsOf(scope, row.pointId, null);
  const records = await loadEvidenceRecords(
    scope,
    found.installations.map(({ fields }) => fields),
  );
  const serialOf = (id: string | null | undefined) =>
    (id && records.instruments.get(id)?.serial) || null;
  return new Map(
    said.map(({ file, facts }) => {
      const checked = row.checks?.files.find(({ fileId }) => fileId === file.id);
      const atMs = checked?.firstInstant ? Date.parse(checked.firstInstant) : null;
      const spoke = installationAt(found.installations, atMs);
      const recorded = recordedFacts(found, spoke, serialOf, checked?.nominalStepS ?? null);
      const compared = compareFacts(facts, recorded).map((fact) => ({ ...fact }));
      return [file.id, { facts: compared, installationId: spoke?.id ?? null }];
    }),
  );
}

/** The one that speaks for the file's first reading; the newest while nobody knows when that was. */
function installationAt(
  installations: readonly StandingInstallation[],
  atMs: number | null,
): StandingInstallation | null {
  if (atMs === null) return installations[installations.length - 1] ?? null;
  return (
    installations.find(
      ({ startMs, endMs }) => startMs <= atMs && (endMs === null || atMs < endMs),
    ) ?? null
  );
}

function recordedFacts(
  { background }: PointInstallations,
  spoke: StandingInstallation | null,
  serialOf: (id: string | null | undefined) => string | null,
  intervalS: number | null,
): RecordedFacts {
  const { point, loop, site, pipe } = background;
  const fields = spoke?.fields ?? null;
  const measured = fields?.pipe ?? null;
  const walls = measured?.wallReadingsMm ?? [];
  const bore = spoke ? boreFromEvidence(spoke.evidence.pipe, null)?.boreMm : null;
  const logger = serialOf(fields?.loggerId);
  const wallMm =
    walls.length > 0 ? walls.reduce((sum, wall) => sum + wall, 0) / walls.length : null;
  const outside =
    measured?.outsideDiameterMm ??
    (measured?.circumferenceMm
      ? outsideDiameterFromCircumferenceMm(measured.circumferenceMm)
      : null);
  return {
    meterSerial: serialOf(fields?.flowMeterId),
    loggerSerials: [
      ...new Set([
        ...(logger === null ? [] : [logger]),
        ...(fields?.clocks ?? []).map(({ loggerSerial }) => loggerSerial),
      ]),
    ],
    supplyProbeSerial: serialOf(fields?.probes?.supply.probeId),
    returnProbeSerial: serialOf(fields?.probes?.return.probeId),
    boreMm: fields?.enteredBoreMm ?? bore ?? pipe?.insideDiameterMm ?? null,
    outsideDiameterMm: outside,
    wallMm,
    soundSpeedMPerS: fields?.soundSpeed?.displayedMPerS ?? null,
    fluid: loop.fluid.kind === "water" ? "water" : "glycol",
    intervalS,
    siteNames: [site.name],
    pointNames: [point.code, point.name, loop.tag, loop.name],
  };
}
