import type { Format } from "@features/i18n";
import type { Quantity } from "@shared/domain/units/display-units";

/** A stored figure as the account reads it, for a Figure or a table. */
export function shownFigure(
  format: Format,
  value: number | null,
  expanded: number | null,
  quantity: Quantity,
): { value: number | null; uncertainty: number | null; unit: string } {
  const { unit, factor } = format.unit(quantity);
  return {
    value: value === null ? null : format.toDisplay(value, quantity),
    uncertainty: expanded === null ? null : expanded * factor,
    unit,
  };
}
