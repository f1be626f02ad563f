import { QueryTypes } from "sequelize";
import type { z } from "zod";
import type { siteOverviewLoop } from "@shared/contracts/places";
import type { RangePlusMinus } from "@shared/contracts/plus-minus";
import { nearestNominalSizeDn } from "@shared/domain/pipes/resolve-pipe";
import type { QualityRun } from "@shared/domain/readings/quality-runs";
import type { Interval } from "@shared/domain/time/interval";
import { DAY_MS } from "@shared/domain/time/interval";
import { rangeOfDates } from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import { decimalNumber, wholeNumber } from "@server/database/conversions";
import type { Scope } from "@server/database/scoped";
import type { BoreVersion } from "@server/models/bore-version";
import { Building } from "@server/models/building";
import { Loop } from "@server/models/loop";
import type { Site } from "@server/models/site";
import { energyBlockedBy } from "@server/presenters/present-loop";
import { loadDaysOf, type DayEnergy } from "@server/readings/day-rows";
import { filledStretchesOf, type FilledStretch } from "@server/readings/energy-fills";
import { currentBores } from "./current-bores";
import { withFills } from "./energy/filled-runs";
import { mainPoints } from "./main-points";
import { qualityStrips, type QualitySegment } from "./quality-strip";
import { loadFigureEvidences, type FigureEvidence } from "./workings/figure-evidence";
import { rangePlusMinus } from "./workings/range-plus-minus";

type OverviewLoop = z.input<typeof siteOverviewLoop>;

/** Quality is drawn for ranges up to this long: a longer strip would show nothing but a smear. */
const LONGEST_STRIP_MS = 62 * DAY_MS;

interface EnergyRow {
  pointId: string;
  heatingKwh: string | number;
  coolingKwh: string | number;
  heatingM3: string | number;
  coolingM3: string | number;
  heatingFlowDt: string | number;
  coolingFlowDt: string | number;
  coveredS: string | number;
}

interface ReadingsRow {
  pointId: string;
  firstMs: string | number | null;
  lastMs: string | number | null;
  blockedBy: string | null;
  nominalStepMs: number | null;
}

export interface SiteOverview {
  readonly buildings: readonly Building[];
  readonly loops: readonly OverviewLoop[];
  readonly firstReadingMs: number | null;
  readonly lastReadingMs: number | null;
}

/** Everything the site page shows, in a fixed number of queries however many loops there are. */
export async function siteOverview(
  database: Database,
  scope: Scope,
  site: Site,
  dates: { readonly from: string; readonly to: string },
  nowMs: number,
): Promise<SiteOverview> {
  const inUse = { siteId: site.id, archivedAt: null };
  const [buildings, loops] = await Promise.all([
    scope.list(Building, { where: inUse, order: [["id", "ASC"]] }),
    scope.list(Loop, { where: inUse, order: [["tag", "ASC"]] }),
  ]);
  const points = await mainPoints(
    scope,
    loops.map((loop) => loop.id),
  );
  const pointIds = [...points.values()].map((point) => point.id);
  const range = rangeOfDates(dates.from, dates.to, site.zone);
  // What has not happened yet is not missing.
  const soFar = { startMs: range.startMs, endMs: Math.min(range.endMs, nowMs) };
  const [bores, energies, readings, days, strips, fills] = await Promise.all([
    currentBores(scope, pointIds),
    energyOfPoints(database, scope, pointIds, dates),
    readingsOfPoints(database, scope, pointIds),
    loadDaysOf(database, pointIds, dates.from, dates.to),
    soFar.endMs - soFar.startMs > LONGEST_STRIP_MS
      ? new Map<string, QualitySegment[]>()
      : qualityStrips(database, pointIds, soFar),
    filledStretchesOf(database, pointIds, soFar),
  ]);
  const known = [...readings.values()];
  const evidence = await loadFigureEvidences(
    scope,
    loops.flatMap((loop) => {
      const point = points.get(loop.id);
      if (!point) return [];
      const row = readings.get(point.id);
      const ms = (value: string | number | null | undefined) =>
        value == null ? null : wholeNumber(value);
      const held = { firstMs: ms(row?.firstMs), lastMs: ms(row?.lastMs) };
      return [{ point, loop, site, nominalStepMs: row?.nominalStepMs ?? null, held }];
    }),
    range,
  );
  return {
    buildings,
    loops: loops.map((loop) => {
      const point = points.get(loop.id);
      const id = point?.id ?? "";
      return overviewOf(loop, point?.id ?? null, soFar, {
        bore: bores.get(id),
        energy: energies.get(id),
        readings: readings.get(id),
        strip: strips.get(id),
        filled: fills.get(id) ?? [],
        plusMinus: plusMinusFor(evidence.get(id), days.get(id)),
      });
    }),
    firstReadingMs: extreme(known, "firstMs", Math.min),
    lastReadingMs: extreme(known, "lastMs", Math.max),
  };
}

function extreme(
  rows: readonly ReadingsRow[],
  name: "firstMs" | "lastMs",
  pick: (...values: number[]) => number,
): number | null {
  const values = rows.flatMap((row) => (row[name] === null ? [] : [wholeNumber(row[name])]));
  return values.length === 0 ? null : pick(...values);
}

