import { correctionChange, type CorrectionChange } from "@shared/contracts/corrections";
import { fluidForEnergy } from "@shared/domain/fluids/loop-fluid";
import type { Interval } from "@shared/domain/time/interval";
import type { Scope } from "@server/database/scoped";
import { Correction } from "@server/models/correction";
import { currentBores } from "@server/queries/current-bores";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import type { PointBackground } from "@server/queries/evidence/point-background";
import {
  loadInstallationsOfPoints,
  type PointInstallations,
  type StandingInstallation,
} from "@server/queries/evidence/point-evidence";

type ProbeOffset = Extract<CorrectionChange, { kind: "probeOffset" }>;

/** All that a ± needs besides the sums: who measured how, and how often. */
export interface FigureEvidence extends PointInstallations {
  /** IANA zone of the site: certificates and checks are judged by its days. */
  readonly zone: string;
  readonly intervalS: number | null;
  /** First and last reading of the point, ms: what lies outside needs no correction. */
  readonly held: HeldReadings;
  /** Applied offsets of probes: a pair's known difference is taken off the readings. */
  readonly offsets: readonly ProbeOffset[];
}

export interface HeldReadings {
  readonly firstMs: number | null;
  readonly lastMs: number | null;
}

/** A point with what its background is made from, all loaded. */
export interface EvidencePoint extends Pick<PointBackground, "point" | "loop" | "site"> {
  readonly nominalStepMs: number | null;
  readonly held: HeldReadings;
}

/** The evidence of one point over a range. */
export async function loadFigureEvidence(
  scope: Scope,
  { point, loop, site, readings }: Pick<EnergyPoint, "point" | "loop" | "site" | "readings">,
  range: Interval,
): Promise<FigureEvidence> {
  const { nominalStepMs, firstMs, lastMs } = readings;
  const asked = { point, loop, site, nominalStepMs, held: { firstMs, lastMs } };
  const found = (await loadFigureEvidences(scope, [asked], range)).get(point.id);
  if (!found) throw new Error(`no evidence was made for point ${point.id}`);
  return found;
}

/** The same for several points, by point: six queries, however many. */
export async function loadFigureEvidences(
  scope: Scope,
  points: readonly EvidencePoint[],
  range: Interval,
): Promise<Map<string, FigureEvidence>> {
  const [bores, offsets] = await Promise.all([
    currentBores(
      scope,
      points.map(({ point }) => point.id),
    ),
    appliedOffsets(scope),
  ]);
  const backgrounds = points.map(({ point, loop, site }): PointBackground => ({
    point,
    loop,
    site,
    fluid: fluidForEnergy(loop.fluid, loop.gaugePressureMPa),
    pipe: bores.get(point.id) ?? null,
  }));
  const installations = await loadInstallationsOfPoints(scope, backgrounds, range);
  return new Map(
    points.map(({ point, site, nominalStepMs, held }, at) => [
      point.id,
      {
        background: backgrounds[at] as PointBackground,
        installations: installations.get(point.id) ?? [],
        zone: site.zone,
        intervalS: nominalStepMs === null ? null : nominalStepMs / 1000,
        held,
        offsets,
      },
    ]),
  );
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
 * reaches over all of them, or because there was none to take off. A range asked for may begin before
 * the first reading and end after the last.
 */
export function isPairCorrected(
  { installation, startMs, endMs }: EvidencePart,
  { offsets, held: { firstMs, lastMs } }: Pick<FigureEvidence, "offsets" | "held">,
): boolean {
  if (!installation?.evidence.bathCheck?.meanDifferenceK) return true;
  const { probes } = installation.fields;
  const ids = probes ? [probes.supply.probeId, probes.return.probeId] : [];
  const fromMs = Math.max(startMs, firstMs ?? startMs);
  const untilMs = Math.min(endMs, lastMs ?? endMs);
  return offsets.some(
    ({ probeId, from, to }) =>
      ids.includes(probeId) &&
      Date.parse(from) <= fromMs &&
      (to === null || Date.parse(to) >= untilMs),
  );
}
