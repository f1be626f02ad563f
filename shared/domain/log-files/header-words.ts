/**
 * What a column's header says the column holds. English, German and basic French, as loggers write them.
 * "flow" alone is the flow rate; "flow temperature" is the supply of a heating loop.
 */
export type HeaderMeaning =
  | {
      readonly meaning: "flow" | "supply" | "return" | "signal";
      readonly certainty: "proved" | "likely";
    }
  | {
      readonly meaning: "velocity" | "pulses" | "status" | "outdoor" | "electricPower" | "pressure";
      readonly certainty: "likely";
    }
  /** A temperature probe without a role: T1, Temp 2, Probe A. */
  | { readonly meaning: "someTemperature"; readonly certainty: "likely" }
  | { readonly meaning: "time" | "date" | "timeOfDay"; readonly certainty: "likely" }
  /** Something we know and do not read: totals, differences, speed of sound. */
  | { readonly meaning: "known"; readonly certainty: "likely" }
  | null;

const words = (text: string): ReadonlySet<string> => new Set(text.split(" "));

const SUPPLY = words(
  "supply vorlauf vl vlt tvl départ depart aller sup zulauf forward ts tv tsup tsupply lwt",
);
const RETURN = words("return rücklauf ruecklauf rl rlt trl retour ret tr treturn tret ewt");
const FLOW = words(
  "flow flowrate durchfluss durchfluß durchflussmenge durchflussrate volumenstrom débit debit vflow qv flux volstrom",
);
const SIGNAL = words(
  "signal sig signalstärke signalstaerke signalqualität signalqualitaet güte qualité qualite quality sigqual strength",
);
const TEMPERATURE = words(
  "temp temperature temperatur température t temps fühler fuehler probe sensor pt100 sonde",
);
const OTHER = words(
  "total totalizer totaliser totaliser summe sum sumflow zähler zaehler counter cumul cumulative kumuliert volume volumen power leistung puissance " +
    "heat heatflow wärme waerme wärmemenge energy energie énergie delta dt deltat diff difference differenz spreizung écart " +
    "room raum density dichte battery batterie batt voltage record index nr no id row " +
    "gain sos sound schall schallgeschwindigkeit wind humidity feuchte pump pumpe valve ventil setpoint sollwert comment bemerkung note remark kanal position",
);
const OUTDOOR = words(
  "outdoor outside ambient außen aussen außentemperatur aussentemperatur außenluft aussenluft extérieure extérieur oat",
);
const PRESSURE = words("pressure druck betriebsdruck anlagendruck netzdruck pression");
const VELOCITY = words(
  "velocity speed geschwindigkeit strömungsgeschwindigkeit stroemungsgeschwindigkeit fließgeschwindigkeit fliessgeschwindigkeit vitesse",
);
const PULSES = words(
  "pulse pulses pulsecount impuls impulse impulsanzahl imp impulsion impulsions",
);
const QUALITY = words("quality qualität qualitaet qualité signalqualität signalqualitaet");
const STATUS = words("status state zustand flag flags statuscode état etat");
/** Words of a column that may hold readings of an error as well as words for it. */
const ERROR = words("err error fehler alarm");
/** Power and energy of these are no heat of the loop. */
const NOT_HEAT = words(
  "pump pumpe pompe electric electrical electricity elektrisch strom stromverbrauch electrique électrique " +
    "compressor kompressor compresseur fan ventilator motor active reactive wirkleistung blindleistung",
);
const HEATING = words(
  "heating heat wärme waerme heizen heizung heizenergie wärmemenge chauffage chaleur hot",
);
const COOLING = words(
  "cooling cool cold kälte kaelte kühlen kühlung kälteenergie kältemenge chilled froid refroidissement",
);
const POWER = words("power leistung puissance wirkleistung stromaufnahme");
/** Words beside outdoor, pressure or speed that make something else of them. */
const NOT_COMPANION = words(
  "humidity feuchte delta diff difference differenz differential differenzdruck dp sound schall sos wind co2 setpoint sollwert lux radiation",
);
const QUANTITY_BESIDE = words("rate strength stärke water wasser q c f k value wert");
const MEAN = words("mean avg average mittel mittelwert moyenne moy");
const TIME = words(
  "timestamp datetime zeitstempel horodatage zeitpunkt time zeit uhrzeit heure datetimestamp datumzeit epoch unixtime unix local utc",
);
const DATE = words("date datum tag jour day");

