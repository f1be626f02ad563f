import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import type {
  ColumnMeaning,
  ColumnUnit,
  DateOrder,
  DecimalMark,
  LoggerClock,
  Separator,
} from "@shared/domain/log-files/recipe";
import { flowAtVelocityM3PerHour } from "@shared/domain/pipes/bore";
import { standardOffsetMs } from "@shared/domain/time/standard-offset";
import { M3_PER, M_PER_S_PER } from "@shared/domain/units/size-and-pressure";
import {
  BAD_WORDS,
  makeSeries,
  ORDER_OF,
  pickClock,
  pickDate,
  pickGroup,
  planChannels,
  planTimePlace,
  STATUS_WORDS,
  writeHeader,
  writePreamble,
  type ChannelPlan,
  type TimeStyle,
} from "./log-plan";
import {
  clockText,
  dateText,
  encodeText,
  numberText,
  numberValue,
  writtenMidnight,
  type ByteStyle,
} from "./log-text";
import { Random } from "./random";

export { writeTwoFileLog, type TwoFileLog } from "./two-file-log";

/** A written file, the series that is in it, and the answers to everything the file may not prove. */
export interface GeneratedLog {
  readonly seed: number;
  readonly bytes: Uint8Array;
  readonly text: string;
  readonly siteZone: string;
  /** UTC ms, strictly ascending, one a distinct reading. */
  readonly instantMs: readonly number[];
  /** By channel, in the file's unit; NaN where the logger had no reading. */
  readonly values: Readonly<Partial<Record<ColumnMeaning, readonly number[]>>>;
  readonly answers: {
    readonly clock: LoggerClock;
    readonly order: DateOrder;
    /** By column. */
    readonly meanings: readonly ColumnMeaning[];
    readonly units: readonly (ColumnUnit | null)[];
    readonly marks: readonly DecimalMark[];
    readonly pulseValue: number;
    readonly badWords: readonly string[];
  };
  readonly boreMm: number;
  readonly written: {
    readonly repeats: number;
    readonly moved: number;
    readonly sentinels: number;
    /** Rows with a bad status, each counted once. */
    readonly badStatus: number;
  };
}

const ZONES = [
  "Europe/Paris",
  "Europe/London",
  "America/New_York",
  "Asia/Tokyo",
  "Australia/Lord_Howe",
];
const STARTS = ["2025-10-25T20:00Z", "2026-03-28T21:00Z", "2025-11-02T03:00Z", "2026-04-04T12:00Z"];
const SENTINELS = [
  "-9999",
  "OL",
  "+OL",
  "---",
  "#N/A",
  "NaN",
  "null",
  "no data",
  "Err",
  "9.9E37",
  "-999.9",
  "",
];
const MINUTE = 60_000;

