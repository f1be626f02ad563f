import { useId, useState, type ReactNode } from "react";
import { View } from "react-native";

import { Mark } from "./mark";
import { FieldLabel } from "./primitives/field-label";
import { Row } from "./stack";
import { Text } from "./text";
import { radius, target, useTheme } from "./theme";
import { VisuallyHidden } from "./visually-hidden";

/** What every field takes: the label is not optional. */
export interface FieldProps {
  label: string;
  /** Said but not shown, where a table head or a title above shows it already. */
  labelHidden?: boolean;
  /** Brass edge: the choice waits for a look. */
  attention?: boolean;
  hint?: string;
  /** What is wrong and what would be right; null or absent when nothing is. */
  error?: string | null;
  required?: boolean;
  disabled?: boolean;
  size?: "default" | "field";
  id?: string;
  name?: string;
}

interface FrameProps extends FieldProps {
  suffix?: ReactNode;
  tall?: boolean;
  flush?: boolean;
  children: (wiring: FieldWiring) => ReactNode;
}

export interface FieldWiring {
  readonly id: string;
  readonly labelId: string;
  readonly describedBy: string | undefined;
  readonly invalid: boolean;
  readonly onFocus: () => void;
  readonly onBlur: () => void;
}

/** Label above, box with focus border, hint or error below, all wired to each other by id. */
export function FieldFrame(props: FrameProps) {
  const made = useId();
  const { colour } = useTheme();
  const [focused, setFocused] = useState(false);
  const id = props.id ?? made;
  const labelId = `${id}-label`;
  const noteId = `${id}-note`;
  const invalid = Boolean(props.error);
  const edge = focused ? 3 : invalid || props.attention ? 2 : 1.5;
  const note = props.error ?? props.hint;
  const label = (
    <FieldLabel htmlFor={id} id={labelId}>
      {props.label}
    </FieldLabel>
  );
  const resting = invalid ? colour.madder : props.attention ? colour.brassMid : colour.ruleStrong;
  return (
    <View style={{ gap: 6, flexShrink: 1, minWidth: 0 }}>
      {props.labelHidden ? <VisuallyHidden>{label}</VisuallyHidden> : label}
      <View
        style={{
          flexDirection: "row",
          alignItems: "stretch",
          minHeight: props.size === "field" ? 60 : target.default,
          borderWidth: edge,
          borderColor: focused ? colour.mark : resting,
          borderRadius: radius.field,
          backgroundColor: props.disabled ? colour.well : colour.sheet,
          paddingLeft: props.flush ? 0 : 15.5 - edge,
          paddingVertical: props.tall ? 10 : 0,
          overflow: "hidden",
        }}
      >
        {props.children({
          id,
          labelId,
          describedBy: note ? noteId : undefined,
          invalid,
          onFocus: () => setFocused(true),
          onBlur: () => setFocused(false),
        })}
        {props.suffix}
      </View>
      {note ? <FieldNote id={noteId} error={props.error} hint={props.hint} /> : null}
    </View>
  );
}

export function FieldNote(props: { id: string; error?: string | null; hint?: string }) {
  if (props.error) {
    return (
      <Row gap={1} align="flex-start">
        <Mark kind="wrong" size={15} silent />
        <Text variant="small" tone="madder" id={props.id} style={{ flex: 1 }}>
          {props.error}
        </Text>
      </Row>
    );
  }
  return (
    <Text variant="small" tone="ink3" id={props.id}>
      {props.hint}
    </Text>
  );
}

/** The unit behind its divider at the right of a field. */
export function UnitSuffix({ unit }: { unit: string }) {
  const { colour } = useTheme();
  return (
    <View
      style={{
        justifyContent: "center",
        paddingHorizontal: 12,
        borderLeftWidth: 1,
        borderLeftColor: colour.rule,
      }}
    >
      <Text variant="unit" tone="ink2">
        {unit}
      </Text>
    </View>
  );
}
