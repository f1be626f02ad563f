import { plainNumberText } from "./number-cell";

/** What lines above the header may say about the measurement, in words every trade uses. */
export type FactKind =
  /** Of whatever wrote the file. */
  | "serial"
  | "loggerSerial"
  | "meterSerial"
  | "supplyProbeSerial"
  | "returnProbeSerial"
  | "probeSerial"
  | "boreMm"
  | "outsideDiameterMm"
  | "wallMm"
  | "pipeMaterial"
  | "fluid"
  | "soundSpeedMPerS"
  | "intervalS"
  | "unitSetting"
  | "clock"
  | "siteName"
  | "pointName";

export interface PreambleFact {
  readonly kind: FactKind;
  /** 1-based line in the file. */
  readonly line: number;
  /** As written. */
  readonly label: string;
  readonly cell: string;
  /**
   * In the unit the kind names; null for what is no number, and for one that cannot be read for sure:
   * without its unit, or with a mark that may be a decimal mark or not.
   */
  readonly value: number | null;
}

export interface PreambleEntry {
  readonly line: number;
  readonly label: string;
  readonly value: string;
}

const MAX_LABEL = 60;
const MAX_CELL = 120;

const SERIAL =
  /(^| )(serial( ?(number|no|nr|num))?|s ?\/ ?n|sn|serien ?(nummer|nr|no)|geräte ?(nummer|nr)|fabrik ?(nummer|nr))( |$)/;
const SUPPLY = /(^| )(supply|vorlauf|vl)( |$)|vorlauf/;
const RETURN = /(^| )(return|rücklauf|rl)( |$)|rücklauf/;
const PROBE = /(^| )(probe|sensor|thermometer|fühler)|fühler/;
const OF_METER = /(^| )(flow ?meter|meter|heat ?meter)( |$)|zähler|durchflussmess/;
const OF_LOGGER = /(^| )(logger|data ?logger|recorder)( |$)|logger|schreiber/;
/** What holds neither water nor readings: its serial and sizes are not those of the pipe or the kit. */
const OF_SOMETHING_ELSE =
  /transducer|schallkopf|lining|auskleidung|insulation|dämmung|battery|batterie|cable|kabel|firmware/;

/** In order: the first that fits a label counts. */
const LABELS: readonly (readonly [FactKind, RegExp])[] = [
  [
    "boreMm",
    /(^| )(inside|inner|internal) (pipe )?(diameter|dia)( |$)|(^| )pipe (id|bore)( |$)|^(id|bore|pipe bore)( |$)|innen ?(durchmesser|ø)|^rohr ?innen|lichte weite|^di( |$)/,
  ],
  [
    "outsideDiameterMm",
    /(^| )(outside|outer|external) (pipe )?(diameter|dia)( |$)|(^| )pipe od( |$)|^od( |$)|(außen|aussen) ?(durchmesser|ø)|^da( |$)/,
  ],
  ["wallMm", /(^| )wall( thickness)?( |$)|wand ?(stärke|dicke)/],
  ["pipeMaterial", /^(pipe )?material( |$)|rohr ?(material|werkstoff)|^werkstoff( |$)/],
  ["soundSpeedMPerS", /sound (speed|velocity)|(speed|velocity) of sound|schallgeschwindigkeit/],
  ["fluid", /^(fluid|medium|liquid|flüssigkeit)( type| art)?$/],
  [
    "intervalS",
    /^((log(ging)?|sampl(e|ing)|record(ing)?|measur(ing|ement)|storage) )?(interval|period)( |$)|intervall|^takt( |$)/,
  ],
  ["unitSetting", /(^| )units?( |$)|einheit/],
  [
    "clock",
    /time ?zone|zeitzone|(utc|gmt) ?(offset)?$|(^| )dst( |$)|daylight saving|summer ?time|sommerzeit|winterzeit/,
  ],
  [
    "pointName",
    /^(measur(ing|ement)|metering) point( name)?$|^(point|tag|loop|circuit)( name)?$|mess ?(stelle|punkt)|^kreis$/,
  ],
  [
    "siteName",
    /^(site|location|building|plant)( name)?$|^(standort|anlage|objekt|liegenschaft|gebäude|ort)$/,
  ],
];

/**
 * Finds what the lines above the header say that belongs to the evidence of a point: serials, pipe,
 * fluid, settings, names. English and German label words; a label that is none of them says nothing.
 * Example: `Pipe inside diameter: 82.5 mm` is a bore of 82.5; without the unit its value is null.
 */
