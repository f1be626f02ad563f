import type { FileRecipe, FlowUnit, TemperatureUnit } from "@shared/domain/log-files/recipe";
import { addDays, startOfLocalDay } from "@shared/domain/time/local-calendar";
import { MINUTE_MS } from "@shared/domain/time/interval";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import { fromM3PerHour } from "@shared/domain/units/flow";
import { fromCelsius } from "@shared/domain/units/temperature";
import { asLogged, LoopSimulation, type SimulatedRow } from "./loop-simulation";
import { seededRandom } from "./seeded-random";
import { SiteWeather } from "./site-weather";

/** A logger file of the demo as bytes, with the answers a surveyor would give about it. */
export interface DemoLogFile {
  readonly tag: string;
  readonly name: string;
  readonly bytes: Uint8Array;
  readonly clock: NonNullable<FileRecipe["time"]["clock"]>;
  readonly seriesKind: FileRecipe["seriesKind"];
}

/** How one invented logger writes. */
interface Hand {
  readonly separator: "," | ";" | "\t";
  readonly decimalMark: "." | ",";
  readonly date: "dd/mm/yyyy" | "dd.mm.yyyy" | "yyyy-mm-dd";
  readonly clock: "site" | "utc";
  readonly flowUnit: FlowUnit;
  readonly temperatureUnit: TemperatureUnit;
}

const HANDS: Readonly<Record<string, Hand>> = {
  "CHW-1": {
    separator: ";",
    decimalMark: ",",
    date: "dd.mm.yyyy",
    clock: "site",
    flowUnit: "m3/h",
    temperatureUnit: "degC",
  },
  "LTHW-1": {
    separator: ";",
    decimalMark: ",",
    date: "dd.mm.yyyy",
    clock: "site",
    flowUnit: "m3/h",
    temperatureUnit: "degC",
  },
  "CHW-1A": {
    separator: ",",
    decimalMark: ".",
    date: "yyyy-mm-dd",
    clock: "utc",
    flowUnit: "L/s",
    temperatureUnit: "degC",
  },
  "CHW-1B": {
    separator: ",",
    decimalMark: ".",
    date: "dd/mm/yyyy",
    clock: "utc",
    flowUnit: "m3/h",
    temperatureUnit: "degC",
  },
  "CHW-1C": {
    separator: "\t",
    decimalMark: ".",
    date: "yyyy-mm-dd",
    clock: "site",
    flowUnit: "m3/h",
    temperatureUnit: "degC",
  },
  "LTHW-2": {
    separator: ",",
    decimalMark: ".",
    date: "dd/mm/yyyy",
    clock: "utc",
    flowUnit: "m3/h",
    temperatureUnit: "degC",
  },
  "LTHW-3": {
    separator: ";",
    decimalMark: ".",
    date: "yyyy-mm-dd",
    clock: "utc",
    flowUnit: "L/min",
    temperatureUnit: "degC",
  },
  "LTHW-4": {
    separator: ",",
    decimalMark: ".",
    date: "yyyy-mm-dd",
    clock: "utc",
    flowUnit: "US gpm",
    temperatureUnit: "degF",
  },
};

const FLOW_TEXT: Readonly<Record<FlowUnit, string>> = {
  "m3/h": "m3/h",
  "L/s": "L/s",
  "L/min": "L/min",
  "US gpm": "gpm",
  "L/h": "l/h",
};
const TEMPERATURE_TEXT: Readonly<Record<TemperatureUnit, string>> = {
  degC: "°C",
  degF: "°F",
  K: "K",
};

/** The two loops with a portable logger on them for the last four weeks. */
const MINUTE_LOOPS = ["CHW-1B", "LTHW-2"] as const;
const MINUTE_WEEKS = 4;

/** What went wrong on the invented site in its last whole week, by local day counted from that Monday. */
interface Fault {
  readonly day: number;
  readonly fromMinute: number;
  readonly minutes: number;
  readonly what: "noRows" | "weakSignal" | "noFlow";
}
const MINUTE_FAULTS: Readonly<Record<string, readonly Fault[]>> = {
  "CHW-1B": [
    { day: 2, fromMinute: 11 * 60 + 10, minutes: 55, what: "noRows" },
    { day: 3, fromMinute: 22 * 60 + 4, minutes: 37, what: "weakSignal" },
    { day: 5, fromMinute: 2 * 60 + 20, minutes: 51, what: "noRows" },
  ],
  "LTHW-2": [{ day: 6, fromMinute: 21 * 60 + 5, minutes: 22, what: "noRows" }],
};
const QUARTER_HOUR_FAULTS: Readonly<Record<string, readonly Fault[]>> = {
  "CHW-1A": [{ day: 1, fromMinute: 4 * 60, minutes: 75, what: "noRows" }],
  /** The signal of Net Loft is lost on Sunday morning and does not come back. */
  "CHW-1C": [{ day: 6, fromMinute: 9 * 60 + 15, minutes: 60 * 24 * 30, what: "noFlow" }],
};

/** Thirteen months: this year's month can be laid beside last year's. */
export const DEMO_HISTORY_DAYS = 395;

/**
 * All logger files of the demo, one after the other: `historyDays` of quarter-hour means on every
 * loop, the last four weeks of two loops in one-minute readings instead, and honest faults in the
 * last whole week. Each is written when it is asked for, because all of them take seconds.
 *
 * `endDate` is the local day (exclusive) at which the files stop; the same date and history give
 * the same bytes.
 */
