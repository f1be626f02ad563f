import type { LoopService } from "@shared/domain/energy/power";
import { flowAtVelocityM3PerHour } from "@shared/domain/pipes/bore";
import {
  RowQuality,
  type ReadingSegment,
  type SeriesKind,
} from "@shared/domain/readings/reading-columns";
import { DAY_MS, HOUR_MS, MINUTE_MS } from "@shared/domain/time/interval";
import { Random } from "./random";

/** A loop that does what loops do, logged by a kit that works. */
export interface CleanPlan {
  readonly seed: number;
  readonly rows: number;
  readonly stepMs: number;
  readonly service: Exclude<LoopService, "changeover">;
  readonly boreMm: number;
  readonly kind: SeriesKind;
  /** The pump never stands. */
  readonly runsAllNight: boolean;
}

export const CLEAN_PLAN: CleanPlan = {
  seed: 1,
  rows: 4 * 24 * 14,
  stepMs: 15 * MINUTE_MS,
  service: "cooling",
  boreMm: 102.26,
  kind: "instantaneous",
  runsAllNight: false,
};

const ROOM_C = 22;
const MONDAY_MS = Date.UTC(2025, 2, 3);

/**
 * Weekdays from 6 to 20 o'clock the pump runs and flow follows the load of the day and the weather,
 * both smooth; at night and at weekends it stands and both pipes drift to the room. Flow scatters by
 * 0.8 %, probes by 0.02 K; both are rounded to 0.01.
 */
export function cleanSeries(changes: Partial<CleanPlan> = {}): ReadingSegment {
  const plan = { ...CLEAN_PLAN, ...changes };
  const random = new Random(plan.seed);
  const phase = random.next() * 6;
  const designM3PerHour = flowAtVelocityM3PerHour(1.5, plan.boreMm);
  const [supplyDesignC, riseK] = plan.service === "cooling" ? [6.5, 5.5] : [68, -18];
  const instantMs = new Float64Array(plan.rows);
  const flowM3PerHour = new Float64Array(plan.rows);
  const supplyC = new Float64Array(plan.rows);
  const returnC = new Float64Array(plan.rows);
  let supply = ROOM_C;
  let returned = ROOM_C;
  const scatter = (size: number) => (random.next() + random.next() + random.next() - 1.5) * size;
  const hundredths = (value: number) => Math.round(value * 100) / 100;
  for (let row = 0; row < plan.rows; row++) {
    const ms = MONDAY_MS + row * plan.stepMs;
    const day = Math.floor((ms - MONDAY_MS) / DAY_MS);
    const hour = ((ms - MONDAY_MS) % DAY_MS) / HOUR_MS;
    const isWorking = day % 7 < 5 && hour >= 6 && hour < 20;
    const weather = 1 + 0.15 * Math.sin(((ms - MONDAY_MS) / DAY_MS) * 0.9 + phase);
    const load = weather * (isWorking ? 0.45 + 0.3 * Math.sin(((hour - 6) / 14) * Math.PI) : 0.3);
    const runs = isWorking || plan.runsAllNight;
    // Pipes drift within hours while nothing flows; water replaces what they hold within minutes.
    const share = 1 - Math.exp(-plan.stepMs / (runs ? 4 * MINUTE_MS : 4 * HOUR_MS));
    const deltaK = riseK * (0.9 + 0.1 * Math.sin(hour / 3.8 + phase));
    supply += ((runs ? supplyDesignC : ROOM_C) - supply) * share;
    returned += ((runs ? supplyDesignC + deltaK : ROOM_C) - returned) * share;
    instantMs[row] = ms;
    flowM3PerHour[row] = runs ? hundredths(designM3PerHour * load * (1 + scatter(0.016))) : 0;
    supplyC[row] = hundredths(supply + scatter(0.04));
    returnC[row] = hundredths(returned + scatter(0.04));
  }
  return {
    kind: plan.kind,
    nominalStepMs: plan.stepMs,
    columns: {
      instantMs,
      flowM3PerHour,
      supplyC,
      returnC,
      signalPercent: null,
      quality: new Uint8Array(plan.rows).fill(RowQuality.measured),
    },
  };
}

/** The series with one channel changed, value by value. */
export function withValues(
  segment: ReadingSegment,
  channel: "flowM3PerHour" | "supplyC" | "returnC",
  change: (value: number, row: number) => number,
): ReadingSegment {
  const values = segment.columns[channel]!.map(change);
  return { ...segment, columns: { ...segment.columns, [channel]: values } };
}

/** The series without some rows. */
export function withoutRows(
  segment: ReadingSegment,
  isGone: (row: number) => boolean,
): ReadingSegment {
  const { columns } = segment;
  const kept = Uint32Array.from(columns.instantMs.keys()).filter((row) => !isGone(row));
  const pick = (values: Float64Array | null) =>
    values && Float64Array.from(kept, (row) => values[row]!);
  return {
    ...segment,
    columns: {
      instantMs: pick(columns.instantMs)!,
      flowM3PerHour: pick(columns.flowM3PerHour),
      supplyC: pick(columns.supplyC),
      returnC: pick(columns.returnC),
      signalPercent: null,
      quality: Uint8Array.from(kept, (row) => columns.quality[row]!),
    },
  };
}

/** A series written out by hand, a quarter-hour a row from 3 March 2025, 0:00 UTC, unless told. */
export function shortSeries(
  channels: {
    readonly flow?: readonly number[];
    readonly supply?: readonly number[];
    readonly return?: readonly number[];
  },
  stepMs = 15 * MINUTE_MS,
  instants: readonly number[] | null = null,
): ReadingSegment {
  const rows = (channels.flow ?? channels.supply ?? channels.return ?? instants ?? []).length;
  const column = (values: readonly number[] | undefined) =>
    values ? Float64Array.from(values) : null;
  return {
    kind: "instantaneous",
    nominalStepMs: stepMs,
    columns: {
      instantMs: Float64Array.from(
        instants ?? Array.from({ length: rows }, (_, row) => MONDAY_MS + row * stepMs),
      ),
      flowM3PerHour: column(channels.flow),
      supplyC: column(channels.supply),
      returnC: column(channels.return),
      signalPercent: null,
      quality: new Uint8Array(rows).fill(RowQuality.measured),
    },
  };
}
