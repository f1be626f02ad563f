import { zoneOffsets, type ZoneOffsets } from "@shared/domain/time/zone-offsets";
import { DAY_MS, HOUR_MS, MINUTE_MS } from "@shared/domain/time/interval";
import { noise, seededRandom } from "./seeded-random";
import type { SiteWeather } from "./site-weather";

/** How an invented branch answers weather and working hours. */
interface BranchBehaviour {
  readonly nightKw: number;
  readonly occupiedKw: number;
  /** Per kelvin past the balance temperature: above it when cooling, below it when heating. */
  readonly perKelvinKw: number;
  readonly balanceC: number;
  /** Part of the weather load that stays at night. */
  readonly nightShare: number;
  readonly weekendShare: number;
  readonly supplyC: number;
  /** Flow at no load, and what each kilowatt adds: flow that never stops is what makes ΔT sag. */
  readonly flowAtRestM3PerHour: number;
  readonly flowPerKwM3PerHour: number;
}

const CHILLED = { balanceC: 8, nightShare: 0.12, weekendShare: 0.42, supplyC: 6.4 };
const HOT = { balanceC: 16, nightShare: 0.5, weekendShare: 0.55, supplyC: 65.8 };

const BRANCHES: Readonly<Record<string, BranchBehaviour>> = {
  "CHW-1A": {
    ...CHILLED,
    nightKw: 14,
    occupiedKw: 62,
    perKelvinKw: 5.2,
    flowAtRestM3PerHour: 2.4,
    flowPerKwM3PerHour: 0.127,
  },
  "CHW-1B": {
    ...CHILLED,
    nightKw: 23,
    occupiedKw: 128,
    perKelvinKw: 10,
    flowAtRestM3PerHour: 3.9,
    flowPerKwM3PerHour: 0.1258,
  },
  "CHW-1C": {
    ...CHILLED,
    nightKw: 7,
    occupiedKw: 22,
    perKelvinKw: 1.9,
    flowAtRestM3PerHour: 3.2,
    flowPerKwM3PerHour: 0.205,
  },
  "LTHW-2": {
    ...HOT,
    nightKw: 9,
    occupiedKw: 12,
    perKelvinKw: 8.2,
    flowAtRestM3PerHour: 0.7,
    flowPerKwM3PerHour: 0.059,
  },
  "LTHW-3": {
    ...HOT,
    nightKw: 7,
    occupiedKw: 10,
    perKelvinKw: 6.4,
    flowAtRestM3PerHour: 0.6,
    flowPerKwM3PerHour: 0.062,
  },
  "LTHW-4": {
    ...HOT,
    nightKw: 6,
    occupiedKw: 8,
    perKelvinKw: 5.4,
    flowAtRestM3PerHour: 0.55,
    flowPerKwM3PerHour: 0.066,
  },
  /** A cold store nobody put a meter on: it is in the chilled main and in no branch. */
  unmetered: {
    ...CHILLED,
    nightKw: 6.5,
    occupiedKw: 1.5,
    perKelvinKw: 0.25,
    weekendShare: 0.9,
    flowAtRestM3PerHour: 0.4,
    flowPerKwM3PerHour: 0.17,
  },
};

const FED_BY: Readonly<Record<string, readonly string[]>> = {
  "CHW-1": ["CHW-1A", "CHW-1B", "CHW-1C", "unmetered"],
  "LTHW-1": ["LTHW-2", "LTHW-3", "LTHW-4"],
};

/** kWh per m³ and kelvin, near enough to turn an invented load into a temperature. */
const HEAT_KWH_PER_M3K = { chilled: 1.165, hot: 1.146 };

export interface SimulatedRow {
  readonly flowM3PerHour: number;
  readonly supplyC: number;
  readonly returnC: number;
}

/** Flow and temperatures of every demo loop at any instant; the same instant always gives the same row. */
export class LoopSimulation {
  private readonly offsets: ZoneOffsets;
  private readonly phase: Readonly<Record<string, number>>;

