import type { Focused } from "./panel-focus";

export type { FocusHolder, Focused } from "./panel-focus";

export function focusedNow(): Focused {
  const element = document.activeElement;
  return element instanceof HTMLElement && element !== document.body ? element : null;
}

/** Moves the focus into a panel beside the page, so that the next Tab reads on in it. */
export function focusInside(view: unknown): void {
  if (view instanceof HTMLElement) view.focus({ preventScroll: true });
}
