import { View } from "react-native";

import { useWords } from "@features/i18n";

import { UnitSuffix } from "./field-frame";
import { Text } from "./text";
import { radius, target, useTheme } from "./theme";

export interface WorkedOutFieldProps {
  label: string;
  /** As shown; null while it cannot be worked out. */
  value: string | null;
  unit?: string;
  /** “Worked out” by default; say from what where it helps. */
  hint?: string;
}

/** A value the form works out: filled and without a border, so nobody tries to type into it. */
export function WorkedOutField({ label, value, unit, hint }: WorkedOutFieldProps) {
  const { colour } = useTheme();
  const t = useWords("ui");
  return (
    <View style={{ gap: 6 }}>
      <Text variant="fieldLabel">{label}</Text>
      <View
        style={{
          flexDirection: "row",
          minHeight: target.default,
          borderRadius: radius.field,
          backgroundColor: colour.well,
          paddingLeft: 14,
        }}
      >
        <View style={{ flex: 1, justifyContent: "center" }} role="status">
          <Text variant="asReadL">{value ?? "—"}</Text>
        </View>
        {unit ? <UnitSuffix unit={unit} /> : null}
      </View>
      <Text variant="small" tone="ink3">
        {hint ?? t("field.workedOut")}
      </Text>
    </View>
  );
}
