/**
 * What a column's header says the column holds. English, German and basic French, as loggers write them.
 * "flow" alone is the flow rate; "flow temperature" is the supply of a heating loop.
 */
export type HeaderMeaning =
  | {
      readonly meaning: "flow" | "supply" | "return" | "signal";
      readonly certainty: "proved" | "likely";
    }
  /** A temperature probe without a role: T1, Temp 2, Probe A. */
  | { readonly meaning: "someTemperature"; readonly certainty: "likely" }
  | { readonly meaning: "time" | "date" | "timeOfDay"; readonly certainty: "likely" }
  /** Something we know and do not read: power, totals, outdoor temperature. */
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
    "outdoor outside ambient außen aussen außentemperatur aussentemperatur extérieure room raum velocity speed geschwindigkeit vitesse " +
    "density dichte pressure druck pression err error status fehler state alarm flag battery batterie batt voltage record index nr no id row " +
    "gain sos pump pumpe valve ventil setpoint sollwert humidity comment bemerkung note remark kanal position",
);
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
const MEAN = words("mean avg average mittel mittelwert moyenne moy");
const TIME = words(
  "timestamp datetime zeitstempel horodatage zeitpunkt time zeit uhrzeit heure datetimestamp datumzeit epoch unixtime unix local utc",
);
const DATE = words("date datum tag jour day");

/** @param name the header without its unit */
export function headerMeaning(name: string): HeaderMeaning {
  const parts = splitName(name);
  const has = (set: ReadonlySet<string>): boolean => parts.some((part) => set.has(part));
  if (parts.length === 0) return null;
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
