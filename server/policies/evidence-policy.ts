import type { Actor } from "./actor";
import { placesAbilities } from "./places-policy";

/** Instruments, certificates, bath checks and how points were measured. */
export function evidenceAbilities(actor: Actor) {
  const { role } = actor;
  return {
    /** Whoever sees a figure sees what stands behind it. */
    seeEvidence: placesAbilities(actor).seeSites,
    /** Add to the kit, record and correct how a point was measured. */
    editEvidence: role === "administrator" || role === "surveyor" || role === "engineer",
  };
}
