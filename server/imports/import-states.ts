import type { ImportState } from "@shared/contracts/imports";

/**
 * Every move an import can make; what is not here is refused. The picture is in the contract:
 * open → reading → asking → checking → ready → importing → imported → undone.
 *
 * Readings exist from the commit that ends `importing` until the commit that makes it `undone`.
 */
export type ImportEvent =
  /** A file came, went or is to be recognised (anew); some file waits for recognition. */
  | "filesWait"
  /** No file is left. */
  | "emptied"
  /** All files are recognised and something is to be answered, or one cannot be read. */
  | "questionsOpen"
  /** All files are recognised and answered: a check is queued. */
  | "checkQueued"
  /** A check ended and a choice is still to be made. */
  | "checkUndecided"
  /** A check ended and nothing is in the way. */
  | "checkPassed"
  | "confirmed"
  /** Just before storing, another import was found to have changed what this one meets. */
  | "metAnother"
  | "stored"
  | "undone"
  | "failed"
  | "cancelled";

type Moves = Partial<Record<ImportEvent, ImportState>>;

/** What any change of files or choices may lead to while nothing is stored. */
const changes: Moves = {
  filesWait: "reading",
  emptied: "open",
  questionsOpen: "asking",
  checkQueued: "checking",
};
const stops: Moves = { failed: "failed", cancelled: "cancelled" };

const moves: Record<ImportState, Moves> = {
  open: { ...changes, ...stops },
  reading: { ...changes, ...stops },
  asking: { ...changes, ...stops },
  checking: { ...changes, ...stops, checkUndecided: "asking", checkPassed: "ready" },
  ready: { ...changes, ...stops, confirmed: "importing" },
  importing: { ...stops, stored: "imported", metAnother: "checking" },
  imported: { undone: "undone" },
  // Reopening settles the files anew, as any change does.
  undone: changes,
  failed: changes,
  cancelled: changes,
};

/** The state after the event, or null where an import in this state refuses it. */
export function nextState(state: ImportState, event: ImportEvent): ImportState | null {
  return moves[state][event] ?? null;
}

/** Files, recipes and choices may be changed. */
export function isEditable(state: ImportState): boolean {
  return state !== "importing" && moves[state].cancelled !== undefined;
}

/** It ended without readings and can be taken up again. */
export function isReopenable(state: ImportState): boolean {
  return state === "undone" || state === "failed" || state === "cancelled";
}

export function isCancellable(state: ImportState): boolean {
  return moves[state].cancelled !== undefined;
}
