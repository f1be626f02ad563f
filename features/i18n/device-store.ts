/**
 * Small choices kept on this device (theme, language). A browser may refuse storage; then the choice
 * lasts as long as the page, which is the best that can be had, and nothing else breaks.
 */
const memory = new Map<string, string>();

export function readDevice(key: string): string | null {
  const kept = memory.get(key);
  if (kept !== undefined) return kept;
  try {
    return globalThis.localStorage?.getItem(key) ?? null;
  } catch {
    return null;
  }
}

export function writeDevice(key: string, value: string): void {
  memory.set(key, value);
  try {
    globalThis.localStorage?.setItem(key, value);
  } catch {
    // Storage is full or refused: the choice is in `memory` for this visit.
  }
}
