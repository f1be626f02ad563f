import type { ComparedSide, MeterSide } from "@shared/contracts/meter-comparisons";
import {
  registerAdvance,
  type RegisterProblem,
  type RegisterReads,
} from "@shared/domain/readings/register-advance";
import { toKwh } from "@shared/domain/units/energy-and-power";
import { M3_PER } from "@shared/domain/units/size-and-pressure";
import { Invalid } from "@server/http/errors";
import { claimedPercents, knownTo } from "./meter-claim";

type RegisterSide = Extract<MeterSide, { kind: "register" }>;
type TypedSide = Extract<MeterSide, { kind: "typed" }>;

const REMEDIES: Readonly<Record<RegisterProblem, readonly [code: string, message: string]>> = {
  closingBelowOpening: [
    "register-fell",
    "The closing read is below the opening one. Check both; if the register rolled over, say so and give its digits; if the meter was exchanged, compare each meter over its own time.",
  ],
  digitsNeeded: ["digits-needed", "Give the digits before the decimal mark."],
  moreThanDigits: ["more-than-digits", "A read has more digits than the register."],
  didNotRollOver: [
    "did-not-roll-over",
    "The closing read is not below the opening one, so it did not roll over once.",
  ],
};

/**
 * Figures of a meter from two reads of its registers.
 * @param at where in the body the side stands
 * @throws Invalid (422) at the closing read or the digits where the reads give no difference.
 */
export function registerSide(side: RegisterSide, at: "first" | "second"): ComparedSide {
  const percents = claimedPercents(side.claim);
  const energyKwh = toKwh(passed(side.energy, `${at}/energy`), side.energy.unit);
  const volumeM3 = side.volume && passed(side.volume, `${at}/volume`) * M3_PER[side.volume.unit];
  return {
    kind: "register",
    name: side.serial,
    energyKwh: knownTo(energyKwh, percents.energy),
    volumeM3: volumeM3 === null ? null : knownTo(volumeM3, percents.volume),
    deltaTK: side.deltaTK === null ? null : knownTo(side.deltaTK, percents.deltaT),
    limits: percents.limits,
    point: null,
  };
}

function passed(reads: RegisterReads, path: string): number {
  const found = registerAdvance(reads);
  if (found.ok) return found.advance;
  const [code, message] = REMEDIES[found.problem];
  const field = found.problem === "digitsNeeded" ? "digits" : "closing";
  throw Invalid.field(`${path}/${field}`, code, message);
}

export function typedSide(side: TypedSide): ComparedSide {
  return {
    kind: "typed",
    name: side.name,
    energyKwh: knownTo(side.energyKwh, side.expandedPercent),
    volumeM3: side.volumeM3 === null ? null : knownTo(side.volumeM3, side.volumePercent),
    deltaTK: side.deltaTK === null ? null : knownTo(side.deltaTK, side.deltaTPercent),
    limits: null,
    point: null,
  };
}
