import type { ComparedSide, KnownFigure, MeterSide } from "@shared/contracts/meter-comparisons";
import { deltaTMeans, waterSeconds } from "@shared/domain/energy/totals";
import type { UncertainFigure } from "@shared/domain/uncertainty/figures";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import { Invalid } from "@server/http/errors";
import { combineTotals } from "@server/queries/energy/combine-totals";
import { loadEnergyPoint, type EnergyPoint } from "@server/queries/energy/energy-point";
import type { EnergyRange } from "@server/queries/energy/energy-range";
import type { EnergyRow } from "@server/queries/energy/energy-rows";
import { loadFigureEvidence, type FigureEvidence } from "@server/queries/workings/figure-evidence";
import { plusMinusOf } from "@server/queries/workings/figure-uncertainty";
import { claimedPercents, knownTo, type ClaimedPercents } from "./meter-claim";

export type PointSide = Extract<MeterSide, { kind: "point" }>;

/** A metering point of this product as one side, loaded. */
export interface LoadedPoint {
  readonly side: PointSide;
  readonly energyPoint: EnergyPoint;
  readonly evidence: FigureEvidence;
  /** Null where the point's evidence speaks, not a permanent meter's class. */
  readonly claimed: ClaimedPercents | null;
}

/** @throws Invalid (422) for a point of another site; NotFound for another organisation's. */
export async function loadPointSide(
  context: { readonly database: Database; readonly scope: Scope },
  siteId: string,
  side: PointSide,
  at: "first" | "second",
  range: EnergyRange,
): Promise<LoadedPoint> {
  const energyPoint = await loadEnergyPoint(context, side.pointId);
  if (energyPoint.site.id !== siteId)
    throw Invalid.field(`${at}/pointId`, "no-such-point", "This site has no such metering point.");
  const evidence = await loadFigureEvidence(context.scope, energyPoint, range);
  return { side, energyPoint, evidence, claimed: side.claim && claimedPercents(side.claim) };
}

/**
 * What the point measured over `rows`, with the ± of its workings or of its meter's class.
 * @throws Invalid (422) where no row has readings: there is nothing to compare.
 */
export function pointSide(
  loaded: LoadedPoint,
  rows: readonly EnergyRow[],
  expectedS: number,
  at: "first" | "second",
): ComparedSide {
  const { side, energyPoint, claimed } = loaded;
  const { point, loop, readings } = energyPoint;
  const totals = combineTotals(rows.map((row) => row.totals));
  if (totals.coveredS === 0)
    throw Invalid.field(
      `${at}/pointId`,
      "no-energy-in-period",
      "This point has no energy in the period. Choose another period or import its log.",
    );
  const own = totals[side.register];
  const hasWater = waterSeconds(totals) > 0;
  const { flowWeightedK } = deltaTMeans(own, totals.meterOnlyS);
  const energyKwh = energyOf(loaded, rows);
  return {
    kind: "point",
    name: point.code,
    energyKwh: energyKwh.known,
    volumeM3: hasWater ? figureOf(loaded, rows, "volume", totals.volumeM3).known : null,
    deltaTK: flowWeightedK === null ? null : figureOf(loaded, rows, "deltaT", flowWeightedK).known,
    limits: claimed?.limits ?? null,
    point: {
      pointId: point.id,
      pointCode: point.code,
      loopId: loop.id,
      loopTag: loop.tag,
      register: side.register,
      coverage: expectedS > 0 ? Math.min(1, totals.coveredS / expectedS) : 0,
      basis: energyKwh.basis,
      revision: readings.revision,
    },
  };
}

/** Energy of the side's register over rows, such as those of one band of flow. */
export function energyOf(loaded: LoadedPoint, rows: readonly EnergyRow[]): Figured {
  const { register } = loaded.side;
  const value = rows.reduce((sum, row) => sum + row.totals[register].energyKwh, 0);
  return figureOf(loaded, rows, "energy", value);
}

interface Figured {
  readonly known: KnownFigure;
  readonly basis: "evidence" | "partlyDefaults" | "defaults" | null;
}

function figureOf(
  { side, evidence, claimed }: LoadedPoint,
  rows: readonly EnergyRow[],
  figure: Extract<UncertainFigure, "energy" | "volume" | "deltaT">,
  value: number,
): Figured {
  if (claimed !== null) return { known: knownTo(value, claimed[figure]), basis: null };
  const found = plusMinusOf(evidence, rows, { figure, register: side.register });
  const expanded = found?.expanded ?? null;
  return {
    known: { value, expanded, percent: found?.percent ?? null },
    basis: found?.basis ?? null,
  };
}
