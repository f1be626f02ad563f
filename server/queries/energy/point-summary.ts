import type { PointSummary } from "@shared/contracts/energy";
import { totalEnergy, waterSeconds } from "@shared/domain/energy/totals";
import { spansOverlap } from "@shared/domain/readings/corrections/correction-span";
import { localDateOf, localDaysBetween } from "@shared/domain/time/local-calendar";
import type { Database } from "@server/database/connect";
import { instantText } from "@server/database/conversions";
import type { Scope } from "@server/database/scoped";
import type { Actor } from "@server/policies/actor";
import { can } from "@server/policies/can";
import {
  presentBasis,
  presentLoad,
  presentTotals,
  rounded,
} from "@server/presenters/present-energy";
import { presentMeasuredBy } from "@server/presenters/present-measured-by";
import { loadFigureEvidence, type FigureEvidence } from "@server/queries/workings/figure-evidence";
import { plusMinusOf } from "@server/queries/workings/figure-uncertainty";
import { nightRows } from "@server/queries/workings/night-rows";
import {
  rangePlusMinus,
  rowPlusMinus,
  windowPlusMinus,
} from "@server/queries/workings/range-plus-minus";
import { loadIntervals } from "@server/readings/interval-rows";
import { spanOf, standingCorrections } from "@server/readings/point-corrections";
import { combineTotals } from "./combine-totals";
import type { EnergyPoint } from "./energy-point";
import { filledStretches, filledTotals } from "@server/readings/energy-fills";
import { expectedSeconds, type EnergyRange } from "./energy-range";
import { energyRows, type EnergyRow } from "./energy-rows";
import { withFills } from "./filled-runs";
import { leftOutRuns, loadQualityRuns, longest, measuredSeconds } from "./left-out";
import {
  busiestHalfHour,
  loadOf,
  loadPowerColumns,
  nightBase,
  nightHours,
  registerOf,
  type PowerColumns,
  type RegisterName,
} from "./loads";

const mostLeftOut = 50;

/** Everything the loop page says about a range of whole local days. */
export async function pointSummary(
  {
    database,
    scope,
    actor,
  }: { readonly database: Database; readonly scope: Scope; readonly actor: Actor },
  energyPoint: EnergyPoint,
  range: EnergyRange,
  nowMs: number,
): Promise<PointSummary> {
  const { point, loop, site, readings } = energyPoint;
  const { zone } = site;
  const [rows, columns, runs, filled, stretches, standing, evidence, nights] = await Promise.all([
    energyRows(database, { pointId: point.id, zone }, range, "day"),
    loadPowerColumns(database, point.id, range),
    loadQualityRuns(database, point.id, range, nowMs),
    filledTotals(database, point.id, range),
    filledStretches(database, point.id, range),
    standingCorrections(database, point.id),
    loadFigureEvidence(scope, energyPoint, range),
    nightRows(database, point.id, range, zone),
  ]);
  const basis = presentBasis(energyPoint);
  const summed = combineTotals(rows.map((row) => row.totals));
  // Without energy nothing is stored by the day; the readings still cover their time.
  const totals = basis.blockedBy ? { ...summed, coveredS: measuredSeconds(runs) } : summed;
  const register = registerOf(loop.service, totals);
  const registers = loop.service === "changeover" ? (["heating", "cooling"] as const) : [register];
  const busiest = await busiestLoad(database, evidence, columns, registers, rows);
  const night = nightBase(columns, zone, register, rows.length);
  // Rows due by the step of the log that was running, which may change within the range.
  const expectedRows = leftOutRuns(runs).reduce((sum, run) => sum + run.rows, totals.measuredRows);
  const leftOut = leftOutRuns(withFills(runs, stretches));
  const exclusions = standing.flatMap(({ change }) =>
    change.kind === "exclude" ? [spanOf(change)] : [],
  );
  return {
    zone,
    from: instantText(new Date(range.startMs)),
    to: instantText(new Date(range.endMs)),
    basis,
    totals: presentTotals(
      totals,
      expectedSeconds(range, nowMs),
      expectedRows,
      filled,
      summed.coveredS,
    ),
    plusMinus: rangePlusMinus(evidence, rows),
    days: presentDays(rows, range, evidence),
    ...busiest,
    nightBase: night && {
      ...nightHours,
      register,
      powerKw: rounded(night.powerKw, 4),
      coverage: rounded(night.coverage, 4),
      plusMinus: plusMinusOf(evidence, nights, { figure: "power", register }),
    },
    leftOut: longest(leftOut, mostLeftOut).map((run) => ({
      kind:
        run.kind === "missing" && run.reason !== "noRows"
          ? "noReading"
          : run.kind === "measured"
            ? "missing"
            : run.kind,
      from: instantText(new Date(run.startMs)),
      to: instantText(new Date(run.endMs)),
      rows: run.rows,
      reason:
        run.reason === "weakSignal" && exclusions.some((span) => spansOverlap(span, run))
          ? "correction"
          : (run.reason ?? "noRows"),
    })),
    leftOutCount: leftOut.length,
    can: { correct: can(actor).correctReadings && point.archivedAt === null },
    evidence: can(actor).seeEvidence
      ? {
          installations: evidence.installations.map((one) => presentMeasuredBy(one, range, zone)),
          can: { record: can(actor).editEvidence && point.archivedAt === null },
        }
      : null,
    firstReadingAt: at(readings.firstMs),
    lastReadingAt: at(readings.lastMs),
  };
}

const at = (ms: number | null) => (ms === null ? null : instantText(new Date(ms)));

async function busiestLoad(
  database: Database,
  evidence: FigureEvidence,
  columns: PowerColumns,
  registers: readonly RegisterName[],
  days: readonly EnergyRow[],
): Promise<Pick<PointSummary, "busiest" | "busiestDay">> {
  const { point, site } = evidence.background;
  const window = busiestHalfHour(columns, site.zone, registers);
  if (window === null) return { busiest: null, busiestDay: null };
  const [intervals, plusMinus] = await Promise.all([
    loadIntervals(database, point.id, window.startMs, window.endMs),
    windowPlusMinus(database, evidence, window),
  ]);
  const totals = totalEnergy(intervals, window);
  const load = loadOf(window, totals, window.register);
  const day = days.find((row) => row.startMs <= window.startMs && window.startMs < row.endMs);
  return {
    busiest: load && presentLoad(load, plusMinus),
    busiestDay: day
      ? {
          date: localDateOf(day.startMs, site.zone),
          energyKwh: rounded(day.totals[window.register].energyKwh, 4),
          plusMinus: rowPlusMinus(evidence, day)[window.register],
        }
      : null,
  };
}

function presentDays(
  rows: readonly EnergyRow[],
  range: EnergyRange,
  evidence: FigureEvidence,
): PointSummary["days"] {
  const { zone } = evidence;
  const dates = localDaysBetween(range, zone);
  return rows.map((row, index) => {
    const { startMs, endMs, totals } = row;
    const covered = (value: number) => (totals.coveredS > 0 ? rounded(value, 4) : null);
    return {
      date: dates[index]?.date ?? localDateOf(startMs, zone),
      heatingKwh: covered(totals.heating.energyKwh),
      coolingKwh: covered(totals.cooling.energyKwh),
      volumeM3: waterSeconds(totals) > 0 ? covered(totals.volumeM3) : null,
      coveredS: rounded(totals.coveredS, 3),
      lengthS: (endMs - startMs) / 1000,
      plusMinus: rowPlusMinus(evidence, row),
    };
  });
}
