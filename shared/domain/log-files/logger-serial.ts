import { preambleFacts, type FactKind, type PreambleEntry } from "./preamble-facts";

/** Whose serial tells one file's logger from another's, the best first; a probe's never does. */
const KINDS: readonly FactKind[] = ["loggerSerial", "serial", "meterSerial"];
const SERIAL = /^[\p{L}\p{N}][\p{L}\p{N}./_-]{1,59}$/u;

/**
 * The serial number of the logger or meter that wrote a file, where a line above the header names
 * one; null where none does. Example: `Serial number: LG-0712` gives `LG-0712`.
 */
export function loggerSerial(preamble: readonly PreambleEntry[]): string | null {
  const facts = preambleFacts(preamble);
  for (const wanted of KINDS) {
    const fact = facts.find(({ kind, cell }) => kind === wanted && SERIAL.test(cell.trim()));
    if (fact) return fact.cell.trim();
  }
  return null;
}