/** Writes a known series in a dialect that follows from the seed: what recognition and reading must get right. */
export function writeLogFile(seed: number): GeneratedLog {
  const random = new Random(seed);
  const siteZone = random.pick(ZONES);
  const separator = random.pick<Separator>([",", ",", ";", ";", "\t", "|", " "]);
  const quoted = separator !== " " && random.chance(0.25);
  const mark: DecimalMark = (separator === "," && !quoted) || random.chance(0.5) ? "." : ",";
  const bytesAs = random.pick<ByteStyle>([
    "utf-8",
    "utf-8",
    "utf-8 with mark",
    "utf-16le",
    "utf-16le with mark",
    "utf-16be",
    "utf-16be with mark",
    "windows-1252",
  ]);
  const group = pickGroup(random, separator, quoted, mark, bytesAs);
  const withUnits = random.pick(["header", "header", "row", "none"] as const);
  const channels = planChannels(random, withUnits !== "none");
  const timePlace = planTimePlace(random, channels);
  const boreMm = random.pick([50, 102.26, 202.74]);
  const pulseValue = random.pick([1, 2.5, 10, 100]);

  const timeStyle = random.pick<TimeStyle>([
    "calendar",
    "calendar",
    "calendar",
    "split",
    "split",
    "offset",
    "zulu",
    "epochSeconds",
    "epochMilliseconds",
    "spreadsheetDays",
  ]);
  const stepMs = random.pick([1000, 10_000, MINUTE, 5 * MINUTE, 15 * MINUTE, 60 * MINUTE]);
  const clockStyle = pickClock(random, stepMs, separator);
  const dateStyle = pickDate(random, separator);
  const dateSeparator = dateStyle.startsWith("ymd")
    ? random.pick(["-", "/"])
    : random.pick(["/", ".", "-"]);
  const clock: LoggerClock = random.pick<LoggerClock>([
    { kind: "site" },
    { kind: "site" },
    { kind: "utc" },
    { kind: "fixedOffset", offsetMinutes: random.pick([60, -300, 330]) },
    { kind: "siteStandard" },
  ]);
  const hasHour24 = clockStyle !== "halfDay" && random.chance(0.2);

  const rows = random.whole(12, 90);
  const start = random.chance(0.3)
    ? Date.parse(random.pick(STARTS))
    : Date.UTC(2024, random.whole(0, 23), random.whole(1, 28), random.whole(0, 23));
  const instantMs: number[] = [];
  for (
    let at = start;
    instantMs.length < rows;
    at += stepMs * (random.chance(0.01) ? random.whole(2, 40) : 1)
  )
    instantMs.push(at);

  const toLocal = (utc: number): number => {
    if (clock.kind === "fixedOffset") return utc + clock.offsetMinutes * MINUTE;
    if (clock.kind === "siteStandard") return utc + standardOffsetMs(siteZone, start);
    return clock.kind === "utc" ? utc : zoneOffsets(siteZone).toLocal(utc);
  };
  const writeTime = (utc: number): string[] => {
    const local = toLocal(utc);
    switch (timeStyle) {
      case "epochSeconds":
        return [String(utc / 1000)];
      case "epochMilliseconds":
        return [String(utc)];
      case "spreadsheetDays":
        return [(local / 86_400_000 + 25_569).toFixed(10).replace(".", mark)];
      case "zulu":
        return [`${dateText(utc, "ymd", "-")}T${clockText(utc, "fraction", ".")}Z`];
      case "offset": {
        const offset = zoneOffsets(siteZone).offsetAt(utc) / MINUTE;
        const sign = offset < 0 ? "-" : "+";
        const hhmm = `${String(Math.floor(Math.abs(offset) / 60)).padStart(2, "0")}:${String(Math.abs(offset) % 60).padStart(2, "0")}`;
        return [
          `${dateText(utc + offset * MINUTE, "ymd", "-")}T${clockText(utc + offset * MINUTE, "seconds", ".")}${sign}${hhmm}`,
        ];
      }
      default: {
        const { dateMs, is24 } = hasHour24
          ? writtenMidnight(local)
          : { dateMs: local, is24: false };
        const date = dateText(dateMs, dateStyle, dateSeparator);
        const time = clockText(local, clockStyle, ".").replace(/^00/, is24 ? "24" : "00");
        return timeStyle === "split" || separator === " " ? [date, time] : [`${date} ${time}`];
      }
    }
  };
  const timeCells = writeTime(start).length;
  const series = channels.map((channel) => makeSeries(random, channel, rows));
  // Every word stands in the file, so that a person is asked about each.
  const words = instantMs.map((_, row) => STATUS_WORDS[row] ?? random.pick(STATUS_WORDS));

  let sentinels = 0;
  const sentinelKinds = SENTINELS.filter(
    (token) => separator !== " " || (token !== "" && !token.includes(" ")),
  );
  const usedSentinels = [random.pick(sentinelKinds), random.pick(sentinelKinds)];
  const cells = instantMs.map((utc, row) => {
    const values = channels.map((channel, k) => {
      if (channel.meaning === "status") return words[row] as string;
      const scaled = (series[k] as number[])[row] as number;
      if (!random.chance(0.015)) return numberText(scaled, channel.decimals, { mark, group });
      sentinels++;
      (series[k] as number[])[row] = NaN;
      return random.pick(usedSentinels);
    });
    return [...values.slice(0, timePlace), ...writeTime(utc), ...values.slice(timePlace)];
  });

  const stamp = (row: number): string =>
    (cells[row] as string[]).slice(timePlace, timePlace + timeCells).join(" ");
  const order = cells.map((_, i) => i);
  let moved = 0;
  let repeats = 0;
  if (random.chance(0.4)) {
    for (let i = 2; i + 2 < order.length; i++) {
      // Equal labels of a repeated hour can only be told apart by their order.
      const sameLabel = stamp(order[i] as number) === stamp(order[i + 1] as number);
      if (!random.chance(0.03) || sameLabel) continue;
      [order[i], order[i + 1]] = [order[i + 1] as number, order[i] as number];
      moved++;
      i++;
    }
  }
  if (random.chance(0.4)) {
    for (let i = order.length - 1; i > 0; i--) {
      if (!random.chance(0.03)) continue;
      order.splice(i, 0, order[i] as number);
      repeats++;
    }
  }

  const plain = writeHeader(random, channels, timeStyle, timeCells, withUnits, separator);
  const header = {
    names: timeBehind(plain.names, timeCells, timePlace),
    units: timeBehind(plain.units, timeCells, timePlace),
  };
  const isLocal = timeStyle === "calendar" || timeStyle === "split";
  const namesZone = isLocal && separator !== " " && random.chance(0.15);
  const zone =
    clock.kind === "utc"
      ? "UTC"
      : clock.kind === "fixedOffset"
        ? offsetText(clock.offsetMinutes)
        : null;
  const lines: string[] = [...writePreamble(random, separator, namesZone ? zone : null)];
  const join = (row: readonly string[], all: boolean): string =>
    row.map((cell) => quoteCell(cell, separator, all && quoted, quoted)).join(separator);
  lines.push(join(header.names, true));
  if (withUnits === "row") lines.push(join(header.units, true));
  for (const i of order) lines.push(join(cells[i] as string[], true));
  if (random.chance(0.2)) lines.push("End of log");
  const lineEnd = random.pick(["\n", "\r\n", "\r\n", "\r"]);
  const text = lines.join(lineEnd) + (random.chance(0.9) ? lineEnd : "");

  const isSplit = timeCells === 2;
  return {
    seed,
    bytes: encodeText(text, bytesAs),
    text,
    siteZone,
    instantMs,
    values: Object.fromEntries(
      channels
        .filter(({ meaning }) => meaning !== "status")
        .map((channel) => {
          const written = (series[channels.indexOf(channel)] as number[]).map((v) =>
            Number.isNaN(v) ? NaN : numberValue(v, channel.decimals),
          );
          return readAs(channel, written, { instantMs, stepMs, boreMm, pulseValue });
        }),
    ),
    boreMm,
    answers: {
      clock:
        timeStyle === "spreadsheetDays" || timeStyle === "calendar" || timeStyle === "split"
          ? clock
          : { kind: "utc" },
      order: ORDER_OF[dateStyle],
      meanings: timeBehind<ColumnMeaning>(
        [
          ...(isSplit ? (["date", "timeOfDay"] as const) : (["time"] as const)),
          ...channels.map(({ meaning }) => meaning),
        ],
        timeCells,
        timePlace,
      ),
      units: timeBehind<ColumnUnit | null>(
        [...(isSplit ? [null, null] : [null]), ...channels.map(({ unit }) => unit)],
        timeCells,
        timePlace,
      ),
      marks: [...(isSplit ? [mark, mark] : [mark]), ...channels.map(() => mark)],
      pulseValue,
      badWords: BAD_WORDS,
    },
    written: {
      repeats,
      moved,
      sentinels,
      badStatus: channels.some(({ meaning }) => meaning === "status")
        ? words.filter((word) => BAD_WORDS.includes(word)).length
        : 0,
    },
  };
}

