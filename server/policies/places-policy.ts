import type { Actor } from "./actor";

/** Sites, buildings, loops and metering points. */
export function placesAbilities({ role }: Actor) {
  const works = role === "administrator" || role === "surveyor" || role === "engineer";
  return {
    /** Sites, loops, energy and its workings. A tenant contact sees their own statements only. */
    seeSites: works || role === "billingClerk",
    /** Sites, buildings and loops. */
    editSites: role === "administrator" || role === "engineer",
    /** Metering points: also the surveyor's, who stands in front of the pipe. */
    editPoints: works,
  };
}
