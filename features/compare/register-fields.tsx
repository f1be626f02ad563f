import { useWords } from "@features/i18n";
import { CheckField, FieldRow, NumberField, SelectField } from "@features/ui";
import type { RegisterValues } from "./comparison-values";

/** Two reads of one register, with what the plate says of it. */
export function RegisterFields<Unit extends string>(props: {
  label: string;
  value: RegisterValues;
  unit: Unit;
  units: readonly { value: Unit; label: string }[];
  onChange: (value: RegisterValues) => void;
  onUnit: (unit: Unit) => void;
  /** What the server refused, by the field's name. */
  errorOf: (field: string) => string | null;
}) {
  const t = useWords("compare");
  const { label, value, errorOf } = props;
  const set = (changed: Partial<RegisterValues>) => props.onChange({ ...value, ...changed });
  const unit = props.units.find((one) => one.value === props.unit)?.label;
  const fell = value.opening !== null && value.closing !== null && value.closing < value.opening;
  return (
    <>
      <FieldRow>
        <NumberField
          label={`${label}: ${t("register.opening")}`}
          value={value.opening}
          onChange={(opening) => set({ opening })}
          unit={unit}
          min={0}
          error={errorOf("opening")}
          required
        />
        <NumberField
          label={`${label}: ${t("register.closing")}`}
          value={value.closing}
          onChange={(closing) => set({ closing })}
          unit={unit}
          min={0}
          error={errorOf("closing")}
          required
        />
      </FieldRow>
      <FieldRow>
        <SelectField
          label={`${label}: ${t("register.unit")}`}
          value={props.unit}
          options={props.units}
          onChange={props.onUnit}
        />
        <NumberField
          label={`${label}: ${t("register.multiplier")}`}
          hint={t("register.multiplierHint")}
          value={value.multiplier}
          onChange={(multiplier) => set({ multiplier })}
          min={0}
          error={errorOf("multiplier")}
        />
      </FieldRow>
      {fell || value.rolledOver ? (
        <>
          <CheckField
            label={t("register.rolledOver")}
            checked={value.rolledOver}
            onChange={(rolledOver) => set({ rolledOver })}
          />
          {value.rolledOver ? (
            <NumberField
              label={`${label}: ${t("register.digits")}`}
              hint={t("register.digitsHint")}
              value={value.digits}
              onChange={(digits, readable) => set({ digits: readable ? digits : null })}
              min={1}
              max={12}
              whole
              error={errorOf("digits")}
            />
          ) : null}
        </>
      ) : null}
    </>
  );
}
