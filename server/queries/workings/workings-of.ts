import type { Workings, WorkingsFigure } from "@shared/contracts/workings";
import { DAY_MS, type Interval } from "@shared/domain/time/interval";
import type { Database } from "@server/database/connect";
import { instantText } from "@server/database/conversions";
import type { Scope } from "@server/database/scoped";
import { presentBasis, rounded } from "@server/presenters/present-energy";
import { combineTotals } from "@server/queries/energy/combine-totals";
import type { EnergyPoint } from "@server/queries/energy/energy-point";
import {
  expectedSeconds,
  requireQuarterHours,
  type EnergyRange,
} from "@server/queries/energy/energy-range";
import { energyRows, type EnergyRow } from "@server/queries/energy/energy-rows";
import { leftOutRuns, loadQualityRuns, measuredSeconds } from "@server/queries/energy/left-out";
import { registerOf, type RegisterName } from "@server/queries/energy/loads";
import { loadResults } from "@server/readings/energy-results";
import { byHand } from "./by-hand";
import { cautionsOf } from "./cautions";
import { correctionsBehind, fillsBehind, presentCorrections, presentFills } from "./changes-behind";
import { loadFigureEvidence } from "./figure-evidence";
import { figureUncertainty, presentPlusMinus } from "./figure-uncertainty";
import { filesBehind, type FileBehind } from "./files-behind";
import { formulasFrom } from "./formulas-from";
import { nightRows } from "./night-rows";
import { waterMeans } from "./water-means";
import { UNITS, uncertainFigureOf, valueOf } from "./worked-figure";
import { presentBudget } from "./workings-budget";
import { workingsInputs } from "./workings-inputs";
import { presentInstallations } from "./workings-installations";

export interface AskedWorkings {
  readonly figure: WorkingsFigure;
  /** Left out: the register of the loop's service. */
  readonly register?: RegisterName | undefined;
  readonly range: EnergyRange;
}

/** Quarter-hours are weighed for means up to here; beyond it days do. */
const longestInQuarterHours = 400 * DAY_MS;

/**
 * How a figure came about. Its value is the one the summary, the site page and the energy endpoint
 * give, from the same stored sums, and so is its ±.
 * @throws Invalid (422) where the range cuts a quarter-hour.
 */
export async function workingsOf(
  context: { readonly database: Database; readonly scope: Scope },
  energyPoint: EnergyPoint,
  asked: AskedWorkings,
  nowMs: number,
): Promise<Workings> {
  const { database, scope } = context;
  const { point, loop, site, settings, readings } = energyPoint;
  const { range, figure } = asked;
  if (range.dates === null) requireQuarterHours(range);
  const [rows, fine, evidence, runs, files, fills, results] = await Promise.all([
    rowsOf(database, energyPoint, asked),
    fineRows(database, energyPoint, asked),
    loadFigureEvidence(scope, energyPoint, range),
    loadQualityRuns(database, point.id, range, nowMs),
    filesBehind(database, scope.organisationId, point.id, range),
    fillsBehind(scope, point.id, range),
    loadResults(database, scope.organisationId, point.id, { most: 1 }),
  ]);
  const corrections = await correctionsBehind(
    context,
    point.id,
    range,
    files.map(({ id }) => id),
  );
  const totals = combineTotals(rows.map((row) => row.totals));
  const register = asked.register ?? registerOf(loop.service, totals);
  const leftOut = leftOutRuns(runs);
  const counted = {
    measured: totals.measuredRows,
    expected: leftOut.reduce((sum, run) => sum + run.rows, totals.measuredRows),
  };
  const basis = presentBasis(energyPoint);
  const expectedS = expectedSecondsOf(asked, rows, nowMs);
  // Without energy nothing is stored by the day; the readings still cover their time.
  const coveredS = basis.blockedBy === null ? totals.coveredS : measuredSeconds(runs);
  const coverage = expectedS > 0 ? Math.min(1, coveredS / expectedS) : null;
  const value =
    figure === "completeness" && basis.blockedBy !== null
      ? coverage && 100 * coverage
      : valueOf(figure, register, totals, counted);
  const means = waterMeans(fine, register);
  const uncertain = uncertainFigureOf(figure);
  const uncertainty =
    uncertain && figureUncertainty(evidence, rows, { figure: uncertain, register });
  const worked = uncertainty === null || typeof uncertainty === "string" ? null : uncertainty;
  const pencil = byHand(energyPoint, { figure, register, totals, means, value });
  const budget = worked && presentBudget(worked);
  const installations = presentInstallations(energyPoint, evidence, worked?.parts ?? [], {
    coverage,
    boreCorrected: corrections.some(({ kind }) => kind === "scaleByBore"),
  });
  const [result] = results;
  const runRows = (kind: (run: (typeof leftOut)[number]) => boolean) =>
    leftOut.reduce((sum, run) => (kind(run) ? sum + run.rows : sum), 0);
  return {
    figure,
    register,
    subject: {
      pointId: point.id,
      pointCode: point.code,
      loopId: loop.id,
      loopTag: loop.tag,
      loopName: loop.name,
      siteId: site.id,
      siteName: site.name,
      zone: site.zone,
      unitSystem: site.unitSystem,
      isDemo: site.isDemo,
    },
    from: instantText(new Date(range.startMs)),
    to: instantText(new Date(range.endMs)),
    value,
    unit: UNITS[figure],
    plusMinus: worked && presentPlusMinus(worked),
    formula: formulaOf(figure, files),
    meterSide: point.meterSide,
    byHand: pencil,
    inputs: workingsInputs(energyPoint, {
      figure,
      register,
      totals,
      means,
      files,
      parts: worked?.parts ?? [],
    }),
    budget,
    installations,
    rows: {
      measured: totals.measuredRows,
      filled: filledRows(fills, range, readings.nominalStepMs),
      excluded: totals.excludedRows,
      noReading: totals.noReadingRows,
      missing: runRows((run) => run.kind !== "excluded" && run.reason === "noRows"),
      expected: counted.expected,
    },
    coverage,
    corrections: presentCorrections(corrections),
    fills: presentFills(fills),
    files: files.map(({ id, name, sha256, rows: count }) => ({ id, name, sha256, rows: count })),
    basis: {
      engineVersion: readings.engineVersion,
      resultId: result?.id ?? null,
      revision: readings.revision,
      calculatedAt: result?.calculatedAt ?? null,
      pointVersion: result?.point.version ?? null,
      absoluteMPa: settings.pressure.pressureMPa,
      pressureAssumed: settings.pressure.assumed,
      fluid: basis.fluid,
      cutOffs: {
        flowM3PerHour: loop.flowCutOffM3PerHour,
        deltaTK: loop.deltaTCutOffK,
        suppressedKwh: rounded(totals.suppressedKwh, 6),
        suppressedS: rounded(totals.suppressedS, 3),
        separatesRegisters: loop.service === "changeover",
      },
      meansOnly: readings.meansOnly,
      recalculating: readings.recalculating,
    },
    formulasFrom: formulasFrom(figure, basis.fluid.kind, pencil, budget),
    cautions: cautionsOf(energyPoint, {
      figure,
      covered: totals.coveredS > 0,
      coverage,
      uncertainty,
      installations,
    }),
  };
}

