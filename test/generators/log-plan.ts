import type {
  ColumnUnit,
  DateOrder,
  DecimalMark,
  Separator,
} from "@shared/domain/log-files/recipe";
import type { ByteStyle, ClockStyle, DateStyle } from "./log-text";
import type { Random } from "./random";

const MINUTE = 60_000;

export interface ChannelPlan {
  readonly meaning:
    | "flow"
    | "velocity"
    | "pulses"
    | "power"
    | "supply"
    | "return"
    | "signal"
    | "outdoor"
    | "electricPower"
    | "pressure"
    | "status";
  readonly names: readonly string[];
  readonly unit: ColumnUnit | null;
  readonly unitNames: readonly string[];
  readonly decimals: number;
  readonly low: number;
  readonly high: number;
}

const FLOW_UNITS: readonly { unit: ColumnUnit; names: readonly string[]; scale: number }[] = [
  { unit: "m3/h", names: ["m³/h", "m3/h", "m³/hr"], scale: 1 },
  { unit: "L/s", names: ["L/s", "l/s", "lps"], scale: 0.28 },
  { unit: "L/min", names: ["l/min", "LPM", "L/min"], scale: 16.7 },
  { unit: "US gpm", names: ["gpm", "GPM", "US gpm"], scale: 4.4 },
  { unit: "L/h", names: ["l/h", "L/h", "lph"], scale: 1000 },
];
const VELOCITY_UNITS = [
  { unit: "m/s", names: ["m/s", "m/sec"], high: 2.5 },
  { unit: "ft/s", names: ["ft/s", "fps"], high: 8 },
] as const;
const POWER_UNITS = [
  { unit: "kW", names: ["kW", "kWth"], high: 900 },
  { unit: "MW", names: ["MW"], high: 3 },
  { unit: "MBH", names: ["MBH", "kBtu/h"], high: 3000 },
  { unit: "ton", names: ["tons"], high: 250 },
] as const;
const TEMPERATURE_UNITS: readonly {
  unit: ColumnUnit;
  names: readonly string[];
  low: number;
  high: number;
}[] = [
  { unit: "degC", names: ["°C", "degC", "Celsius"], low: 5, high: 18 },
  { unit: "degF", names: ["°F", "degF"], low: 42, high: 65 },
  { unit: "K", names: ["K", "Kelvin"], low: 278, high: 292 },
];
export const ORDER_OF: Readonly<Record<DateStyle, DateOrder>> = {
  dmy: "dayMonthYear",
  dmyShort: "dayMonthYear",
  dmyLoose: "dayMonthYear",
  monthEnglish: "dayMonthYear",
  monthGerman: "dayMonthYear",
  mdy: "monthDayYear",
  mdyShort: "monthDayYear",
  mdyLoose: "monthDayYear",
  monthFirst: "monthDayYear",
  ymd: "yearMonthDay",
  ymdShort: "yearMonthDay",
  compact: "yearMonthDay",
};

/** Whether the dates of the log stand before its readings or behind the first of them. */
export function planTimePlace(random: Random, channels: readonly ChannelPlan[]): number {
  return random.chance(0.15) ? Math.min(1, channels.length) : 0;
}

export type TimeStyle =
  | "calendar"
  | "split"
  | "epochSeconds"
  | "epochMilliseconds"
  | "spreadsheetDays"
  | "offset"
  | "zulu";

export function pickGroup(
  random: Random,
  separator: Separator,
  quoted: boolean,
  mark: DecimalMark,
  bytesAs: ByteStyle,
): string {
  if (random.chance(0.5)) return "";
  const options = ["'", "\u00a0"];
  if (bytesAs !== "windows-1252") options.push("\u202f");
  if (separator !== " ") options.push(" ");
  const other = mark === "." ? "," : ".";
  if (other !== separator || quoted) options.push(other);
  return random.pick(options);
}

