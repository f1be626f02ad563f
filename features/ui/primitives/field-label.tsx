import { Text } from "react-native";

import { typeScale, useTheme } from "../theme";

export interface FieldLabelProps {
  htmlFor: string;
  id: string;
  children: string;
}

export function FieldLabel({ id, children }: FieldLabelProps) {
  const { colour } = useTheme();
  return (
    <Text nativeID={id} style={[typeScale.fieldLabel, { color: colour.ink }]}>
      {children}
    </Text>
  );
}