/** The rows the figure is summed from: the very ones its summary uses. */
function rowsOf(
  database: Database,
  { point, site }: EnergyPoint,
  { figure, range }: AskedWorkings,
): Promise<EnergyRow[]> {
  if (figure === "nightBase") return nightRows(database, point.id, range, site.zone);
  const step = range.dates === null ? "quarterHour" : "day";
  return energyRows(database, { pointId: point.id, zone: site.zone }, range, step);
}

/** Shorter rows of the same time, to weigh temperatures by flow. */
function fineRows(
  database: Database,
  { point, site }: EnergyPoint,
  { figure, range }: AskedWorkings,
): Promise<EnergyRow[]> {
  if (figure === "nightBase") return nightRows(database, point.id, range, site.zone);
  const short = range.endMs - range.startMs <= longestInQuarterHours;
  const at = { pointId: point.id, zone: site.zone };
  return energyRows(database, at, range, short ? "quarterHour" : "day");
}

function expectedSecondsOf(
  { figure, range }: AskedWorkings,
  nights: readonly Interval[],
  nowMs: number,
): number {
  if (figure !== "nightBase") return expectedSeconds(range, nowMs);
  return nights.reduce((sum, night) => sum + expectedSeconds(night, nowMs), 0);
}

function formulaOf(figure: WorkingsFigure, files: readonly FileBehind[]): Workings["formula"] {
  switch (figure) {
    case "volume":
      return "sumOfFlow";
    case "deltaT":
      return "flowWeightedDeltaT";
    case "power":
    case "nightBase":
      return "meanOverWindow";
    case "completeness":
      return "coveredShare";
    case "energy":
      if (files.some(({ meters }) => meters === "counter")) return "counterDifference";
      if (files.some(({ meters }) => meters === "power")) return "sumOfPower";
      // Samples are summed as trapezoids between them, means over the step each speaks for.
      return files.some(({ kind }) => kind === "instantaneous") ? "trapezoid" : "sumOfSteps";
  }
}

/** Rows that fills stand for within the range, by the logger's step. */
function filledRows(
  fills: readonly {
    fromMs: number | string;
    toMs: number | string;
    filledS: number;
    state: string;
  }[],
  range: Interval,
  stepMs: number | null,
): number {
  if (stepMs === null) return 0;
  return fills.reduce((sum, fill) => {
    if (fill.state !== "approved") return sum;
    const [fromMs, toMs] = [Number(fill.fromMs), Number(fill.toMs)];
    const overlap = Math.min(toMs, range.endMs) - Math.max(fromMs, range.startMs);
    return sum + Math.round((fill.filledS * 1000 * overlap) / (toMs - fromMs) / stepMs);
  }, 0);
}