interface LoopRows {
  readonly bore: BoreVersion | undefined;
  readonly energy: EnergyRow | undefined;
  readonly readings: ReadingsRow | undefined;
  readonly strip: readonly QualitySegment[] | undefined;
  readonly filled: readonly FilledStretch[];
  readonly plusMinus: RangePlusMinus | null;
}

function plusMinusFor(
  evidence: FigureEvidence | undefined,
  days: readonly DayEnergy[] | undefined,
): RangePlusMinus | null {
  return evidence ? rangePlusMinus(evidence, days ?? []) : null;
}

/** Quarter-hours tell no rows and no reasons; a strip shows neither. */
const asRuns = (strip: readonly QualitySegment[]): QualityRun[] =>
  strip.map((segment) => ({ ...segment, rows: 0, reason: null }));

function overviewOf(
  loop: Loop,
  mainPointId: string | null,
  soFar: Interval,
  { bore, energy, readings, strip, filled, plusMinus }: LoopRows,
): OverviewLoop {
  const { id, tag, name, service, buildingId, parentLoopId } = loop;
  const covered = energy !== undefined && Number(energy.coveredS) > 0;
  // Where nothing is covered the energy is unknown, which is not zero.
  const counted = covered && readings?.blockedBy == null ? energy : null;
  const heatingKwh = counted && decimalNumber(counted.heatingKwh);
  const coolingKwh = counted && decimalNumber(counted.coolingKwh);
  const register = { chilled: "cooling", hot: "heating", changeover: null }[service];
  const volume = counted && register && Number(counted[`${register as "heating"}M3`]);
  const expectedS = (soFar.endMs - soFar.startMs) / 1000;
  // A loop whose fluid gives no energy has readings but no intervals: its coverage is not known here,
  // and not missing.
  const isJudged =
    readings !== undefined && readings.firstMs !== null && energyBlockedBy(loop) === null;
  return {
    loop: {
      id,
      tag,
      name,
      service,
      buildingId,
      parentLoopId,
      energyBlockedBy: energyBlockedBy(loop),
    },
    mainPointId,
    nominalSizeDn: bore ? (bore.dn ?? nearestNominalSizeDn(bore.outsideDiameterMm)) : null,
    energyKwh: { chilled: coolingKwh, hot: heatingKwh, changeover: null }[service],
    heatingKwh,
    coolingKwh,
    plusMinus: counted ? plusMinus : null,
    flowWeightedDeltaTK:
      counted && register && volume
        ? Number(counted[`${register as "heating"}FlowDt`]) / volume
        : null,
    coverage:
      isJudged && expectedS > 0 ? Math.min(1, Number(energy?.coveredS ?? 0) / expectedS) : null,
    filledShare:
      isJudged && expectedS > 0
        ? filled.reduce((sum, { filledS }) => sum + filledS, 0) / expectedS
        : null,
    quality: isJudged
      ? withFills(asRuns(strip ?? []), filled).map(({ startMs, endMs, kind }) => ({
          from: new Date(startMs).toISOString(),
          to: new Date(endMs).toISOString(),
          kind,
        }))
      : [],
  };
}

async function energyOfPoints(
  database: Database,
  scope: Scope,
  pointIds: readonly string[],
  { from, to }: { readonly from: string; readonly to: string },
): Promise<Map<string, EnergyRow>> {
  if (pointIds.length === 0) return new Map();
  const rows = await database.query<EnergyRow>(
    `SELECT point_id AS pointId,
       SUM(heating_kwh) AS heatingKwh, SUM(cooling_kwh) AS coolingKwh,
       SUM(heating_m3) AS heatingM3, SUM(cooling_m3) AS coolingM3,
       SUM(heating_flow_dt) AS heatingFlowDt, SUM(cooling_flow_dt) AS coolingFlowDt,
       SUM(covered_s) AS coveredS
     FROM day_energy
     WHERE organisation_id = :organisationId AND point_id IN (:pointIds)
       AND local_date >= :from AND local_date < :to
     GROUP BY point_id`,
    {
      replacements: { organisationId: scope.organisationId, pointIds, from, to },
      type: QueryTypes.SELECT,
    },
  );
  return new Map(rows.map((row) => [String(row.pointId), row]));
}

async function readingsOfPoints(
  database: Database,
  scope: Scope,
  pointIds: readonly string[],
): Promise<Map<string, ReadingsRow>> {
  if (pointIds.length === 0) return new Map();
  const rows = await database.query<ReadingsRow>(
    `SELECT point_id AS pointId, first_ms AS firstMs, last_ms AS lastMs, blocked_by AS blockedBy,
            nominal_step_ms AS nominalStepMs
     FROM point_readings
     WHERE organisation_id = :organisationId AND point_id IN (:pointIds)`,
    {
      replacements: { organisationId: scope.organisationId, pointIds },
      type: QueryTypes.SELECT,
    },
  );
  return new Map(rows.map((row) => [String(row.pointId), row]));
}
