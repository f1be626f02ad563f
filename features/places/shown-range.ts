import type { Format } from "@features/i18n";
import type { Quantity } from "@shared/domain/units/display-units";

/** Rounds towards the inside of a range at three figures, so that no shown limit is refused. */
function inward(value: number, direction: "up" | "down"): number {
  if (value === 0) return 0;
  const step = 10 ** (Math.floor(Math.log10(Math.abs(value))) - 2);
  // A limit that three figures say exactly must not move by a rounding error.
  const steps = value / step;
  const nearest = Math.round(steps);
  if (Math.abs(steps - nearest) < 1e-9 * Math.abs(steps)) return clean(nearest * step);
  return clean((direction === "up" ? Math.ceil(steps) : Math.floor(steps)) * step);
}

function clean(value: number): number {
  return Number(value.toPrecision(10));
}

/** A stored range in the unit shown, rounded inwards: 15 to 1300 mm is 0.591 to 51.1 in. */
export function shownRange(
  format: Format,
  quantity: Quantity,
  min: number,
  max: number,
): { min: number; max: number } {
  return {
    min: inward(format.toDisplay(min, quantity), "up"),
    max: inward(format.toDisplay(max, quantity), "down"),
  };
}

/** A stored value in the unit shown, without the digits arithmetic made up. */
export function shownValue(
  format: Format,
  quantity: Quantity,
  stored: number | null,
): number | null {
  return stored === null ? null : clean(format.toDisplay(stored, quantity));
}

/**
 * A typed value as stored. What was not touched goes back exactly as it came, so that opening and
 * saving a form in other units never changes a figure.
 */
export function storedValue(
  format: Format,
  quantity: Quantity,
  typed: number | null,
  before: number | null,
): number | null {
  if (typed === null) return null;
  if (before !== null && typed === shownValue(format, quantity, before)) return before;
  return format.fromDisplay(typed, quantity);
}
