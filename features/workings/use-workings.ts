import { useLocalSearchParams, useRouter } from "expo-router";
import { useCallback, useEffect, useRef } from "react";

import { dropHistoryEntry, onHistoryBack, pushHistoryEntry } from "./history-entry";
import { readWorkingsKey, writeWorkingsKey, type WorkingsKey } from "./workings-key";

export interface OpenWorkings {
  /** The figure whose workings are open; null while none are. */
  readonly open: WorkingsKey | null;
  readonly isOpen: (key: WorkingsKey) => boolean;
  readonly show: (key: WorkingsKey) => void;
  readonly close: () => void;
  /** What a figure takes to open its workings and to be marked while they are. */
  readonly figure: (key: WorkingsKey) => {
    readonly onOpenWorkings: () => void;
    readonly workingsOpen: boolean;
  };
}

/** The open workings as the address says them: they can be linked, and Back closes them. */
export function useWorkings(): OpenWorkings {
  const router = useRouter();
  const { workings } = useLocalSearchParams<{ workings?: string }>();
  const open = readWorkingsKey(workings);
  const isAsked = open !== null;
  const closing = useRef(false);

  useEffect(() => {
    if (!isAsked) return;
    return onHistoryBack(() => router.setParams({ workings: undefined }));
  }, [isAsked, router]);

  // The address must have changed before the entry under it may be left.
  useEffect(() => {
    if (isAsked || !closing.current) return;
    closing.current = false;
    dropHistoryEntry();
  }, [isAsked]);

  const show = useCallback(
    (key: WorkingsKey) => {
      if (!isAsked) pushHistoryEntry();
      router.setParams({ workings: writeWorkingsKey(key) });
    },
    [isAsked, router],
  );
  const close = useCallback(() => {
    // Closed by Back already: the entry under the workings is where we are.
    if (!isAsked) return;
    closing.current = true;
    router.setParams({ workings: undefined });
  }, [isAsked, router]);
  const isOpen = (key: WorkingsKey) => workings === writeWorkingsKey(key);
  return {
    open,
    isOpen,
    show,
    close,
    figure: (key) => ({ onOpenWorkings: () => show(key), workingsOpen: isOpen(key) }),
  };
}