  constructor(
    private readonly weather: SiteWeather,
    zone: string,
    seed: number,
  ) {
    this.offsets = zoneOffsets(zone);
    const random = seededRandom(seed);
    this.phase = Object.fromEntries(
      Object.keys(BRANCHES).map((tag) => [tag, random() * 2 * Math.PI]),
    );
  }

  row(tag: string, ms: number): SimulatedRow {
    const chilled = tag.startsWith("CHW") || tag === "unmetered";
    const heat = chilled ? HEAT_KWH_PER_M3K.chilled : HEAT_KWH_PER_M3K.hot;
    const parts = (FED_BY[tag] ?? [tag]).map((part) => this.branch(part, ms, chilled));
    const powerKw = parts.reduce((sum, part) => sum + part.powerKw, 0);
    const flowM3PerHour = parts.reduce((sum, part) => sum + part.flowM3PerHour, 0);
    const ripple = 0.07 * Math.sin((2 * Math.PI * ms) / (26 * MINUTE_MS) + tag.length);
    const ownSupplyC =
      (BRANCHES[tag]?.supplyC ?? (chilled ? 6.2 : 66.2)) + ripple * (chilled ? 1 : 4);
    const deltaTK = powerKw / (heat * flowM3PerHour);
    return {
      flowM3PerHour,
      supplyC: ownSupplyC,
      returnC: chilled ? ownSupplyC + deltaTK : ownSupplyC - deltaTK,
    };
  }

  private branch(tag: string, ms: number, chilled: boolean) {
    const behaviour = BRANCHES[tag];
    if (!behaviour) throw new RangeError(`the demo has no branch named ${tag}`);
    const outdoorC = this.weather.outdoorC(ms);
    const past = Math.max(
      0,
      chilled ? outdoorC - behaviour.balanceC : behaviour.balanceC - outdoorC,
    );
    const occupied = this.occupancy(ms, behaviour.weekendShare);
    const weatherShare = behaviour.nightShare + (1 - behaviour.nightShare) * occupied;
    const phase = this.phase[tag] ?? 0;
    const swing =
      1 +
      0.035 * Math.sin((2 * Math.PI * ms) / (97 * MINUTE_MS) + phase) +
      0.02 * Math.sin((2 * Math.PI * ms) / (41 * MINUTE_MS) + 2 * phase);
    const powerKw =
      swing *
      (behaviour.nightKw +
        behaviour.occupiedKw * occupied +
        behaviour.perKelvinKw * past * weatherShare);
    return {
      powerKw,
      flowM3PerHour: behaviour.flowAtRestM3PerHour + behaviour.flowPerKwM3PerHour * powerKw,
    };
  }

  /** 0 at night to 1 over working hours, rising from 06:30 and falling till 19:30 local time. */
  private occupancy(ms: number, weekendShare: number): number {
    const localMs = this.offsets.toLocal(ms);
    const hour = (localMs % DAY_MS) / HOUR_MS;
    const weekday = Math.floor(localMs / DAY_MS + 4) % 7;
    const day = weekday === 0 || weekday === 6 ? weekendShare : 1;
    const rise = 1 / (1 + Math.exp(-(hour - 7.4) * 3));
    const fall = 1 / (1 + Math.exp((hour - 18.6) * 2.4));
    return day * rise * fall * (0.9 + 0.1 * Math.cos((2 * Math.PI * (hour - 15)) / 12));
  }
}

/** What instruments add to a row: noise that averages out over a quarter of an hour. */
export function asLogged(row: SimulatedRow, random: () => number, spread: number): SimulatedRow {
  return {
    flowM3PerHour: row.flowM3PerHour * (1 + 0.006 * spread * noise(random)),
    supplyC: row.supplyC + 0.012 * spread * noise(random),
    returnC: row.returnC + 0.012 * spread * noise(random),
  };
}