export function pickClock(random: Random, stepMs: number, separator: Separator): ClockStyle {
  const styles: ClockStyle[] = ["seconds", "fraction"];
  if (stepMs % MINUTE === 0) styles.push("minutes", "minutes");
  if (separator !== " ") styles.push("halfDay");
  return random.pick(styles);
}

export function pickDate(random: Random, separator: Separator): DateStyle {
  const styles: DateStyle[] = [
    "dmy",
    "dmy",
    "mdy",
    "ymd",
    "ymd",
    "dmyShort",
    "mdyShort",
    "ymdShort",
    "dmyLoose",
    "mdyLoose",
    "monthEnglish",
    "compact",
  ];
  if (separator !== " ") styles.push("monthGerman", "monthFirst");
  return random.pick(styles);
}

/** Words of a status column, the bad ones last. */
export const STATUS_WORDS = ["OK", "Good", "E07", "LOW"] as const;
export const BAD_WORDS: readonly string[] = ["E07", "LOW"];

/** What says how much moved: a rate, a speed, pulses, or a meter's power. */
function planMovement(random: Random, withUnits: boolean): ChannelPlan {
  const flow = random.pick(FLOW_UNITS);
  const rate: ChannelPlan = {
    meaning: "flow",
    names: ["Flow", "Flow rate", "Durchfluss", "Volumenstrom", "Débit"],
    unit: flow.unit,
    unitNames: flow.names,
    decimals: random.whole(0, 3),
    low: 0,
    high: random.pick([40, 400, 4000]) * flow.scale,
  };
  const kind = random.pick(["flow", "flow", "flow", "velocity", "pulses", "power"] as const);
  if (kind === "velocity") {
    const speed = random.pick(VELOCITY_UNITS);
    return {
      meaning: "velocity",
      names: ["Velocity", "Geschwindigkeit", "Vitesse"],
      unit: speed.unit,
      unitNames: speed.names,
      decimals: random.whole(2, 3),
      low: 0,
      high: speed.high,
    };
  }
  if (kind === "pulses")
    return {
      meaning: "pulses",
      names: ["Pulses", "Impulse", "Impulsions"],
      unit: random.pick(["L", "m3", "US gal"] as const),
      unitNames: ["imp", "pulses"],
      decimals: 0,
      low: 0,
      high: 400,
    };
  if (kind === "power" && withUnits) {
    const power = random.pick(POWER_UNITS);
    return {
      meaning: "power",
      names: ["Heat power", "Wärmeleistung", "Puissance"],
      unit: power.unit,
      unitNames: power.names,
      decimals: random.whole(1, 3),
      low: 0,
      high: power.high,
    };
  }
  return rate;
}

/** Companions, which only a file that writes units has, and a status. */
function planBeside(random: Random, withUnits: boolean): readonly ChannelPlan[] {
  const beside: readonly ChannelPlan[] = [
    {
      meaning: "outdoor",
      names: ["Outdoor temp", "Außentemperatur", "Temp extérieure"],
      unit: random.pick(["degC", "degF"] as const),
      unitNames: [],
      decimals: 1,
      low: -8,
      high: 31,
    },
    {
      meaning: "electricPower",
      names: ["Pump power", "Pumpe Leistung", "Puissance pompe"],
      unit: "kW",
      unitNames: ["kW"],
      decimals: 2,
      low: 0,
      high: 7,
    },
    {
      meaning: "pressure",
      names: ["Pressure", "Druck", "Pression"],
      unit: "bar",
      unitNames: ["bar"],
      decimals: 2,
      low: 1,
      high: 4,
    },
  ];
  const named = beside.map((plan) =>
    plan.meaning === "outdoor"
      ? { ...plan, unitNames: plan.unit === "degC" ? ["°C", "degC"] : ["°F", "degF"] }
      : plan,
  );
  const status: ChannelPlan = {
    meaning: "status",
    names: ["Status", "Zustand", "Etat"],
    unit: null,
    unitNames: ["-"],
    decimals: 0,
    low: 0,
    high: 0,
  };
  return [
    ...(withUnits ? named.filter(() => random.chance(0.12)) : []),
    ...(random.chance(0.15) ? [status] : []),
  ];
}

