import type { ColumnEvidence } from "./column-evidence";
import { assignMeter } from "./assign-meter";
import { headerMeaning, isNotHeat, splitName, type HeaderMeaning } from "./header-words";
import type { ColumnMeaning, ColumnUnit } from "./recipe";
import type { SampleRow } from "./recognition";
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
  nameNeutralProbes(candidates);

  const flows = preferFlowUnit(withRole("flow"));
  const meter = assignMeter(candidates, flows.length > 0, context);
  asked.push(...meter.asked);
  const open = withRole("unknown").length > 0 || withRole("someTemperature").length > 0;
  const temperaturesFound = withRole("supply").length + withRole("return").length;
  const flowLacks = flows.length === 0 && !meter.saysHowMuch;
  if (flows.length > 1 || (flowLacks && (open || temperaturesFound === 0))) asked.push("flow");
  for (const role of ["supply", "return"] as const) {
    const found = withRole(role).length;
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
          METER_ROLES.has(role) ||
          ((role === "supply" || role === "return") && !asked.includes(role));
    if (!isSettled) return { meaning: "skip", unit: null, certainty: "likely" };
    return { meaning: role as ColumnMeaning, unit: role === "signal" ? "%" : unit, certainty };
  });
  return { columns, asked };
}

const METER_ROLES: ReadonlySet<Role> = new Set<Role>([
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
  const role =
    timeMeaning(head, index) === null && hasNumbers
      ? roleOf(said, unitFound, column, name)
      : "skip";
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
      return "flow";
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
    default:
      // Power or energy of something that is no heat of the loop.
      return "skip";
  }
  if (meaning === "signal") return isPercent(column) ? "signal" : "skip";
  if (meaning === "time" || meaning === "date" || meaning === "timeOfDay") return "skip";
  return meaning ?? "unknown";
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
