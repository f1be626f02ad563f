import type {
  ComparedSide,
  ComparisonCaution,
  MeterComparisonInput,
  MeterComparisonResult,
  MeterSide,
} from "@shared/contracts/meter-comparisons";
import { DAY_MS, HOUR_MS } from "@shared/domain/time/interval";
import { compareMeters, type UndecidedReason } from "@shared/domain/uncertainty/compare-meters";
import type { Database } from "@server/database/connect";
import type { Scope } from "@server/database/scoped";
import { Invalid } from "@server/http/errors";
import type { Site } from "@server/models/site";
import { expectedSeconds, type EnergyRange } from "@server/queries/energy/energy-range";
import { energyRows, type EnergyRow } from "@server/queries/energy/energy-rows";
import { agreementByBands, commonRows, flowOf, movesEnough } from "./common-time";
import { comparisonRange } from "./comparison-range";
import { loadPointSide, pointSide, type LoadedPoint } from "./point-side";
import { sharesInstruments } from "./shared-instruments";
import { registerSide, typedSide } from "./typed-sides";
import { workOutStandIn } from "./work-out-stand-in";

interface Surroundings {
  readonly database: Database;
  readonly scope: Scope;
  readonly nowMs: number;
}

export interface WorkedOutComparison {
  readonly range: EnergyRange;
  readonly result: MeterComparisonResult;
}

/** Under this, missing time could hide any difference of the meters. */
const LEAST_COVERAGE = 0.95;
const GOOD_COVERAGE = 0.99;

/**
 * Two meters over one period: for saving and for trying alike. Two metering points are compared over
 * the quarter-hours both have; a metering point against anything else over all the time it has.
 * @throws Invalid (422) at the field that cannot be used; NotFound for another organisation's point.
 */
export async function workOutComparison(
  surroundings: Surroundings,
  site: Site,
  asked: MeterComparisonInput,
): Promise<WorkedOutComparison> {
  requireTwoMeters(asked);
  const range = comparisonRange(asked, site.zone);
  const sides = await sidesOf(surroundings, site, asked, range);
  const { first, second, byFlow, obstacles } = sides;
  const compared = compareMeters(first, second, obstacles);
  const standIn = asked.standIn && workOutStandIn(asked.standIn);
  return {
    range,
    result: {
      hours: (range.endMs - range.startMs) / HOUR_MS,
      first,
      second,
      ...compared,
      because: [...compared.because],
      byFlow,
      standIn,
      cautions: cautionsOf(
        asked,
        range,
        sides,
        compared.volume === null || compared.deltaT === null,
      ),
    },
  };
}

interface Sides {
  readonly first: ComparedSide;
  readonly second: ComparedSide;
  readonly byFlow: MeterComparisonResult["byFlow"];
  readonly obstacles: readonly UndecidedReason[];
  /** Known to hold; null where no flow of ours says so. */
  readonly oneLoadOnly: boolean;
  readonly commonShare: number | null;
  readonly recalculating: boolean;
}

function requireTwoMeters({ first, second }: MeterComparisonInput): void {
  if (first.kind !== "point" || second.kind !== "point") return;
  if (first.pointId === second.pointId)
    throw Invalid.field("second/pointId", "choose-another", "Choose the other metering point.");
  if (first.register !== second.register)
    throw Invalid.field(
      "second/register",
      "other-register",
      "Heating is compared with heating, cooling with cooling.",
    );
}

