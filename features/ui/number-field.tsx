import { useState } from "react";

import { useFormat, useWords } from "@features/i18n";

import { FieldFrame, UnitSuffix, type FieldProps } from "./field-frame";
import { TextInputPrimitive } from "./primitives/text-input";
import { readTypedNumber } from "./read-number";

export interface NumberFieldProps extends FieldProps {
  /** In the unit shown; null while empty or unreadable. */
  value: number | null;
  /** `readable` is false while what is typed is not a number or is out of range. */
  onChange: (value: number | null, readable: boolean) => void;
  unit?: string;
  min?: number;
  max?: number;
  whole?: boolean;
  placeholder?: string;
  autoFocus?: boolean;
  onBlur?: () => void;
}

/** A number typed as text: comma or point, checked against its range when left. */
export function NumberField(props: NumberFieldProps) {
  const t = useWords("ui");
  const format = useFormat();
  const grouping = format.language === "de" ? "." : ",";
  const [state, setState] = useState(() => ({
    typed: written(props.value, format.language),
    reported: props.value,
    seen: props.value,
  }));
  const [left, setLeft] = useState(false);
  // A value set from outside (a draft, a change of unit) replaces what is typed; the echo of our own
  // report, and a parent that ignores an unreadable entry, leave it alone.
  if (!Object.is(props.value, state.seen)) {
    const echo = Object.is(props.value, state.reported);
    const typed = echo ? state.typed : written(props.value, format.language);
    setState({ typed, reported: props.value, seen: props.value });
  }
  const shown = readTypedNumber(state.typed, grouping);

  const problem = (): string | null => {
    if (shown.kind === "unreadable") return t("number.unreadable");
    if (shown.kind === "empty") return null;
    if (props.whole && !Number.isInteger(shown.value)) return t("number.whole");
    return rangeProblem(shown.value);
  };
  const rangeProblem = (value: number): string | null => {
    const { min, max } = props;
    const unit = props.unit ? `\u00A0${props.unit}` : "";
    const say = (n: number) => `${written(n, format.language).replace("-", "−")}${unit}`;
    const under = min !== undefined && value < min;
    const over = max !== undefined && value > max;
    if (!under && !over) return null;
    if (min !== undefined && max !== undefined) {
      return t("number.between", { min: say(min), max: say(max) });
    }
    return under
      ? t("number.atLeast", { min: say(min) })
      : t("number.atMost", { max: say(max ?? 0) });
  };

  return (
    <FieldFrame
      {...props}
      error={props.error ?? (left ? problem() : null)}
      suffix={props.unit ? <UnitSuffix unit={props.unit} /> : undefined}
    >
      {(wiring) => (
        <TextInputPrimitive
          id={wiring.id}
          name={props.name}
          value={state.typed}
          kind="decimal"
          variant="asReadL"
          onChange={(text) => {
            const next = readTypedNumber(text, grouping);
            const value = next.kind === "number" ? next.value : null;
            setState((before) => ({ ...before, typed: text, reported: value }));
            const wholeOk = !props.whole || value === null || Number.isInteger(value);
            const readable = next.kind !== "unreadable" && wholeOk && inRange(value, props);
            props.onChange(value, readable);
          }}
          onFocus={wiring.onFocus}
          onBlur={() => {
            wiring.onBlur();
            setLeft(true);
            props.onBlur?.();
          }}
          autoComplete="off"
          autoFocus={props.autoFocus}
          placeholder={props.placeholder}
          labelledBy={wiring.labelId}
          describedBy={wiring.describedBy}
          invalid={wiring.invalid}
          required={props.required ?? false}
          disabled={props.disabled ?? false}
        />
      )}
    </FieldFrame>
  );
}

function inRange(value: number | null, range: { min?: number; max?: number }): boolean {
  if (value === null) return true;
  return value >= (range.min ?? -Infinity) && value <= (range.max ?? Infinity);
}

/** As typed: no thousands, the language's decimal mark, and no digits that arithmetic made up. */
function written(value: number | null, language: "en" | "de"): string {
  if (value === null || Number.isNaN(value)) return "";
  const text = String(Number(value.toPrecision(10)));
  return language === "de" ? text.replace(".", ",") : text;
}
