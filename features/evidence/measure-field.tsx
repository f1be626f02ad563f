import type { Quantity } from "@shared/domain/units/display-units";
import type { Format } from "@features/i18n";
import { NumberField } from "@features/ui";

const clean = (value: number) => Number(value.toPrecision(10));

/** A measured value typed in the reader's unit and held in the stored one; ranges are in the stored one. */
export function MeasureField(props: {
  label: string;
  hint?: string;
  error?: string | null;
  required?: boolean;
  format: Format;
  quantity: Quantity;
  value: number | null;
  min?: number;
  max?: number;
  onChange: (stored: number | null, readable: boolean) => void;
}) {
  const { format, quantity, value, min, max, onChange, ...field } = props;
  const shown = (stored: number) => clean(format.toDisplay(stored, quantity));
  return (
    <NumberField
      {...field}
      unit={format.unit(quantity).unit}
      value={value === null ? null : shown(value)}
      min={min === undefined ? undefined : shown(min)}
      max={max === undefined ? undefined : shown(max)}
      onChange={(typed, readable) =>
        onChange(typed === null ? null : clean(format.fromDisplay(typed, quantity)), readable)
      }
    />
  );
}
