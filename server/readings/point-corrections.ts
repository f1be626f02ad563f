import { QueryTypes, type Transaction } from "sequelize";
import { correctionChange, type CorrectionChange } from "@shared/contracts/corrections";
import { fluidForEnergy } from "@shared/domain/fluids/loop-fluid";
import type { FluidAtPressure } from "@shared/domain/fluids/fluid-at-pressure";
import type { ClockError } from "@shared/domain/readings/corrections/clock";
import type { SegmentCorrection } from "@shared/domain/readings/corrections/correct-segments";
import {
  sharedSpan,
  type CorrectionSpan,
} from "@shared/domain/readings/corrections/correction-span";
import { boreFactor } from "@shared/domain/readings/corrections/scale-by-bore";
import type { UnitChannel } from "@shared/domain/readings/corrections/unit";
import { DAY_MS } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { probePlaces, type ProbePlace } from "./probe-places";

/** What stands between a point's stored readings and what anybody sees of them. */
export interface PointCorrections {
  /** Clock and units of single files, by the file's id. */
  readonly files: ReadonlyMap<string, FileCorrections>;
  readonly segments: readonly SegmentCorrection[];
}

export interface FileCorrections {
  readonly clock: ClockError | null;
  readonly units: Readonly<Partial<Record<UnitChannel, string>>>;
}

export const noCorrections: PointCorrections = { files: new Map(), segments: [] };

export interface StandingCorrection {
  readonly id: string;
  readonly change: CorrectionChange;
}

/** Applied corrections that touch a point, oldest first; with one more where its effect is asked for. */
export async function standingCorrections(
  database: Database,
  pointId: string,
  transaction?: Transaction,
  alsoId: string | null = null,
): Promise<StandingCorrection[]> {
  const rows = await database.query<{ id: string; document: string }>(
    `SELECT c.id, c.document FROM correction c
      WHERE (c.state = 'applied' OR c.id = :alsoId)
        AND (c.point_id = :pointId OR c.probe_id IN (
          SELECT i.supply_probe_id FROM installation i WHERE i.point_id = :pointId
             AND i.superseded_at IS NULL AND i.withdrawn_at IS NULL AND i.supply_probe_id IS NOT NULL
          UNION ALL
          SELECT i.return_probe_id FROM installation i WHERE i.point_id = :pointId
             AND i.superseded_at IS NULL AND i.withdrawn_at IS NULL AND i.return_probe_id IS NOT NULL))
      ORDER BY c.id`,
    { replacements: { pointId, alsoId }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map(({ id, document }) => ({
    id: String(id),
    change: correctionChange.parse(JSON.parse(document)),
  }));
}

/** The corrections on a point's readings, ready to be put on. One query where there are none. */
export async function loadPointCorrections(
  database: Database,
  pointId: string,
  transaction?: Transaction,
  alsoId: string | null = null,
): Promise<PointCorrections> {
  const standing = await standingCorrections(database, pointId, transaction, alsoId);
  if (standing.length === 0) return noCorrections;
  const changes = standing.map(({ change }) => change);
  const gaugeMPa = changes.some(({ kind }) => kind === "fluid")
    ? await gaugePressureOf(database, pointId, transaction)
    : null;
  const places = changes.some(({ kind }) => kind === "probeOffset")
    ? await probePlaces(database, { pointId }, transaction)
    : [];
  return {
    files: fileCorrections(changes),
    segments: changes.flatMap((change) => segmentCorrections(change, places, gaugeMPa)),
  };
}

export function spanOf(change: {
  readonly from: string;
  readonly to: string | null;
}): CorrectionSpan {
  return {
    startMs: Date.parse(change.from),
    endMs: change.to === null ? Infinity : Date.parse(change.to),
  };
}

/** When a change speaks; null for that of a file. */
export function spanOfChange(change: CorrectionChange): CorrectionSpan | null {
  if ("from" in change) return spanOf(change);
  if (change.kind !== "split") return null;
  const atMs = Date.parse(change.at);
  return { startMs: atMs, endMs: atMs + 1 };
}

export function clockErrorOf(change: Extract<CorrectionChange, { kind: "clock" }>): ClockError {
  return {
    offsetMs: change.offsetS * 1000,
    driftPerMs: (change.driftSPerDay * 1000) / DAY_MS,
    referenceMs: Date.parse(change.referenceAt),
  };
}

function fileCorrections(changes: readonly CorrectionChange[]): Map<string, FileCorrections> {
  const files = new Map<string, FileCorrections>();
  for (const change of changes) {
    if (change.kind !== "clock" && change.kind !== "unit") continue;
    const { logFileId } = change;
    const known = files.get(logFileId) ?? { clock: null, units: {} };
    files.set(
      logFileId,
      change.kind === "clock"
        ? { ...known, clock: clockErrorOf(change) }
        : { ...known, units: { ...known.units, [change.channel]: change.unit } },
    );
  }
  return files;
}

/** A change as it is put on resolved segments; none of a file's clock or unit, which come before. */
export function segmentCorrections(
  change: CorrectionChange,
  places: readonly ProbePlace[],
  gaugeMPa: number | null,
): SegmentCorrection[] {
  switch (change.kind) {
    case "clock":
    case "unit":
      return [];
    case "exclude":
      return (change.parts ?? [change]).map((part) => ({
        kind: change.kind,
        span: spanOf(part),
        rule: change.rule,
      }));
    case "split":
      return [{ kind: change.kind, atMs: Date.parse(change.at) }];
    case "swapSides":
      return [{ kind: change.kind, span: spanOf(change), swapped: change.swapped }];
    case "flipFlow":
      return [{ kind: change.kind, span: spanOf(change) }];
    case "scaleByBore": {
      const factor = boreFactor(change.enteredBoreMm, change.trueBoreMm);
      return [{ kind: change.kind, span: spanOf(change), factor }];
    }
    case "probeOffset":
      return places.flatMap(({ probeId, side, span }) => {
        const shared = probeId === change.probeId ? sharedSpan(span, spanOf(change)) : null;
        return shared ? [{ kind: change.kind, span: shared, side, addK: change.addK }] : [];
      });
    case "fluid": {
      const fluid = fluidAt(change, gaugeMPa);
      return fluid ? [{ kind: change.kind, span: { ...spanOf(change), fluid } }] : [];
    }
  }
}

/** The fluid of a change at a loop's pressure; null where it gives no energy. */
export function fluidAt(
  change: Extract<CorrectionChange, { kind: "fluid" }>,
  gaugeMPa: number | null,
): FluidAtPressure | null {
  const fluid = fluidForEnergy(change.fluid, gaugeMPa);
  return fluid.ok ? fluid.fluid : null;
}

export async function gaugePressureOf(
  database: Database,
  pointId: string,
  transaction?: Transaction,
): Promise<number | null> {
  const [row] = await database.query<{ gauge: number | null }>(
    `SELECT l.gauge_pressure_mpa AS gauge FROM metering_point p JOIN \`loop\` l ON l.id = p.loop_id
      WHERE p.id = :pointId`,
    { replacements: { pointId }, type: QueryTypes.SELECT, transaction },
  );
  return row?.gauge ?? null;
}
