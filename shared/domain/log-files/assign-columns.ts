import type { ColumnEvidence } from "./column-evidence";
import { assignMeter } from "./assign-meter";
import {
  headerMeaning,
  isNotHeat,
  saysQuality,
  splitName,
  type HeaderMeaning,
} from "./header-words";
import { findPointSets } from "./point-sets";
import type { ColumnMeaning, ColumnUnit } from "./recipe";
import type { PointSet, SampleRow } from "./recognition";
import type { HeadRecognition } from "./recognise-head";
import { splitHeader, type UnitWord } from "./unit-words";
import type { LoopService } from "../energy/power";

export interface ColumnAssignment {
  readonly meaning: ColumnMeaning;
  /** As the file says it; null where it says none. */
  readonly unit: ColumnUnit | null;
  readonly certainty: "proved" | "likely";
}

export interface Assignment {
  readonly columns: readonly ColumnAssignment[];
  /** Meanings that several columns claim, or that none does though some column could. */
  readonly asked: readonly ColumnMeaning[];
  /** Columns of the same name that could be either of these, and nothing tells which. */
  readonly alike: readonly number[];
  /** Two sets of columns or more, each of another metering point; which is whose is asked. */
  readonly pointSets: readonly PointSet[];
}

type Role =
  | "flow"
  | "supply"
  | "return"
  | "signal"
  | "someTemperature"
  | "power"
  | "volume"
  | "energy"
  | "volumeCounter"
  | "heatingCounter"
  | "coolingCounter"
  | "velocity"
  | "pulses"
  | "status"
  | "outdoor"
  | "electricPower"
  | "pressure"
  | "unknown"
  | "skip";

export interface Candidate {
  readonly index: number;
  role: Role;
  readonly unit: ColumnUnit | null;
  certainty: "proved" | "likely";
  readonly words: readonly string[];
  readonly name: string;
}

/** What recognition knows besides the file's first lines. */
export interface AssignmentContext {
  readonly sampleRows: readonly SampleRow[];
  /** Null where it is not known. */
  readonly service: LoopService | null;
}

/** Gives each column its meaning from its header, its unit and its values; asks where two would fit. */
export function assignColumns(
  head: HeadRecognition,
  evidence: readonly ColumnEvidence[],
  context: AssignmentContext,
): Assignment {
  const candidates = evidence.map((column, index) => candidateOf(head, column, index));
  const asked: ColumnMeaning[] = [];
  const withRole = (role: Role): Candidate[] =>
    candidates.filter((candidate) => candidate.role === role);

  settleBareFlow(candidates);
  const alike = findAlikeProbes(candidates);
  if (alike.length === 0) nameNeutralProbes(candidates);
  const pointSets = findPointSets(candidates);
  const inSets = new Set(pointSets.flatMap(({ columns }) => columns.map(({ index }) => index)));
  // Which set is this point's, somebody must say; until then none is read.
  for (const candidate of candidates) if (inSets.has(candidate.index)) candidate.role = "skip";
  leaveSeveralOut(candidates);

  const flows = preferFlowUnit(withRole("flow"));
  const meter = assignMeter(candidates, flows.length > 0, context);
  asked.push(...meter.asked);
  const speaks = flows.length > 0 || meter.saysHowMuch || pointSets.length > 0;
  const speeds = chooseOne(withRole("velocity"), speaks);
  const counted = chooseOne(withRole("pulses"), speaks || speeds.found);
  if (speeds.asked) asked.push("velocity");
  if (counted.asked) asked.push("pulses");
  const saysHowMuch = speaks || speeds.found || counted.found;
  const open = withRole("unknown").length > 0 || withRole("someTemperature").length > 0;
  const temperaturesFound = withRole("supply").length + withRole("return").length;
  const flowLacks = !saysHowMuch;
  const isBesideOnly =
    temperaturesFound === 0 && candidates.some(({ role }) => BESIDE_ROLES.has(role));
  if (flows.length > 1 || (flowLacks && (open || (temperaturesFound === 0 && !isBesideOnly))))
    asked.push("flow");
  for (const role of ["supply", "return"] as const) {
    const found = withRole(role).length;
    if (alike.length > 0 || pointSets.length > 0) continue;
    // Temperatures may stand in a file of their own; only columns nobody has named could be them.
    if (
      found > 1 ||
      (found === 0 &&
        (withRole("someTemperature").length > 0 || (head.header.headerLine === null && open)))
    ) {
      asked.push(role);
    }
  }
  if (withRole("signal").length > 1)
    withRole("signal")
      .slice(1)
      .forEach((extra) => (extra.role = "skip"));

  const kept = new Set(flows.length === 1 ? flows : []);
  const columns = candidates.map((candidate): ColumnAssignment => {
    const time = timeMeaning(head, candidate.index);
    if (time !== null) return { meaning: time, unit: null, certainty: "proved" };
    const { role, unit, certainty } = candidate;
    const isSettled =
      role === "flow"
        ? kept.has(candidate)
        : role === "signal" ||
          OWN_ROLES.has(role) ||
          ((role === "supply" || role === "return") && !asked.includes(role));
    if (!isSettled) return { meaning: "skip", unit: null, certainty: "likely" };
    return { meaning: role as ColumnMeaning, unit: role === "signal" ? "%" : unit, certainty };
  });
  return { columns, asked, alike, pointSets };
}

