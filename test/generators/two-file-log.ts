import {
  DEFAULT_REPAIR_CHOICES,
  type FlowUnit,
  type LoggerClock,
  type RepairChoices,
  type TemperatureUnit,
} from "@shared/domain/log-files/recipe";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import { clockText, dateText, encodeText, numberText, numberValue } from "./log-text";
import { Random } from "./random";

/** One loop logged by two loggers: flow every minute in US gpm, temperatures every five in °F, full of honest defects. */
export interface TwoFileLog {
  readonly flowFile: { readonly name: string; readonly bytes: Uint8Array };
  readonly temperatureFile: { readonly name: string; readonly bytes: Uint8Array };
  /** The readings that are in the files: UTC ms ascending, NaN where the logger wrote that it had none. */
  readonly flow: { readonly instantMs: Float64Array; readonly flowGpm: Float64Array };
  readonly temperature: {
    readonly instantMs: Float64Array;
    readonly supplyF: Float64Array;
    readonly returnF: Float64Array;
  };
  /** What a person answers in the wizard. */
  readonly choices: {
    readonly siteZone: string;
    readonly clock: LoggerClock;
    readonly flowUnit: FlowUnit;
    readonly temperatureUnit: TemperatureUnit;
    readonly repair: RepairChoices;
  };
  /** What the Checks step must count, by file. */
  readonly defects: {
    readonly flow: {
      readonly repeats: number;
      readonly moved: number;
      readonly sentinels: Readonly<Record<string, number>>;
    };
    readonly temperature: {
      readonly repeats: number;
      readonly moved: number;
      readonly sentinels: Readonly<Record<string, number>>;
    };
  };
}

const MINUTE = 60_000;
const DAY = 86_400_000;

/**
 * Writes the two files: semicolons, decimal commas, `dd.mm.yyyy`, a preamble, sentinels, repeats and moved rows.
 * The clock is the site's; 11 May 2026 is the first day, so three days or more prove the date order.
 */
export function writeTwoFileLog({
  seed,
  days,
}: {
  readonly seed: number;
  readonly days: number;
}): TwoFileLog {
  const random = new Random(seed);
  const siteZone = "Europe/London";
  const startMs = Date.UTC(2026, 4, 11) - zoneOffsets(siteZone).offsetAt(Date.UTC(2026, 4, 11));
  const load = (at: number): number => {
    const hour = ((at - startMs) % DAY) / 3_600_000;
    return 0.35 + 0.55 * Math.max(0, Math.sin(((hour - 6) / 14) * Math.PI));
  };
  const flowRows = makeRows(startMs, days * 24 * 60, MINUTE, (at) => [
    Math.round((300 * load(at) + 8 * random.next()) * 10),
  ]);
  const temperatureRows = makeRows(startMs, days * 24 * 12 + 1, 5 * MINUTE, (at) => {
    const supply = 43.6 + 0.8 * random.next();
    return [
      Math.round(supply * 100),
      Math.round((supply + 7 + 4 * load(at) + 0.3 * random.next()) * 100),
    ];
  });
  const flow = writeFile(random, flowRows, 1, siteZone, ["-9999", "OL"], {
    preamble: ["Gerät;Durchflusslogger", "Seriennummer;50417", "Intervall;60 s"],
    header: "Datum/Zeit;Durchfluss [gpm]",
  });
  const temperature = writeFile(random, temperatureRows, 2, siteZone, ["---", "#N/A"], {
    preamble: ["Gerät;Temperaturlogger", "Seriennummer;20933", ""],
    header: "Datum/Zeit;Vorlauf [°F];Rücklauf [°F]",
  });
  const column = (rows: readonly LogRow[], k: number, decimals: number): Float64Array =>
    Float64Array.from(rows, ({ scaled }) =>
      Number.isNaN(scaled[k]) ? NaN : numberValue(scaled[k] as number, decimals),
    );
  return {
    flowFile: { name: "flow-hcw.csv", bytes: flow.bytes },
    temperatureFile: { name: "temperatures-hcw.csv", bytes: temperature.bytes },
    flow: {
      instantMs: Float64Array.from(flowRows, ({ at }) => at),
      flowGpm: column(flowRows, 0, 1),
    },
    temperature: {
      instantMs: Float64Array.from(temperatureRows, ({ at }) => at),
      supplyF: column(temperatureRows, 0, 2),
      returnF: column(temperatureRows, 1, 2),
    },
    choices: {
      siteZone,
      clock: { kind: "site" },
      flowUnit: "US gpm",
      temperatureUnit: "degF",
      repair: {
        ...DEFAULT_REPAIR_CHOICES,
        conflictingRepeats: "keepFirst",
        weakSignal: "keep",
        overlap: "keepEarlier",
      },
    },
    defects: { flow: flow.defects, temperature: temperature.defects },
  };
}

interface LogRow {
  readonly at: number;
  /** Whole counts of the last decimal; blanked to NaN when a sentinel is written. */
  readonly scaled: number[];
}

function makeRows(
  startMs: number,
  count: number,
  stepMs: number,
  values: (at: number) => number[],
): LogRow[] {
  return Array.from({ length: count }, (_, i) => ({
    at: startMs + i * stepMs,
    scaled: values(startMs + i * stepMs),
  }));
}

function writeFile(
  random: Random,
  rows: readonly LogRow[],
  decimals: number,
  zone: string,
  tokens: readonly string[],
  head: { readonly preamble: readonly string[]; readonly header: string },
): { bytes: Uint8Array; defects: TwoFileLog["defects"]["flow"] } {
  const sentinels: Record<string, number> = {};
  const written = rows.map(({ at, scaled }) => {
    const local = zoneOffsets(zone).toLocal(at);
    const cells = scaled.map((value, k) => {
      if (!random.chance(0.001)) return numberText(value, decimals, { mark: ",", group: "" });
      const token = random.pick(tokens);
      sentinels[token] = (sentinels[token] ?? 0) + 1;
      scaled[k] = NaN;
      return token;
    });
    return [`${dateText(local, "dmy", ".")} ${clockText(local, "seconds", ".")}`, ...cells].join(
      ";",
    );
  });
  let moved = 0;
  let repeats = 0;
  const lines: string[] = [];
  for (let i = 0; i < written.length; i++) {
    lines.push(written[i] as string);
    if (i > 0 && random.chance(0.002)) {
      lines.push(written[i] as string);
      repeats++;
    } else if (i > 0 && random.chance(0.002)) {
      // A straggler: it stands behind the row that follows it in time.
      const straggler = lines.pop() as string;
      const next = written[++i];
      if (next !== undefined) {
        lines.push(next);
        moved++;
      }
      lines.push(straggler);
    }
  }
  const text = [...head.preamble, head.header, ...lines, ""].join("\r\n");
  return { bytes: encodeText(text, "utf-8"), defects: { repeats, moved, sentinels } };
}
