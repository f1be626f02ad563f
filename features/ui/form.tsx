import type { ReactNode } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";

import { Banner } from "./banner";
import { FormElement } from "./primitives/form-element";
import { useBreakpoint } from "./theme";

export interface FormProps {
  label: string;
  /** Enter in any field, or a submit Button. */
  onSubmit: () => void;
  /** What the server or our checks refused, said once at the top. */
  errors?: readonly string[];
  children: ReactNode;
}

export function Form({ label, onSubmit, errors = [], children }: FormProps) {
  const t = useWords("ui");
  return (
    <FormElement label={label} onSubmit={onSubmit}>
      <View style={{ gap: 16 }}>
        {errors.length > 0 ? (
          <Banner kind="wrong" live lead={errors.length === 1 ? undefined : t("form.several")}>
            {errors.join(" ")}
          </Banner>
        ) : null}
        {children}
      </View>
    </FormElement>
  );
}

/** Fields beside each other from tablet up, under each other on a phone. */
export function FieldRow({ children }: { children: ReactNode }) {
  const phone = useBreakpoint() === "phone";
  return (
    <View
      style={{
        flexDirection: phone ? "column" : "row",
        gap: phone ? 16 : 12,
        alignItems: "stretch",
      }}
    >
      {Array.isArray(children)
        ? children.map((child, index) =>
            child ? (
              <View key={index} style={phone ? null : { flex: 1, minWidth: 0 }}>
                {child}
              </View>
            ) : null,
          )
        : children}
    </View>
  );
}

/** A named group of fields. */
export function FieldGroup({ title, children }: { title: string; children: ReactNode }) {
  return (
    <View role="group" aria-label={title} style={{ gap: 14 }}>
      {children}
    </View>
  );
}
