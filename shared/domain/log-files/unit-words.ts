import type { ColumnUnit } from "./recipe";

/** A unit read from a header or a units row: one of ours, or one we know of and cannot read. */
export type UnitWord =
  { readonly unit: ColumnUnit } | { readonly unit: null; readonly other: OtherQuantity };

/** Quantities beside ours; the word tells that a column is none of flow, temperature or signal. */
export type OtherQuantity =
  "otherFlow" | "volume" | "power" | "energy" | "speed" | "difference" | "pulses" | "other";

const OURS: Readonly<Record<string, ColumnUnit>> = {
  "m3/h": "m3/h",
  "m3/hr": "m3/h",
  m3h: "m3/h",
  m3ph: "m3/h",
  "m3h-1": "m3/h",
  "cbm/h": "m3/h",
  cmh: "m3/h",
  m3perhour: "m3/h",
  "qm/h": "m3/h",
  "m^3/h": "m3/h",
  "m3/std": "m3/h",
  "m3/hour": "m3/h",
  m3perh: "m3/h",
  "l/s": "L/s",
  lps: "L/s",
  ls: "L/s",
  "ls-1": "L/s",
  "l/sec": "L/s",
  "liter/s": "L/s",
  "litre/s": "L/s",
  "l/sek": "L/s",
  "litres/s": "L/s",
  "liters/s": "L/s",
  "l/min": "L/min",
  lpm: "L/min",
  "l/mn": "L/min",
  lmin: "L/min",
  "litre/min": "L/min",
  "liter/min": "L/min",
  "litres/min": "L/min",
  "liters/min": "L/min",
  gpm: "US gpm",
  usgpm: "US gpm",
  "gpm(us)": "US gpm",
  "gal/min": "US gpm",
  "usgal/min": "US gpm",
  "gallons/min": "US gpm",
  gpmus: "US gpm",
  "l/h": "L/h",
  "l/hr": "L/h",
  lph: "L/h",
  lh: "L/h",
  "lh-1": "L/h",
  "l/std": "L/h",
  "l/hour": "L/h",
  "liter/h": "L/h",
  "litre/h": "L/h",
  "liters/h": "L/h",
  "litres/h": "L/h",
  "liter/std": "L/h",
  "ltr/h": "L/h",
  "m/s": "m/s",
  "m/sec": "m/s",
  "m/sek": "m/s",
  "ms-1": "m/s",
  mps: "m/s",
  "ft/s": "ft/s",
  "ft/sec": "ft/s",
  fps: "ft/s",
  bar: "bar",
  barg: "bar",
  "bar(g)": "bar",
  kpa: "kPa",
  "kpa(g)": "kPa",
  psi: "psi",
  psig: "psi",
  degc: "degC",
  celsius: "degC",
  "deg.c": "degC",
  gradc: "degC",
  degcelsius: "degC",
  degf: "degF",
  fahrenheit: "degF",
  "deg.f": "degF",
  degfahrenheit: "degF",
  kelvin: "K",
  degk: "K",
  "%": "%",
  percent: "%",
  prozent: "%",
  pct: "%",
  kw: "kW",
  kilowatt: "kW",
  kwth: "kW",
  mw: "MW",
  mwth: "MW",
  mbh: "MBH",
  "kbtu/h": "MBH",
  "kbtu/hr": "MBH",
  ton: "ton",
  tons: "ton",
  tr: "ton",
  tonr: "ton",
  m3: "m3",
  "m^3": "m3",
  cbm: "m3",
  liter: "L",
  litre: "L",
  litres: "L",
  liters: "L",
  ltr: "L",
  gal: "US gal",
  usgal: "US gal",
  ft3: "ft3",
  cuft: "ft3",
  "ft^3": "ft3",
  kwh: "kWh",
  mwh: "MWh",
  mj: "MJ",
  gj: "GJ",
  kbtu: "kBtu",
  mmbtu: "MMBtu",
};

/** Single letters mean a unit only where a unit is expected: in brackets, a units row or after an underscore. */
const LETTERS: Readonly<Record<string, ColumnUnit>> = {
  c: "degC",
  f: "degF",
  k: "K",
  w: "W",
  l: "L",
};

/** In the place of a unit these say that pulses are counted; as a header they are its name. */
const PULSES: ReadonlySet<string> = new Set([
  "imp",
  "imps",
  "impulse",
  "impulses",
  "impulsions",
  "pulse",
  "pulses",
  "counts",
]);

