import type { FlowBandAnswer, MeterComparisonResult } from "@shared/contracts/meter-comparisons";
import { INTERVAL_MS } from "@shared/domain/energy/interval-energy";
import { waterSeconds } from "@shared/domain/energy/totals";
import { agreementByFlow, meterLine } from "@shared/domain/uncertainty/agreement-by-flow";
import type { EnergyRow } from "@server/queries/energy/energy-rows";
import { energyOf, type LoadedPoint } from "./point-side";

/** A quarter-hour of two points. */
export interface CommonRow {
  readonly first: EnergyRow;
  readonly second: EnergyRow;
}

/** A quarter-hour counts with readings for all of it but a second. */
const FULL_S = INTERVAL_MS / 1000 - 1;
/** Bands of equal count: low, middle and high load. */
const BANDS = 3;
/** Below a day of quarter-hours a band would hold too little to judge. */
const LEAST_QUARTER_HOURS = 24;
/** Flow that moves by less than this between its tenth and ninetieth hundredth is one load. */
const LEAST_FLOW_SPAN = 1.2;

/** The quarter-hours in which both points have readings: the only ones that compare like with like. */
export function commonRows(first: readonly EnergyRow[], second: readonly EnergyRow[]): CommonRow[] {
  return first.flatMap((row, at) => {
    const other = second[at];
    const both = other && row.totals.coveredS >= FULL_S && other.totals.coveredS >= FULL_S;
    return both ? [{ first: row, second: other }] : [];
  });
}

interface Flowing extends CommonRow {
  readonly firstFlow: number;
  readonly secondFlow: number;
  /** Mean of both, so that neither meter's own error sorts the rows. */
  readonly flow: number;
}

/** Agreement by band of flow; null where flow is not known of both or hardly moved. */
export function agreementByBands(
  rows: readonly CommonRow[],
  first: LoadedPoint,
  second: LoadedPoint,
): MeterComparisonResult["byFlow"] {
  const flowing = rows.flatMap((row): Flowing[] => {
    const [firstFlow, secondFlow] = [flowOf(row.first), flowOf(row.second)];
    if (firstFlow === null || secondFlow === null) return [];
    const flow = (firstFlow + secondFlow) / 2;
    return flow > 0 ? [{ ...row, firstFlow, secondFlow, flow }] : [];
  });
  flowing.sort((a, b) => a.flow - b.flow);
  if (!movesEnough(flowing.map(({ flow }) => flow))) return null;
  const edges = Array.from({ length: BANDS }, (_, band) => atShare(flowing, band / BANDS).flow);
  const bands = edges.map((from, band) => {
    const to = edges[band + 1] ?? null;
    const within = flowing.filter(({ flow }) => flow >= from && (to === null || flow < to));
    return {
      fromM3PerHour: from,
      toM3PerHour: to,
      quarterHours: within.length,
      first: energyOf(
        first,
        within.map((row) => row.first),
      ).known,
      second: energyOf(
        second,
        within.map((row) => row.second),
      ).known,
    };
  });
  const whole = {
    first: energyOf(
      first,
      rows.map((row) => row.first),
    ).known,
    second: energyOf(
      second,
      rows.map((row) => row.second),
    ).known,
  };
  const found = agreementByFlow(whole, bands);
  return {
    quarterHours: rows.length,
    bands: bands.map((band, at): FlowBandAnswer => {
      const judged = found.bands[at];
      if (judged === undefined) throw new Error("a band of flow went missing");
      return { ...band, agreement: judged.agreement };
    }),
    compensating: found.compensating,
    line: meterLine(
      flowing.map(({ firstFlow, secondFlow }) => ({ first: firstFlow, second: secondFlow })),
    ),
  };
}

/** Whether flows, ascending, speak of more than one load. */
export function movesEnough(flows: readonly number[]): boolean {
  if (flows.length < LEAST_QUARTER_HOURS) return false;
  const [low, high] = [atShare(flows, 0.1), atShare(flows, 0.9)];
  return high >= LEAST_FLOW_SPAN * low;
}

function atShare<Value>(sorted: readonly Value[], share: number): Value {
  return sorted[Math.floor(share * sorted.length)] as Value;
}

/** Mean flow of a quarter-hour, m³/h; null where no water was measured. */
export function flowOf({ totals }: EnergyRow): number | null {
  const hours = waterSeconds(totals) / 3600;
  return hours > 0 ? totals.volumeM3 / hours : null;
}
