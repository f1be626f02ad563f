import { typeScale, useTheme } from "../theme";

import { cssType } from "./css-type";
import type { FieldLabelProps } from "./field-label";

export function FieldLabel({ htmlFor, id, children }: FieldLabelProps) {
  const { colour } = useTheme();
  return (
    <label
      htmlFor={htmlFor}
      id={id}
      style={{ ...cssType(typeScale.fieldLabel), color: colour.ink }}
    >
      {children}
    </label>
  );
}