const OTHERS: Readonly<Record<string, OtherQuantity>> = {
  "m3/s": "otherFlow",
  "m3/min": "otherFlow",
  "m3/d": "otherFlow",
  "kg/h": "otherFlow",
  "kg/s": "otherFlow",
  "t/h": "otherFlow",
  "ft3/min": "otherFlow",
  cfm: "otherFlow",
  gph: "otherFlow",
  impgpm: "otherFlow",
  ukgpm: "otherFlow",
  igpm: "otherFlow",
  gpmuk: "otherFlow",
  "gpm(uk)": "otherFlow",
  "gpm(imp)": "otherFlow",
  mgd: "otherFlow",
  gpd: "otherFlow",
  "gal/h": "otherFlow",
  "btu/h": "power",
  btuh: "power",
  wh: "energy",
  kj: "energy",
  btu: "energy",
  // A thousand Btu to some, a million to others: somebody must say.
  mbtu: "energy",
  therm: "energy",
  "mm/s": "speed",
  db: "other",
  v: "other",
  mv: "other",
  ma: "other",
  mbar: "other",
  pa: "other",
  hz: "other",
  rpm: "other",
  s: "other",
  ms: "other",
  min: "other",
  h: "other",
  "kg/m3": "other",
  ohm: "other",
  a: "other",
  "us/cm": "other",
  "-": "other",
  "%rh": "other",
  rh: "other",
};

/**
 * The unit a piece of text is, or null if it is none. `m³/h`, `m3/hr`, `US gpm`, `°F`, `Deg C` …
 * @param expected true in brackets and units rows, where a bare C, F or K is a unit.
 */
export function unitWord(text: string, expected: boolean): UnitWord | null {
  const key = unitKey(text);
  const letters = expected ? LETTERS : {};
  const ours = own(OURS, key) ?? own(letters, key);
  if (ours !== undefined) return { unit: ours };
  if (expected && PULSES.has(key)) return { unit: null, other: "pulses" };
  const other = own(OTHERS, key);
  return other === undefined ? null : { unit: null, other };
}

function own<T>(table: Readonly<Record<string, T>>, key: string): T | undefined {
  return Object.prototype.hasOwnProperty.call(table, key) ? table[key] : undefined;
}

function unitKey(text: string): string {
  let key = "";
  for (const c of text.toLowerCase()) {
    if (c === "³") key += "3";
    else if (c === "°" || c === "º") key += "deg";
    else if (c === "℃") key += "degc";
    else if (c === "℉") key += "degf";
    else if (c === "⋅" || c === "·") continue;
    else if (!" \u00a0\u202f\t".includes(c)) key += c;
  }
  return key;
}

/** A header split into its name and the unit it carries. */
export interface HeaderParts {
  /** The header without the unit, as written. */
  readonly name: string;
  readonly unit: UnitWord | null;
}

const BRACKETS: readonly (readonly [string, string])[] = [
  ["[", "]"],
  ["(", ")"],
  ["{", "}"],
];

/**
 * Takes the unit out of a header: `Flow [m³/h]`, `Supply (°F)`, `Vorlauf / °C`, `Vorlauf in °C`,
 * `flow_m3h`, `supply_C`, `Flow gpm`.
 */
export function splitHeader(header: string): HeaderParts {
  const text = header.trim();
  for (const [open, close] of BRACKETS) {
    const from = text.lastIndexOf(open);
    const to = text.indexOf(close, from + 1);
    if (from < 0 || to < 0) continue;
    const unit = unitWord(text.slice(from + 1, to), true);
    if (unit !== null) return { name: `${text.slice(0, from)} ${text.slice(to + 1)}`.trim(), unit };
  }
  // After the last "/", but not inside "m³/h": try the longest tail first.
  for (let at = 0; at < text.length; at++) {
    const c = text[at] as string;
    if (!" _/,:;".includes(c)) continue;
    const tail = text.slice(at + 1).trim();
    if (tail === "") continue;
    // `supply_C` has a unit; `Temp C` may be the third of three probes.
    const unit = unitWord(tail, c === "_" || c === "/");
    if (unit !== null && at > 0) return { name: trimJoiner(text.slice(0, at)), unit };
  }
  const whole = unitWord(text, false);
  return whole === null ? { name: text, unit: null } : { name: "", unit: whole };
}

function trimJoiner(name: string): string {
  const trimmed = name.trim();
  const lower = trimmed.toLowerCase();
  for (const joiner of [" in", "/", ",", ":", "-", "_"]) {
    if (lower.endsWith(joiner)) return trimmed.slice(0, trimmed.length - joiner.length).trim();
  }
  return trimmed;
}
