import type { PlusMinus } from "@shared/contracts/plus-minus";
import type { Quantity } from "@shared/domain/units/display-units";
import type { Format } from "@features/i18n";
import type { ShownValue } from "@features/ui";

/** A stored value and its ± in the unit of the account, ready for a figure; null stays unknown. */
export function shownFigure(
  format: Format,
  stored: number | null,
  quantity: Quantity,
  places?: number,
  plusMinus: PlusMinus | null = null,
): ShownValue {
  return {
    value: stored === null ? null : format.toDisplay(stored, quantity),
    unit: format.unit(quantity).unit,
    uncertainty: plusMinus && plusMinus.expanded * format.unit(quantity).factor,
    ...(places === undefined ? {} : { places }),
  };
}
