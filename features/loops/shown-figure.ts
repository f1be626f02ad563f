import type { Quantity } from "@shared/domain/units/display-units";
import type { Format } from "@features/i18n";
import type { ShownValue } from "@features/ui";

/** A stored value in the unit of the account, ready for a figure; null stays unknown. */
export function shownFigure(
  format: Format,
  stored: number | null,
  quantity: Quantity,
  places?: number,
): ShownValue {
  return {
    value: stored === null ? null : format.toDisplay(stored, quantity),
    unit: format.unit(quantity).unit,
    ...(places === undefined ? {} : { places }),
  };
}
