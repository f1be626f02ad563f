import type { Actor } from "./actor";
import { placesAbilities } from "./places-policy";

/** Log files, their import and what comes of it. */
export function logsAbilities(actor: Actor) {
  const { role, accountId } = actor;
  const works = role === "administrator" || role === "surveyor" || role === "engineer";
  return {
    /** Files, recipes, their rows and repairs. */
    seeLogs: placesAbilities(actor).seeSites,
    /** Bring in a logger's files and answer the wizard's questions. */
    importLogs: works,
    /** Undo an import: one's own; an administrator anybody's, or a leaver's could never go. */
    undoImport: (log: { importedByAccountId: string | null }): boolean =>
      role === "administrator" || (works && log.importedByAccountId === accountId),
    /** Mark stretches of readings and propose fills. */
    correctReadings: works,
    /** Accept a proposed fill so that it counts in a bill. */
    approveFills: role === "administrator" || role === "engineer",
    /** Intervals, totals and cleaned readings, on screen and as files. */
    seeEnergy: placesAbilities(actor).seeSites,
  };
}