/** @param name the header without its unit */
export function headerMeaning(name: string): HeaderMeaning {
  const parts = splitName(name);
  const has = (set: ReadonlySet<string>): boolean =>
    parts.some((part) => set.has(part) || set.has(stemOf(part)));
  if (parts.length === 0) return null;
  const besideWater = companionMeaning(parts, has);
  if (besideWater !== null) return { meaning: besideWater, certainty: "likely" };
  if (has(OTHER) && !has(SIGNAL)) return { meaning: "known", certainty: "likely" };
  if (has(SIGNAL)) return { meaning: "signal", certainty: "proved" };
  const temperature = has(TEMPERATURE);
  if (has(RETURN)) return { meaning: "return", certainty: "proved" };
  if (has(SUPPLY)) return { meaning: "supply", certainty: "proved" };
  if (has(FLOW))
    return temperature
      ? { meaning: "supply", certainty: "likely" }
      : { meaning: "flow", certainty: "proved" };
  if (isNeutralProbe(parts) || temperature)
    return { meaning: "someTemperature", certainty: "likely" };
  if (parts.length === 1 && (parts[0] === "q" || parts[0] === "v̇"))
    return { meaning: "flow", certainty: "likely" };
  if (has(DATE) && has(TIME)) return { meaning: "time", certainty: "likely" };
  if (has(DATE)) return { meaning: "date", certainty: "likely" };
  if (has(TIME)) return { meaning: "time", certainty: "likely" };
  return null;
}

/** What a column holds that is no temperature or flow of the loop; null for those and all others. */
function companionMeaning(
  parts: readonly string[],
  has: (set: ReadonlySet<string>) => boolean,
): "velocity" | "pulses" | "status" | "outdoor" | "electricPower" | "pressure" | null {
  if (has(STATUS) || (has(ERROR) && parts.length === 1)) return "status";
  if (has(PULSES)) return "pulses";
  const isOther = has(NOT_COMPANION);
  if (has(OUTDOOR)) return isOther || has(PRESSURE) ? null : "outdoor";
  if (isOther || has(SUPPLY) || has(RETURN)) return null;
  if (has(PRESSURE)) return "pressure";
  if (has(VELOCITY)) return has(NOT_HEAT) ? null : "velocity";
  return has(NOT_HEAT) && has(POWER) ? "electricPower" : null;
}

/** flow2 is a flow. A single letter with a number is left whole: T1, Q2. */
export function stemOf(part: string): string {
  const stem = part.replace(/\d+$/, "");
  return stem.length > 1 ? stem : part;
}

/** Whether a word only says which quantity a column holds, and not whose. */
export function saysQuantity(part: string): boolean {
  return [
    SUPPLY,
    RETURN,
    FLOW,
    SIGNAL,
    TEMPERATURE,
    VELOCITY,
    PULSES,
    POWER,
    MEAN,
    QUANTITY_BESIDE,
  ].some((set) => set.has(part));
}

/** Whether a header names a quality, which is a number to some loggers and a word to others. */
export function saysQuality(name: string): boolean {
  return splitName(name).some((part) => QUALITY.has(part) || ERROR.has(part));
}

/** Whether a column of power or energy is something else's than the loop's heat. */
export function isNotHeat(name: string): boolean {
  return splitName(name).some((part) => NOT_HEAT.has(part));
}

/** The register a header names; null where it names none or both. */
export function registerWord(name: string): "heating" | "cooling" | null {
  const parts = splitName(name);
  const heating = parts.some((part) => HEATING.has(part));
  const cooling = parts.some((part) => COOLING.has(part));
  if (heating === cooling) return null;
  return heating ? "heating" : "cooling";
}

/** Whether a header says that its column holds means: of which step, it may leave open. */
export function saysMean(header: string): boolean {
  return splitName(header).some((part) => MEAN.has(part));
}

/** T1, T2, TA, temp1, ch1temp. */
function isNeutralProbe(parts: readonly string[]): boolean {
  const first = parts[0] as string;
  const stem = first.replace(/\d+$/, "");
  return (
    (stem === "t" && first.length > 1) ||
    first === "ta" ||
    first === "tb" ||
    (stem !== first && TEMPERATURE.has(stem))
  );
}

/** Lower-case words: split at everything that is no letter or digit, and between `flowRate` humps. */
export function splitName(name: string): readonly string[] {
  const parts: string[] = [];
  let part = "";
  let previousWasLower = false;
  for (const c of name) {
    const lower = c.toLowerCase();
    const isWord = lower !== c.toUpperCase() || (c >= "0" && c <= "9") || c === "\u0307";
    const isUpper = isWord && c !== lower;
    if (!isWord || (isUpper && previousWasLower)) {
      if (part !== "") parts.push(part);
      part = "";
    }
    if (isWord) part += lower;
    previousWasLower = isWord && !isUpper;
  }
  if (part !== "") parts.push(part);
  return parts;
}

/** Words of a header that tell what a row's value is over time. */
export function seriesKindOf(
  headers: readonly string[],
): "instantaneous" | "meanFromLabel" | "meanToLabel" | null {
  for (const header of headers) {
    const parts = splitName(header);
    const interval = parts.some((part) => INTERVAL.has(part));
    if (interval && parts.some((part) => START.has(part))) return "meanFromLabel";
    if (interval && parts.some((part) => END.has(part))) return "meanToLabel";
  }
  return null;
}

const INTERVAL = words("interval intervall intervalle period periode block step");
const START = words("start begin beginn from von anfang début");
const END = words("end ende to bis fin stop");
