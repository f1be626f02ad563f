import { useEffect, useRef, type KeyboardEvent } from "react";
import { createPortal } from "react-dom";

import type { OverlayProps } from "./overlay";
import { useTheme } from "./theme";

const focusable =
  'a[href],button:not([disabled]),input:not([disabled]):not([type=hidden]),select:not([disabled]),textarea:not([disabled]),[tabindex="0"]';

/** Above everything: focus moves in, stays in, and goes back to where it came from; Escape closes. */
export function Overlay({ labelledBy, role, onClose, foot, children }: OverlayProps) {
  const { colour } = useTheme();
  const box = useRef<HTMLDivElement>(null);

  useEffect(() => {
    const before = document.activeElement;
    const scroll = document.body.style.overflow;
    document.body.style.overflow = "hidden";
    const inside = box.current;
    // A field that asked for focus keeps it.
    if (inside && !inside.contains(document.activeElement)) inside.focus();
    return () => {
      document.body.style.overflow = scroll;
      if (before instanceof HTMLElement) before.focus();
    };
  }, []);

  const keep = (event: KeyboardEvent) => {
    if (event.key === "Escape") {
      event.stopPropagation();
      onClose();
      return;
    }
    if (event.key !== "Tab" || !box.current) return;
    const members = [...box.current.querySelectorAll<HTMLElement>(focusable)].filter(
      (member) => member.tabIndex >= 0 && member.getAttribute("aria-hidden") !== "true",
    );
    const first = members[0];
    const last = members[members.length - 1];
    const active = document.activeElement;
    if (!first || !last) {
      event.preventDefault();
    } else if (event.shiftKey && (active === first || active === box.current)) {
      event.preventDefault();
      last.focus();
    } else if (!event.shiftKey && active === last) {
      event.preventDefault();
      first.focus();
    }
  };

  return createPortal(
    <div
      style={{
        position: "fixed",
        inset: `0 0 ${foot ?? 0}px 0`,
        zIndex: 100,
        display: "flex",
        background: colour.scrim,
      }}
    >
      <div
        ref={box}
        role={role}
        aria-modal="true"
        aria-labelledby={labelledBy}
        tabIndex={-1}
        data-programmatic-focus
        onKeyDown={keep}
        onMouseDown={(event) => {
          if (event.target === event.currentTarget) onClose();
        }}
        // A box of its own: what is laid out as “contents” cannot take the focus.
        style={{ display: "flex", flex: 1, minWidth: 0, minHeight: 0 }}
      >
        {children}
      </div>
    </div>,
    document.body,
  );
}
