import { View } from "react-native";

import type { ReactNode } from "react";

export interface FormElementProps {
  label: string;
  onSubmit: () => void;
  children: ReactNode;
}

export function FormElement({ children }: FormElementProps) {
  return <View>{children}</View>;
}
