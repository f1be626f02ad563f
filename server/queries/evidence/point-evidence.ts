import type { Transaction } from "sequelize";
import type { InstallationFields } from "@shared/contracts/evidence";
import { fluidHeatUncertaintyPercent } from "@shared/domain/fluids/fluid-heat-uncertainty";
import { localDateOf } from "@shared/domain/time/local-calendar";
import type { Budget } from "@shared/domain/uncertainty/budget";
import {
  budgetFromEvidence,
  type BudgetInput,
  type UsualState,
} from "@shared/domain/uncertainty/budget-from-evidence";
import type { PointEvidence } from "@shared/domain/uncertainty/point-evidence";
import type { Scope } from "@server/database/scoped";
import { Installation } from "@server/models/installation";
import { bathCheckOf, evidenceOf } from "./evidence-of";
import { loadEvidenceRecords, type EvidenceRecords } from "./evidence-records";
import { fieldsOf } from "./installation-fields";
import { loadPointBackground, type PointBackground } from "./point-background";

/** How a point was measured over a stretch of time, as it stands in the record now. */
export interface StandingInstallation {
  readonly id: string;
  readonly version: number;
  readonly startMs: number;
  /** Where it ends by itself or by the next one's start; null while it goes on. */
  readonly endMs: number | null;
  readonly recordedBy: string;
  readonly fields: InstallationFields;
  readonly evidence: PointEvidence;
  readonly bathCheckId: string | null;
  /** A clamp-on meter or a probe on the surface: not for billing unless agreement and law allow. */
  readonly indicativeOnly: boolean;
}

export interface PointInstallations {
  readonly background: PointBackground;
  /** Oldest first; they do not overlap. */
  readonly installations: readonly StandingInstallation[];
}

/**
 * The installations that speak for a point, those superseded or withdrawn left out.
 * @param range half-open, in ms: only those that touch it; null for all.
 * @throws NotFound where the organisation has no such point.
 */
export async function loadInstallationsOf(
  scope: Scope,
  pointId: string,
  range: { readonly startMs: number; readonly endMs: number } | null,
  transaction?: Transaction,
): Promise<PointInstallations> {
  const background = await loadPointBackground(scope, pointId, transaction);
  const found = await loadInstallationsOfPoints(scope, [background], range, transaction);
  return { background, installations: found.get(pointId) ?? [] };
}

/** The same for points whose background is known, by point: four queries, however many points. */
export async function loadInstallationsOfPoints(
  scope: Scope,
  backgrounds: readonly PointBackground[],
  range: { readonly startMs: number; readonly endMs: number } | null,
  transaction?: Transaction,
): Promise<Map<string, StandingInstallation[]>> {
  if (backgrounds.length === 0) return new Map();
  const rows = await scope.list(Installation, {
    where: {
      pointId: backgrounds.map(({ point }) => point.id),
      supersededAt: null,
      withdrawnAt: null,
    },
    order: [["startsAt", "ASC"]],
    transaction,
  });
  const asked = backgrounds.flatMap((background) => {
    const own = rows.filter(({ pointId }) => pointId === background.point.id);
    return own
      .map((row, at) => {
        const startMs = row.startsAt.getTime();
        const ends = [row.endsAt, own[at + 1]?.startsAt].flatMap((end) => end?.getTime() ?? []);
        const endMs = ends.length === 0 ? null : Math.min(...ends);
        return { background, row, fields: fieldsOf(row), startMs, endMs };
      })
      .filter(
        ({ startMs, endMs }) =>
          range === null || (startMs < range.endMs && (endMs === null || endMs > range.startMs)),
      );
  });
  const records = await loadEvidenceRecords(
    scope,
    asked.map(({ fields }) => fields),
    transaction,
  );
  const byPoint = new Map<string, StandingInstallation[]>();
  for (const { background, row, fields, startMs, endMs } of asked) {
    const startDay = localDateOf(startMs, background.site.zone);
    const list = byPoint.get(row.pointId) ?? [];
    byPoint.set(row.pointId, list);
    list.push({
      id: row.id,
      version: row.version,
      startMs,
      endMs,
      recordedBy: row.recordedByName,
      fields,
      evidence: evidenceOf(fields, records, startDay, testedOnOf(background)),
      bathCheckId: bathCheckOf(fields, records, startDay)?.id ?? null,
      indicativeOnly: isIndicativeOnly(fields, records),
    });
  }
  return byPoint;
}

export function testedOnOf({ loop }: PointBackground): string | null {
  return loop.fluid.kind === "water" ? null : loop.fluid.testedOn;
}

/** Clamp-on readings and probes on a pipe's surface are in general not legal for trade. */
export function isIndicativeOnly(
  { flowMeterId, probes }: InstallationFields,
  { instruments }: EvidenceRecords,
): boolean {
  const meter = flowMeterId === null ? undefined : instruments.get(flowMeterId);
  const sides = probes ? [probes.supply, probes.return] : [];
  return meter?.kind === "flowMeter" || sides.some(({ mounting }) => mounting === "surface");
}

export interface BudgetWishes {
  /** The day certificates and checks are judged by, YYYY-MM-DD in the site's zone. */
  readonly onDate: string;
  /** Usual temperatures and speed of the time asked about; null where nothing is known. */
  readonly state: UsualState | null;
  readonly intervalS?: number | null;
  readonly pairDifferenceCorrected?: boolean;
}

/** The budget of a point; without evidence, of times no installation speaks for. */
export function budgetOf(
  background: PointBackground,
  evidence: PointEvidence | null,
  wishes: BudgetWishes,
): Budget {
  return budgetFromEvidence(budgetInputOf(background, evidence, wishes));
}

export function budgetInputOf(
  { point, loop, fluid, pipe }: PointBackground,
  evidence: PointEvidence | null,
  wishes: BudgetWishes,
): BudgetInput {
  const { state } = wishes;
  // Where no temperature is known, a mixture is judged at what such a loop usually runs at.
  const { supplyC, returnC } = state ?? USUAL_C[loop.service];
  const heat = fluidHeatUncertaintyPercent(loop.fluid, supplyC, returnC);
  return {
    ...wishes,
    evidence,
    pipe,
    fluid: fluid.ok ? fluid.fluid : null,
    fluidHeatPercent: heat?.kPercent ?? 0,
    meterSide: point.meterSide,
  };
}

const USUAL_C = {
  chilled: { supplyC: 6, returnC: 12 },
  changeover: { supplyC: 6, returnC: 12 },
  hot: { supplyC: 70, returnC: 55 },
} as const;