/** Of several columns that say how much moved, none is read before somebody chooses. */
function chooseOne(
  found: readonly Candidate[],
  isNeedless: boolean,
): { readonly found: boolean; readonly asked: boolean } {
  const several = found.length > 1;
  if (isNeedless || several) for (const candidate of found) candidate.role = "skip";
  return { found: found.length > 0, asked: several && !isNeedless };
}

/** Companions and status words stand beside the readings: of several, none is proposed. */
function leaveSeveralOut(candidates: readonly Candidate[]): void {
  for (const role of ["status", "outdoor", "electricPower", "pressure"] as const) {
    const found = candidates.filter((candidate) => candidate.role === role);
    if (found.length > 1) for (const candidate of found) candidate.role = "skip";
  }
}

/** Probes of one name: "T" twice is supply and return, and nothing says in which order. */
function findAlikeProbes(candidates: readonly Candidate[]): readonly number[] {
  const probes = candidates.filter(({ role }) => role === "someTemperature");
  const named = candidates.some(({ role }) => role === "supply" || role === "return");
  const [first] = probes;
  const isAlike = probes.length > 1 && probes.every(({ name }) => name === first?.name);
  return isAlike && !named ? probes.map(({ index }) => index) : [];
}

/** Companion series, which may come in a file of their own. */
const BESIDE_ROLES: ReadonlySet<Role> = new Set<Role>(["outdoor", "electricPower", "pressure"]);

const OWN_ROLES: ReadonlySet<Role> = new Set<Role>([
  "velocity",
  "pulses",
  "status",
  "outdoor",
  "electricPower",
  "pressure",
  "power",
  "volumeCounter",
  "heatingCounter",
  "coolingCounter",
]);

function timeMeaning(head: HeadRecognition, index: number): ColumnMeaning | null {
  const { times } = head;
  if (times.kind !== "split") return index === times.index ? "time" : null;
  if (index === times.dateIndex) return "date";
  return index === times.timeIndex ? "timeOfDay" : null;
}

function candidateOf(head: HeadRecognition, column: ColumnEvidence, index: number): Candidate {
  const header = head.header.headers[index] ?? "";
  const unitFound = head.header.units[index] ?? null;
  const { name } = splitHeader(header);
  const words = splitName(name);
  const said = headerMeaning(name);
  const hasNumbers = column.numbers > 0 && column.numbers >= column.texts;
  const role = timeMeaning(head, index) !== null ? "skip" : roleByCells();
  function roleByCells(): Role {
    if (said?.meaning === "status" || (!hasNumbers && saysQuality(name)))
      // One and the same word in all rows tells none of them apart.
      return column.words.counts.length > 1 && !column.words.isFull ? "status" : "skip";
    return hasNumbers ? roleOf(said, unitFound, column, name) : "skip";
  }
  return {
    index,
    role,
    unit: unitFound?.unit ?? null,
    certainty: role === "signal" ? "likely" : (said?.certainty ?? "likely"),
    words,
    name,
  };
}

