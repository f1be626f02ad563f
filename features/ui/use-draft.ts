import { useCallback, useEffect, useState } from "react";
import { draftStore } from "./draft-store";

export interface Draft<Values> {
  readonly values: Values;
  readonly set: (changes: Partial<Values>) => void;
  /** Forgets what was typed: after saving, or when it is thrown away. */
  readonly clear: () => void;
  /** Typed values of an earlier visit are on screen, not the stored ones. */
  readonly resumed: boolean;
}

/**
 * A form's values, kept as typed so that a reload or a wrong Back loses nothing.
 * @param key names the form and the thing it edits; another key starts afresh.
 */
export function useDraft<Values extends object>(key: string, initial: Values): Draft<Values> {
  const storageKey = `loopwright.draft.${key}`;
  const [start] = useState(() => read<Values>(storageKey));
  const [changes, setChanges] = useState<Partial<Values>>(start);
  const [cleared, setCleared] = useState(false);

  useEffect(() => {
    if (cleared || Object.keys(changes).length === 0) draftStore.clear(storageKey);
    else draftStore.write(storageKey, JSON.stringify(changes));
  }, [changes, cleared, storageKey]);

  const set = useCallback((next: Partial<Values>) => {
    setCleared(false);
    setChanges((before) => ({ ...before, ...next }));
  }, []);
  const clear = useCallback(() => {
    setCleared(true);
    setChanges({});
    draftStore.clear(storageKey);
  }, [storageKey]);
  return {
    values: { ...initial, ...changes },
    set,
    clear,
    resumed: !cleared && Object.keys(start).length > 0,
  };
}

function read<Values>(key: string): Partial<Values> {
  const kept = draftStore.read(key);
  if (kept === null) return {};
  try {
    const parsed: unknown = JSON.parse(kept);
    // Only this hook writes the key, always as an object of the form's own values.
    return typeof parsed === "object" && parsed !== null ? (parsed as Partial<Values>) : {};
  } catch (error) {
    if (error instanceof SyntaxError) return {};
    throw error;
  }
}
