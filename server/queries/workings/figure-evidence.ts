import { correctionChange, type CorrectionChange } from "@shared/contracts/corrections";
import type { Interval } from "@shared/domain/time/interval";
import type { Scope } from "@server/database/scoped";
import { Correction } from "@server/models/correction";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import {
  loadInstallationsOf,
  type PointInstallations,
  type StandingInstallation,
} from "@server/queries/evidence/point-evidence";

type ProbeOffset = Extract<CorrectionChange, { kind: "probeOffset" }>;

/** All that a ± needs besides the sums: who measured how, and how often. */
export interface FigureEvidence extends PointInstallations {
  /** IANA zone of the site: certificates and checks are judged by its days. */
  readonly zone: string;
  readonly intervalS: number | null;
  /** Applied offsets of probes: a pair's known difference is taken off the readings. */
  readonly offsets: readonly ProbeOffset[];
}

/** The evidence of one point over a range. */
export async function loadFigureEvidence(
  scope: Scope,
  { point, site, readings }: Pick<EnergyPoint, "point" | "site" | "readings">,
  range: Interval,
): Promise<FigureEvidence> {
  const [installations, offsets] = await Promise.all([
    loadInstallationsOf(scope, point.id, range),
    appliedOffsets(scope),
  ]);
  const intervalS = readings.nominalStepMs === null ? null : readings.nominalStepMs / 1000;
  return { ...installations, zone: site.zone, intervalS, offsets };
}

async function appliedOffsets(scope: Scope): Promise<ProbeOffset[]> {
  const rows = await scope.list(Correction, {
    where: { kind: "probeOffset", state: "applied" },
    attributes: ["document"],
  });
  return rows.flatMap(({ document }) => {
    const change = correctionChange.parse(document);
    return change.kind === "probeOffset" ? [change] : [];
  });
}

/** A stretch of a range with the installation that speaks for it; null: nobody recorded one. */
export interface EvidencePart extends Interval {
  readonly installation: StandingInstallation | null;
}

/** The range cut where installations begin and end. */
export function evidenceParts(
  installations: readonly StandingInstallation[],
  range: Interval,
): EvidencePart[] {
  const parts: EvidencePart[] = [];
  let fromMs = range.startMs;
  for (const installation of installations) {
    const startMs = Math.max(fromMs, installation.startMs);
    const endMs = Math.min(range.endMs, installation.endMs ?? range.endMs);
    if (endMs <= startMs) continue;
    if (startMs > fromMs) parts.push({ startMs: fromMs, endMs: startMs, installation: null });
    parts.push({ startMs, endMs, installation });
    fromMs = endMs;
  }
  if (fromMs < range.endMs) parts.push({ startMs: fromMs, endMs: range.endMs, installation: null });
  return parts;
}

/**
 * Whether the pair's known difference has been taken off the readings of a stretch: by an offset that
 * reaches over all of it, or because there was none to take off.
 */
export function isPairCorrected(
  { installation, startMs, endMs }: EvidencePart,
  offsets: readonly ProbeOffset[],
): boolean {
  if (!installation?.evidence.bathCheck?.meanDifferenceK) return true;
  const { probes } = installation.fields;
  const ids = probes ? [probes.supply.probeId, probes.return.probeId] : [];
  return offsets.some(
    ({ probeId, from, to }) =>
      ids.includes(probeId) &&
      Date.parse(from) <= startMs &&
      (to === null || Date.parse(to) >= endMs),
  );
}