function roleOf(
  said: HeaderMeaning,
  unit: UnitWord | null,
  column: ColumnEvidence,
  name: string,
): Role {
  const meaning = said?.meaning;
  const beside = besideRole(meaning, unit);
  if (beside !== null) return beside;
  const meterRole = unit === null || isNotHeat(name) ? null : meterRoleOf(unit);
  if (meterRole !== null) return meterRole;
  if (meaning === "known") return "skip";
  if (unit !== null && unit.unit === null)
    return unit.other === "otherFlow" && meaning !== "signal" ? "flow" : "skip";
  switch (unit?.unit) {
    case "m3/h":
    case "L/s":
    case "L/min":
    case "US gpm":
    case "L/h":
      return "flow";
    case "m/s":
    case "ft/s":
      return meaning === undefined || meaning === "flow" ? "velocity" : "skip";
    case "degC":
    case "degF":
    case "K":
      return meaning === "return"
        ? "return"
        : meaning === "supply" || meaning === "flow"
          ? "supply"
          : "someTemperature";
    case "%":
      return meaning === "signal" ? "signal" : "skip";
    case undefined:
      break;
    case "kW":
    case "W":
      // Power of something that is no heat of the loop.
      return "electricPower";
    default:
      return "skip";
  }
  if (meaning === "velocity" || meaning === "outdoor") return meaning;
  if (meaning === "pulses") return column.pointProof || column.commaProof ? "skip" : "pulses";
  // A companion is only read where its unit is known.
  if (meaning === "status" || meaning === "electricPower" || meaning === "pressure") return "skip";
  if (meaning === "signal") return isPercent(column) ? "signal" : "skip";
  if (meaning === "time" || meaning === "date" || meaning === "timeOfDay") return "skip";
  return meaning ?? "unknown";
}

/** The role of a column that is neither flow, temperature nor a meter's; null for all others. */
function besideRole(
  meaning: NonNullable<HeaderMeaning>["meaning"] | undefined,
  unit: UnitWord | null,
): Role | null {
  if (unit === null) return null;
  const ours = unit.unit;
  if (ours === null && unit.other === "pulses") return "pulses";
  switch (meaning) {
    case "velocity":
      return ours === "m/s" || ours === "ft/s" ? "velocity" : "skip";
    case "outdoor":
      return ours === "degC" || ours === "degF" ? "outdoor" : "skip";
    case "electricPower":
      return ours === "kW" || ours === "W" ? "electricPower" : "skip";
    case "pressure":
      return ours === "kPa" || ours === "bar" || ours === "psi" ? "pressure" : "skip";
    default:
      return null;
  }
}

function meterRoleOf(unit: UnitWord): "power" | "volume" | "energy" | null {
  switch (unit.unit) {
    case null:
      return unit.other === "power" || unit.other === "energy" || unit.other === "volume"
        ? unit.other
        : null;
    case "kW":
    case "MW":
    case "W":
    case "MBH":
    case "ton":
      return "power";
    case "m3":
    case "L":
    case "US gal":
    case "ft3":
      return "volume";
    case "kWh":
    case "MWh":
    case "MJ":
    case "GJ":
    case "kBtu":
    case "MMBtu":
      return "energy";
    default:
      return null;
  }
}

function isPercent(column: ColumnEvidence): boolean {
  const range = column.range(".") ?? column.range(",");
  return range === null || (range.min >= 0 && range.max <= 100);
}

/** "Flow" beside "Return" and no "Supply" may be the flow pipe's temperature, as some countries call it. */
function settleBareFlow(candidates: readonly Candidate[]): void {
  const flows = candidates.filter(({ role }) => role === "flow");
  const hasReturn = candidates.some(({ role }) => role === "return");
  const hasSupply = candidates.some(({ role }) => role === "supply" || role === "someTemperature");
  if (!hasReturn || hasSupply) return;
  const bare = flows.filter(
    ({ unit, words }) => unit === null && words.length === 1 && words[0] === "flow",
  );
  const [only] = bare;
  if (bare.length !== 1 || only === undefined) return;
  const rates = flows.filter((flow) => flow !== only);
  only.role = rates.length > 0 ? "supply" : "unknown";
  only.certainty = "likely";
}

/** T1 and T2 are supply and return in this order, as likely as not to be swapped: shown as a guess. */
function nameNeutralProbes(candidates: readonly Candidate[]): void {
  const probes = candidates.filter(({ role }) => role === "someTemperature");
  const missing = (["supply", "return"] as const).filter(
    (role) => !candidates.some((candidate) => candidate.role === role),
  );
  if (probes.length !== missing.length) return;
  probes.forEach((probe, i) => {
    probe.role = missing[i] as Role;
    probe.certainty = "likely";
  });
}

/** Of several flows the only one with a unit is the rate. */
function preferFlowUnit(flows: readonly Candidate[]): readonly Candidate[] {
  const withUnit = flows.filter(({ unit }) => unit !== null);
  return flows.length > 1 && withUnit.length === 1 ? withUnit : flows;
}