export function* demoLogFiles(
  zone: string,
  endDate: string,
  tags: readonly string[],
  historyDays: number,
): Generator<DemoLogFile> {
  const endMs = startOfLocalDay(endDate, zone);
  const startMs = startOfLocalDay(addDays(endDate, -historyDays), zone);
  const minuteStartMs = startOfLocalDay(addDays(endDate, -7 * MINUTE_WEEKS), zone);
  const simulation = new LoopSimulation(new SiteWeather(startMs, endMs, 20), zone, 7);
  const faultWeek = lastMonday(endDate);

  for (const [index, tag] of tags.entries()) {
    const byMinute = MINUTE_LOOPS.some((loop) => loop === tag);
    const write = new LogWriter(tag, zone, faultWeek, simulation, seededRandom(100 + index));
    yield write.quarterHours(startMs, byMinute ? minuteStartMs : endMs);
    if (byMinute) yield write.minutes(minuteStartMs, endMs);
  }
}

/** Monday of the last whole week before a local day. */
function lastMonday(endDate: string): string {
  const weekday = (new Date(`${endDate}T00:00:00Z`).getUTCDay() + 6) % 7;
  return addDays(endDate, -weekday - 7);
}

class LogWriter {
  private readonly hand: Hand;

  constructor(
    private readonly tag: string,
    private readonly zone: string,
    private readonly faultWeek: string,
    private readonly simulation: LoopSimulation,
    private readonly random: () => number,
  ) {
    const hand = HANDS[tag];
    if (!hand) throw new RangeError(`the demo has no logger for ${tag}`);
    this.hand = hand;
  }

  quarterHours(fromMs: number, toMs: number): DemoLogFile {
    const { separator } = this.hand;
    const lines = [
      [
        "Time",
        `Flow [${FLOW_TEXT[this.hand.flowUnit]}]`,
        `Supply [${this.degree}]`,
        `Return [${this.degree}]`,
      ].join(separator),
    ];
    const faults = this.faultSpans(QUARTER_HOUR_FAULTS);
    for (let ms = fromMs; ms < toMs; ms += 15 * MINUTE_MS) {
      const fault = faults.find((span) => ms >= span.fromMs && ms < span.toMs);
      if (fault?.what === "noRows") continue;
      const mean = this.simulation.row(this.tag, ms + 7.5 * MINUTE_MS);
      const cells = this.values(asLogged(mean, this.random, 0.3));
      if (fault?.what === "noFlow") cells[0] = "---";
      lines.push([this.stamp(ms), ...cells].join(separator));
    }
    return this.file("15min", lines, "meanFromLabel");
  }

  minutes(fromMs: number, toMs: number): DemoLogFile {
    const { separator } = this.hand;
    const lines = [
      ["Unit", "Portable transit-time flow meter"].join(separator),
      ["Point", this.tag].join(separator),
      ["Period", "60 s"].join(separator),
      [
        "Date/time",
        `Flow ${FLOW_TEXT[this.hand.flowUnit]}`,
        `T1 supply ${this.degree}`,
        `T2 return ${this.degree}`,
        "Signal %",
      ].join(separator),
    ];
    const faults = this.faultSpans(MINUTE_FAULTS);
    for (let ms = fromMs; ms < toMs; ms += MINUTE_MS) {
      const fault = faults.find((span) => ms >= span.fromMs && ms < span.toMs);
      if (fault?.what === "noRows") continue;
      const cells = this.values(asLogged(this.simulation.row(this.tag, ms), this.random, 1));
      const weak = fault?.what === "weakSignal";
      if (weak) cells[0] = this.number(0, 2);
      const signal = weak
        ? 12 + Math.floor(this.random() * 20)
        : 68 + Math.floor(this.random() * 9);
      lines.push([this.stamp(ms), ...cells, String(signal)].join(separator));
    }
    return this.file("60s", lines, "instantaneous");
  }

  private get degree(): string {
    return TEMPERATURE_TEXT[this.hand.temperatureUnit];
  }

  private file(
    step: string,
    lines: readonly string[],
    seriesKind: DemoLogFile["seriesKind"],
  ): DemoLogFile {
    return {
      tag: this.tag,
      name: `${this.tag}_${step}.csv`,
      bytes: new TextEncoder().encode(`${lines.join("\r\n")}\r\n`),
      clock: { kind: this.hand.clock },
      seriesKind,
    };
  }

  private values(row: SimulatedRow): string[] {
    const { flowUnit, temperatureUnit } = this.hand;
    return [
      this.number(fromM3PerHour(row.flowM3PerHour, flowUnit), flowUnit === "L/s" ? 3 : 2),
      this.number(fromCelsius(row.supplyC, temperatureUnit), 2),
      this.number(fromCelsius(row.returnC, temperatureUnit), 2),
    ];
  }

  private number(value: number, decimals: number): string {
    return value.toFixed(decimals).replace(".", this.hand.decimalMark);
  }

  private stamp(ms: number): string {
    const shownMs = this.hand.clock === "utc" ? ms : zoneOffsets(this.zone).toLocal(ms);
    const [date = "", time = ""] = new Date(shownMs).toISOString().split("T");
    const [year, month, day] = date.split("-");
    const clock = time.slice(0, 5);
    switch (this.hand.date) {
      case "dd/mm/yyyy":
        return `${day}/${month}/${year} ${clock}`;
      case "dd.mm.yyyy":
        return `${day}.${month}.${year} ${clock}`;
      case "yyyy-mm-dd":
        return `${date} ${clock}`;
    }
  }

  private faultSpans(faults: Readonly<Record<string, readonly Fault[]>>) {
    return (faults[this.tag] ?? []).map((fault) => {
      const dayMs = startOfLocalDay(addDays(this.faultWeek, fault.day), this.zone);
      const fromMs = dayMs + fault.fromMinute * MINUTE_MS;
      return { what: fault.what, fromMs, toMs: fromMs + fault.minutes * MINUTE_MS };
    });
  }
}