/** The times of a row moved behind its first readings. */
function timeBehind<T>(row: readonly T[], timeCells: number, place: number): T[] {
  const times = row.slice(0, timeCells);
  const others = row.slice(timeCells);
  return [...others.slice(0, place), ...times, ...others.slice(place)];
}

function offsetText(minutes: number): string {
  const size = Math.abs(minutes);
  const two = (n: number) => String(n).padStart(2, "0");
  return `UTC${minutes < 0 ? "-" : "+"}${two(Math.floor(size / 60))}:${two(size % 60)}`;
}

/** What an import makes of a channel: speed and pulses become flow, everything else stays as written. */
function readAs(
  { meaning, unit }: ChannelPlan,
  written: readonly number[],
  of: {
    readonly instantMs: readonly number[];
    readonly stepMs: number;
    readonly boreMm: number;
    readonly pulseValue: number;
  },
): [ColumnMeaning, readonly number[]] {
  if (meaning === "velocity") {
    const factor = M_PER_S_PER[unit as "m/s" | "ft/s"];
    return ["flow", written.map((v) => flowAtVelocityM3PerHour(v * factor, of.boreMm))];
  }
  if (meaning !== "pulses") return [meaning, written];
  const m3 = M3_PER[unit as "L" | "m3" | "US gal"];
  const flow = written.map((count, i) => {
    const stepMs = (of.instantMs[i] as number) - (of.instantMs[i - 1] ?? NaN);
    // The first row, and one after a gap, speak for a time that nobody knows.
    return stepMs <= 1.5 * of.stepMs ? (count * of.pulseValue * m3) / (stepMs / 3_600_000) : NaN;
  });
  return ["flow", flow];
}

function quoteCell(cell: string, separator: Separator, always: boolean, allowed: boolean): string {
  const mustQuote = cell.includes(separator) || cell.includes('"');
  if (!always && !mustQuote) return cell;
  if (!allowed) throw new Error(`"${cell}" needs quotes in a dialect without them.`);
  return `"${cell.replaceAll('"', '""')}"`;
}