export function preambleFacts(preamble: readonly PreambleEntry[]): readonly PreambleFact[] {
  const facts: PreambleFact[] = [];
  for (const entry of preamble) {
    const cell = entry.value.trim().slice(0, MAX_CELL);
    if (cell === "" || entry.label.length > MAX_LABEL) continue;
    const label = plainLabel(entry.label);
    const kind = kindOf(label);
    if (kind === null || (isSerial(kind) && !SERIAL_TEXT.test(cell))) continue;
    const value = valueOf(kind, cell, entry.label);
    facts.push({ kind, line: entry.line, label: entry.label, cell, value });
  }
  return facts;
}

export function isSerial(kind: FactKind): boolean {
  return kind === "serial" || kind.endsWith("Serial");
}

/** With a digit, and in at most three words: more are another label and its value on the same line. */
const SERIAL_TEXT = /^(?=.*\d)(?!.* .* .* )[\p{L}\p{N}][\p{L}\p{N}./_ -]{0,59}$/u;

/** Words of a label in lower case, apart by single spaces; its unit in brackets left out. */
function plainLabel(label: string): string {
  return label
    .toLowerCase()
    .replace(/\([^)]*\)|\[[^\]]*\]/g, " ")
    .replace(/[^\p{L}\p{N}/ø]+/gu, " ")
    .trim();
}

function kindOf(label: string): FactKind | null {
  if (OF_SOMETHING_ELSE.test(label)) return null;
  if (SERIAL.test(label)) return serialKind(label);
  return LABELS.find(([, words]) => words.test(label))?.[0] ?? null;
}

function serialKind(label: string): FactKind {
  if (SUPPLY.test(label)) return "supplyProbeSerial";
  if (RETURN.test(label)) return "returnProbeSerial";
  if (PROBE.test(label)) return "probeSerial";
  if (OF_LOGGER.test(label)) return "loggerSerial";
  return OF_METER.test(label) ? "meterSerial" : "serial";
}

const MM_PER_UNIT: Readonly<Record<string, number>> = {
  mm: 1,
  cm: 10,
  m: 1000,
  in: 25.4,
  inch: 25.4,
  inches: 25.4,
  '"': 25.4,
  zoll: 25.4,
};
const M_PER_S_PER_UNIT: Readonly<Record<string, number>> = { "m/s": 1, "ft/s": 0.3048 };
const S_PER_UNIT: Readonly<Record<string, number>> = {
  s: 1,
  sec: 1,
  secs: 1,
  second: 1,
  seconds: 1,
  sek: 1,
  sekunde: 1,
  sekunden: 1,
  min: 60,
  mins: 60,
  minute: 60,
  minutes: 60,
  minuten: 60,
  h: 3600,
  hour: 3600,
  hours: 3600,
  stunde: 3600,
  stunden: 3600,
};

function valueOf(kind: FactKind, cell: string, label: string): number | null {
  switch (kind) {
    case "boreMm":
    case "outsideDiameterMm":
    case "wallMm":
      return quantity(cell, label, MM_PER_UNIT);
    case "soundSpeedMPerS":
      return quantity(cell, label, M_PER_S_PER_UNIT);
    case "intervalS":
      return clockLength(cell) ?? quantity(cell, label, S_PER_UNIT);
    default:
      return null;
  }
}

/** A number with its unit beside it, or in the brackets or the last word of its label. */
function quantity(
  cell: string,
  label: string,
  units: Readonly<Record<string, number>>,
): number | null {
  const match = /^([-+\d][\d.,'\u00a0\u202f ]*)\s*(\S*)$/.exec(cell);
  const number = sureNumber((match?.[1] ?? "").trim());
  const inLabel =
    /[([]\s*([^)\]]+?)\s*[)\]]/.exec(label)?.[1] ?? /\s(\S+)$/.exec(label.trim())?.[1] ?? "";
  const unit = (match?.[2] || inLabel).toLowerCase().replace(/\.$/, "");
  const factor = Object.prototype.hasOwnProperty.call(units, unit) ? units[unit] : undefined;
  if (number === null || factor === undefined) return null;
  // A tenth of a micrometre and of a millisecond: what the factor of a unit blurs.
  const value = Number((number * factor).toFixed(4));
  return value > 0 ? value : null;
}

/** The number of a text that is one number whichever mark is the decimal mark. */
function sureNumber(text: string): number | null {
  const readings = ([".", ","] as const).flatMap((mark) => plainNumberText(text, mark) ?? []);
  const values = [...new Set(readings.map(Number))];
  return values.length === 1 ? (values[0] as number) : null;
}

/** `00:01:00` is a minute. */
function clockLength(cell: string): number | null {
  const match = /^(\d{1,2}):(\d{2}):(\d{2})$/.exec(cell);
  if (match === null) return null;
  const seconds = Number(match[1]) * 3600 + Number(match[2]) * 60 + Number(match[3]);
  return seconds > 0 ? seconds : null;
}
