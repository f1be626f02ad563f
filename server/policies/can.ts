import type { Actor } from "./actor";
import { comparisonsAbilities } from "./comparisons-policy";
import { evidenceAbilities } from "./evidence-policy";
import { logsAbilities } from "./logs-policy";
import { peopleAbilities } from "./people-policy";
import { placesAbilities } from "./places-policy";
import { recipesAbilities } from "./recipes-policy";

/**
 * Everything somebody may or may not do, as named sentences: `can(actor).importLogs`. Abilities that
 * hang on a record are functions of it: `can(actor).editMember(member)`. To add a family: write
 * `x-policy.ts` beside this file and spread it here.
 */
export function can(actor: Actor) {
  return {
    ...placesAbilities(actor),
    ...logsAbilities(actor),
    ...recipesAbilities(actor),
    ...evidenceAbilities(actor),
    ...comparisonsAbilities(actor),
    ...peopleAbilities(actor),
  };
}

export type Abilities = ReturnType<typeof can>;

/** The names of the plain yes-or-no abilities. */
export type AbilityName = {
  [Name in keyof Abilities]: Abilities[Name] extends boolean ? Name : never;
}[keyof Abilities];
