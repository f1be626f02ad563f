import type { Actor } from "./actor";
import { placesAbilities } from "./places-policy";

/** Comparisons of meters. */
export function comparisonsAbilities(actor: Actor) {
  const { role } = actor;
  return {
    /** Whoever sees figures sees how meters compare, and may try a comparison that is not kept. */
    seeComparisons: placesAbilities(actor).seeSites,
    /** Save, correct and withdraw one. */
    editComparisons: role === "administrator" || role === "engineer",
  };
}
