import type { Fluid, GlycolTestMethod, Loop, LoopService } from "@shared/contracts/places";
import type { Format } from "@features/i18n";
import { shownValue, storedValue } from "./shown-range";

/** A loop's fields as typed: numbers in the units shown, null while empty. */
export interface LoopValues {
  readonly tag: string;
  readonly name: string;
  readonly service: LoopService | null;
  readonly buildingId: string;
  readonly parentLoopId: string;
  readonly fluidKind: Fluid["kind"];
  readonly glycolPercent: number | null;
  readonly glycolBasis: "mass" | "volume" | null;
  readonly glycolTestedOn: string | null;
  readonly glycolTestMethod: GlycolTestMethod | null;
  readonly gaugePressure: number | null;
  readonly designFlow: number | null;
  readonly designDeltaT: number | null;
  readonly flowCutOff: number | null;
  readonly deltaTCutOff: number | null;
  readonly notes: string;
}

/** An empty choice of a select: no building, no feeding loop, no test method. */
export const NONE = "none";

export function loopValues(loop: Loop | null, format: Format, buildingId: string): LoopValues {
  const glycol = loop && loop.fluid.kind !== "water" ? loop.fluid : null;
  return {
    tag: loop?.tag ?? "",
    name: loop?.name ?? "",
    service: loop?.service ?? null,
    buildingId: loop ? (loop.buildingId ?? NONE) : buildingId,
    parentLoopId: loop?.parentLoopId ?? NONE,
    fluidKind: loop?.fluid.kind ?? "water",
    glycolPercent: glycol?.percent ?? null,
    glycolBasis: glycol?.basis ?? null,
    glycolTestedOn: glycol?.testedOn ?? null,
    glycolTestMethod: glycol?.testMethod ?? null,
    gaugePressure: shownValue(format, "pressure", loop?.gaugePressureMPa ?? null),
    designFlow: shownValue(format, "flow", loop?.designFlowM3PerHour ?? null),
    designDeltaT: shownValue(format, "temperatureDifference", loop?.designDeltaTK ?? null),
    flowCutOff: shownValue(format, "flow", loop?.flowCutOffM3PerHour ?? null),
    deltaTCutOff: shownValue(format, "temperatureDifference", loop?.deltaTCutOffK ?? null),
    notes: loop?.notes ?? "",
  };
}

/** Everything but the service, which has no default and is checked first. */
export function loopBody(values: LoopValues, loop: Loop | null, format: Format) {
  const stored = (
    quantity: "pressure" | "flow" | "temperatureDifference",
    typed: number | null,
    before: number | null | undefined,
  ) => storedValue(format, quantity, typed, before ?? null);
  return {
    tag: values.tag.trim(),
    name: values.name.trim(),
    buildingId: values.buildingId === NONE ? null : values.buildingId,
    parentLoopId: values.parentLoopId === NONE ? null : values.parentLoopId,
    fluid: fluidOf(values),
    gaugePressureMPa: stored("pressure", values.gaugePressure, loop?.gaugePressureMPa),
    designFlowM3PerHour: stored("flow", values.designFlow, loop?.designFlowM3PerHour),
    designDeltaTK: stored("temperatureDifference", values.designDeltaT, loop?.designDeltaTK),
    flowCutOffM3PerHour: stored("flow", values.flowCutOff, loop?.flowCutOffM3PerHour),
    deltaTCutOffK: stored("temperatureDifference", values.deltaTCutOff, loop?.deltaTCutOffK),
    notes: values.notes.trim() || null,
  };
}

function fluidOf(values: LoopValues): Fluid {
  if (values.fluidKind === "water") return { kind: "water" };
  return {
    kind: values.fluidKind,
    // Both are checked before this is called; the server refuses a percent of 0 all the same.
    percent: values.glycolPercent ?? 0,
    basis: values.glycolBasis ?? "mass",
    testedOn: values.glycolTestedOn,
    testMethod: values.glycolTestMethod,
  };
}

/** What energy is worked out with: when and how the percentage was tested changes no figure. */
function mixtureOf(fluid: Fluid): string {
  return fluid.kind === "water" ? fluid.kind : `${fluid.kind} ${fluid.percent} ${fluid.basis}`;
}

/** A change of these recalculates the energy of readings that are already there. */
export function changesEnergy(body: ReturnType<typeof loopBody>, loop: Loop, service: LoopService) {
  return (
    service !== loop.service ||
    mixtureOf(body.fluid) !== mixtureOf(loop.fluid) ||
    body.gaugePressureMPa !== loop.gaugePressureMPa ||
    body.flowCutOffM3PerHour !== loop.flowCutOffM3PerHour ||
    body.deltaTCutOffK !== loop.deltaTCutOffK
  );
}

/** Loops that may feed this one: in use, and not fed by it. */
export function possibleParents(loops: readonly Loop[], loopId: string | null): readonly Loop[] {
  const below = new Set<string>(loopId === null ? [] : [loopId]);
  for (let grew = true; grew;) {
    grew = false;
    for (const loop of loops) {
      if (loop.parentLoopId !== null && below.has(loop.parentLoopId) && !below.has(loop.id)) {
        below.add(loop.id);
        grew = true;
      }
    }
  }
  return loops.filter((loop) => !below.has(loop.id) && loop.archivedAt === null);
}
