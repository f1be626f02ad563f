import { useRef } from "react";
import type { View } from "react-native";

/**
 * Arrow keys inside a group of which one member is in the tab order (radios, tabs, menus).
 * Returns what each member needs; the caller says what moving means.
 */
export function useRoving(count: number, onMove: (index: number) => void) {
  const members = useRef<(View | null)[]>([]);
  const go = (index: number) => {
    const next = (index + count) % count;
    onMove(next);
    members.current[next]?.focus();
  };
  return (index: number) => ({
    ref: (member: View | null) => {
      members.current[index] = member;
    },
    onKeyDown: (event: {
      nativeEvent?: { key?: string };
      key?: string;
      preventDefault?: () => void;
    }) => {
      const key = event.key ?? event.nativeEvent?.key;
      // React Native Web presses on Space only what is a button; a radio and a tab take it as well.
      if (key === " ") {
        event.preventDefault?.();
        onMove(index);
        return;
      }
      const target =
        key === "ArrowRight" || key === "ArrowDown"
          ? index + 1
          : key === "ArrowLeft" || key === "ArrowUp"
            ? index - 1
            : key === "Home"
              ? 0
              : key === "End"
                ? count - 1
                : null;
      if (target === null) return;
      event.preventDefault?.();
      go(target);
    },
  });
}