export function planChannels(random: Random, withUnits: boolean): readonly ChannelPlan[] {
  const temperature = random.pick(TEMPERATURE_UNITS);
  const decimals = random.whole(1, 3);
  const all: ChannelPlan[] = [
    planMovement(random, withUnits),
    {
      meaning: "supply",
      names: ["Supply", "Vorlauf", "Départ", "T supply"],
      unit: temperature.unit,
      unitNames: temperature.names,
      decimals,
      low: temperature.low,
      high: temperature.high,
    },
    {
      meaning: "return",
      names: ["Return", "Rücklauf", "Retour", "T return"],
      unit: temperature.unit,
      unitNames: temperature.names,
      decimals,
      low: temperature.low,
      high: temperature.high,
    },
    {
      meaning: "signal",
      names: ["Signal", "Sig", "Signalstärke"],
      unit: "%",
      unitNames: ["%"],
      decimals: 0,
      low: 60,
      high: 99,
    },
  ];
  const used = random.pick([
    all,
    all.slice(0, 3),
    all.slice(0, 1),
    all.slice(1, 3),
    all.slice(0, 3),
  ]);
  const columns = [...used, ...planBeside(random, withUnits)];
  return random.chance(0.3) ? columns.reverse() : columns;
}

export function makeSeries(
  random: Random,
  { low, high, decimals }: ChannelPlan,
  rows: number,
): number[] {
  const scale = 10 ** decimals;
  let level = low + (high - low) * random.next();
  return Array.from({ length: rows }, () => {
    level = Math.min(high, Math.max(low, level + (random.next() - 0.5) * (high - low) * 0.1));
    return Math.round(level * scale);
  });
}

export function writeHeader(
  random: Random,
  channels: readonly ChannelPlan[],
  timeStyle: TimeStyle,
  timeCells: number,
  withUnits: "header" | "row" | "none",
  separator: Separator,
): { names: string[]; units: string[] } {
  const language = random.whole(0, 2);
  const plain = (text: string): string => (separator === " " ? text.replaceAll(" ", "_") : text);
  const single =
    timeStyle === "spreadsheetDays"
      ? ["Date/time", "Zeitstempel", "Horodatage"]
      : ["Timestamp", "Datum/Zeit", "Date heure"];
  const names =
    timeCells === 2
      ? [
          ["Date", "Datum", "Date"][language] as string,
          ["Time", "Uhrzeit", "Heure"][language] as string,
        ]
      : [plain(single[language] as string)];
  const units = timeCells === 2 ? ["", ""] : [""];
  // All temperatures of a file are in one unit; each spells it as the first does.
  for (const channel of channels) {
    const name = plain(channel.names[Math.min(language, channel.names.length - 1)] as string);
    const unit = channel.unitNames[random.whole(0, channel.unitNames.length - 1)] as string;
    const [open, close] = random.pick([
      ["[", "]"],
      ["(", ")"],
    ] as const);
    const hasUnit = withUnits === "header" && channel.unit !== null;
    names.push(hasUnit ? plain(`${name} ${open}${unit}${close}`) : name);
    units.push(plain(unit));
  }
  if (separator === " ") units.forEach((unit, i) => (units[i] = unit === "" ? "-" : unit));
  return { names, units };
}

/** @param zone what a line names as the logger's time zone; null for none */
export function writePreamble(
  random: Random,
  separator: Separator,
  zone: string | null = null,
): readonly string[] {
  const lines = [
    `Logger${separator}HCW-7`,
    `Serial:${separator === "," ? " " : separator}50417`,
    `Period${separator}60 s`,
    "# written by the flow logger",
    "",
  ];
  const shown = lines.slice(0, random.pick([0, 0, 2, 3, 5]));
  return zone === null
    ? shown
    : [`Time zone:${separator === "," ? " " : separator}${zone}`, ...shown];
}
