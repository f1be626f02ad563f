import type { AssignmentContext, Candidate } from "./assign-columns";
import { roughNumber } from "./cell-kind";
import { registerWord } from "./header-words";
import type { ColumnMeaning } from "./recipe";

export interface MeterAssignment {
  readonly asked: readonly ColumnMeaning[];
  /** The file says how much heat or water moved without a flow column. */
  readonly saysHowMuch: boolean;
}

/**
 * Settles the columns of a permanent meter: power, a volume counter, energy counters. A file with a
 * flow column is read by its flow, and these stay for somebody to choose. Power comes before energy
 * counters, whose steps are coarser. An energy column that no header calls heating or cooling is its
 * loop's service's; where the loop changes over, somebody must say. A column of volume or energy that
 * does not only rise is no counter and is left out.
 */
export function assignMeter(
  candidates: readonly Candidate[],
  hasFlow: boolean,
  { sampleRows, service }: AssignmentContext,
): MeterAssignment {
  const asked: ColumnMeaning[] = [];
  const powers = candidates.filter(({ role }) => role === "power");
  const counters = candidates.filter(({ role }) => role === "volume" || role === "energy");
  const skip = (all: readonly Candidate[]) => all.forEach((each) => (each.role = "skip"));
  if (hasFlow) {
    skip([...powers, ...counters]);
    return { asked, saysHowMuch: false };
  }
  if (powers.length > 1) {
    skip(powers);
    asked.push("power");
  }
  const [power] = powers;
  if (power !== undefined) power.certainty = "likely";
  const rising = counters.filter((candidate) => mostlyRises(candidate, sampleRows));
  skip(counters.filter((candidate) => !rising.includes(candidate)));
  const volumes = rising.filter(({ role }) => role === "volume");
  const energies = rising.filter(({ role }) => role === "energy");
  if (volumes.length === 1) settle(volumes[0] as Candidate, "volumeCounter");
  else if (volumes.length > 1) {
    skip(volumes);
    asked.push("volumeCounter");
  }
  if (powers.length > 0) skip(energies);
  else asked.push(...assignEnergies(energies, service));
  return {
    asked,
    saysHowMuch: powers.length > 0 || volumes.length > 0 || energies.length > 0,
  };
}

function assignEnergies(
  energies: readonly Candidate[],
  service: AssignmentContext["service"],
): readonly ColumnMeaning[] {
  const meaningOf = { heating: "heatingCounter", cooling: "coolingCounter" } as const;
  const [only] = energies;
  if (energies.length === 1 && only !== undefined) {
    const own = service === "changeover" ? null : service;
    const register = own ?? registerWord(only.name);
    if (register !== null) {
      settle(only, meaningOf[register]);
      return [];
    }
  }
  const asked: ColumnMeaning[] = [];
  for (const register of ["heating", "cooling"] as const) {
    const named = energies.filter(({ name }) => registerWord(name) === register);
    if (named.length === 1) settle(named[0] as Candidate, meaningOf[register]);
    else if (named.length > 1) asked.push(meaningOf[register]);
  }
  const left = energies.filter(({ role }) => role === "energy");
  for (const candidate of left) candidate.role = "skip";
  const isNamed = left.length < energies.length;
  return left.length > 0 && !isNamed && asked.length === 0 ? ["heatingCounter"] : asked;
}

function settle(
  candidate: Candidate,
  role: "volumeCounter" | "heatingCounter" | "coolingCounter",
): void {
  candidate.role = role;
  candidate.certainty = "likely";
}

/** A fall among several steps may be a rollover or another meter; readings of an interval fall half the time. */
function mostlyRises({ index }: Candidate, rows: readonly { cells: readonly string[] }[]): boolean {
  const values = rows
    .map(({ cells }) => roughNumber(cells[index] ?? ""))
    .filter((value) => !Number.isNaN(value));
  let falls = 0;
  for (let i = 1; i < values.length; i++)
    if ((values[i] as number) < (values[i - 1] as number)) falls++;
  return falls <= Math.max(1, values.length / 4) && values.length > 1;
}