async function sidesOf(
  surroundings: Surroundings,
  site: Site,
  { first, second }: MeterComparisonInput,
  range: EnergyRange,
): Promise<Sides> {
  const { database, nowMs } = surroundings;
  const load = (side: MeterSide, at: "first" | "second") =>
    side.kind === "point" ? loadPointSide(surroundings, site.id, side, at, range) : null;
  const [one, other] = await Promise.all([load(first, "first"), load(second, "second")]);
  const expectedS = expectedSeconds(range, nowMs);
  const quarterHours = (loaded: LoadedPoint | null) =>
    loaded && energyRows(database, placeOf(loaded), { ...range, dates: null }, "quarterHour");
  const [oneFine, otherFine] = await Promise.all([quarterHours(one), quarterHours(other)]);
  const recalculating = [one, other].some((loaded) => loaded?.energyPoint.readings.recalculating);
  if (one && other && oneFine && otherFine) {
    const common = commonRows(oneFine, otherFine);
    return {
      first: pointSide(
        one,
        common.map((row) => row.first),
        expectedS,
        "first",
      ),
      second: pointSide(
        other,
        common.map((row) => row.second),
        expectedS,
        "second",
      ),
      byFlow: agreementByBands(common, one, other),
      obstacles: sharesInstruments(one, other, range) ? ["sharedInstruments"] : [],
      oneLoadOnly: isOneLoad(common.map((row) => row.second)),
      commonShare: expectedS > 0 ? Math.min(1, (common.length * 900) / expectedS) : 0,
      recalculating,
    };
  }
  // Whole days are summed from days, as on the loop's page: the ± is then the same too.
  const summed = (loaded: LoadedPoint | null, fine: EnergyRow[] | null) =>
    loaded && range.dates ? energyRows(database, placeOf(loaded), range, "day") : fine;
  const [oneRows, otherRows] = await Promise.all([summed(one, oneFine), summed(other, otherFine)]);
  const present = (
    side: MeterSide,
    at: "first" | "second",
    loaded: LoadedPoint | null,
    rows: readonly EnergyRow[] | null,
  ): ComparedSide => {
    if (loaded && rows) return pointSide(loaded, rows, expectedS, at);
    if (side.kind === "register") return registerSide(side, at);
    if (side.kind === "typed") return typedSide(side);
    throw new Error("a metering point was not loaded");
  };
  const shown = {
    first: present(first, "first", one, oneRows),
    second: present(second, "second", other, otherRows),
  };
  return {
    ...shown,
    byFlow: null,
    obstacles: leastCoverage(shown) < LEAST_COVERAGE ? ["coverageLow"] : [],
    oneLoadOnly: [oneFine, otherFine].some((rows) => rows !== null && isOneLoad(rows)),
    commonShare: null,
    recalculating,
  };
}

function placeOf({ energyPoint }: LoadedPoint): { pointId: string; zone: string } {
  return { pointId: energyPoint.point.id, zone: energyPoint.site.zone };
}

/** Whether flow is known and hardly moved; where it is not known nothing is said of it. */
function isOneLoad(rows: readonly EnergyRow[]): boolean {
  const flows = rows.map(flowOf).filter((flow) => flow !== null && flow > 0) as number[];
  return flows.length > 0 && !movesEnough(flows.sort((a, b) => a - b));
}

function leastCoverage({ first, second }: Pick<Sides, "first" | "second">): number {
  return Math.min(first.point?.coverage ?? 1, second.point?.coverage ?? 1);
}

/** What a reader must know before using the comparison. */
function cautionsOf(
  asked: MeterComparisonInput,
  range: EnergyRange,
  sides: Sides,
  partsMissing: boolean,
): ComparisonCaution[] {
  const both = [asked.first, asked.second];
  const coverage = sides.commonShare === null ? leastCoverage(sides) : 1;
  const claims = both.flatMap((side) => ("claim" in side && side.claim ? [side.claim] : []));
  const classes = claims.flatMap((claim) => (claim.kind === "class" ? [claim] : []));
  const rolled = both.some(
    (side) =>
      side.kind === "register" && (side.energy.rolledOver || side.volume?.rolledOver === true),
  );
  const consent = asked.standIn && (asked.standIn.consentBy === null ? "missing" : "recorded");
  const cautions: readonly (readonly [ComparisonCaution, boolean])[] = [
    ["consentMissing", consent === "missing"],
    ["consentRecorded", consent === "recorded"],
    ["coverageBelow95", coverage < LEAST_COVERAGE],
    ["coverageBelow99", coverage >= LEAST_COVERAGE && coverage < GOOD_COVERAGE],
    ["commonTimeOnly", sides.commonShare !== null && sides.commonShare < 1],
    ["periodUnder24h", range.endMs - range.startMs < DAY_MS],
    ["oneLoadOnly", sides.oneLoadOnly],
    ["partsNotCompared", partsMissing],
    ["classAssumesWithinLimits", classes.length > 0],
    ["deltaTBelowMinimum", classes.some((one) => one.meanDeltaTK < one.deltaTMinK)],
    ["rolloverAsStated", rolled],
    ["defaultsOnly", [sides.first, sides.second].some((side) => side.point?.basis === "defaults")],
    ["recalculating", sides.recalculating],
    ["indicative", true],
  ];
  return cautions.flatMap(([code, holds]) => (holds ? [code] : []));
}
