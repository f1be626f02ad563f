import { onlineManager } from "@tanstack/react-query";
import { useSyncExternalStore } from "react";

let offlineSinceMs: number | null = null;

function subscribe(onChange: () => void): () => void {
  return onlineManager.subscribe((online) => {
    offlineSinceMs = online ? null : Date.now();
    onChange();
  });
}

/** When the connection went, UTC ms; null while there is one. */
export function useOfflineSince(): number | null {
  return useSyncExternalStore(
    subscribe,
    () => (onlineManager.isOnline() ? null : (offlineSinceMs ??= Date.now())),
    () => null,
  );
}
