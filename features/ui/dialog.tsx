import { useId, type ReactNode } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";

import { Button } from "./button";
import { Overlay } from "./overlay";
import { Text } from "./text";
import { radius, useBreakpoint, useTheme, webStyle } from "./theme";

export interface DialogProps {
  open: boolean;
  /** A question that names the thing: “Lock April 2026?”. */
  title: string;
  children?: ReactNode;
  /** The verb of the question. */
  confirmLabel: string;
  onConfirm: () => void;
  onClose: () => void;
  cancelLabel?: string;
  /** Cannot be undone. */
  stop?: boolean;
  busy?: boolean;
}

/** Only for what cannot be undone; names the thing and the amount. */
export function Dialog(props: DialogProps) {
  const id = useId();
  const t = useWords("ui");
  const { colour, float } = useTheme();
  const phone = useBreakpoint() === "phone";
  if (!props.open) return null;
  return (
    <Overlay role="alertdialog" labelledBy={id} onClose={props.onClose}>
      <View
        style={[
          {
            margin: "auto",
            width: "100%",
            maxWidth: phone ? 358 : 460,
            backgroundColor: colour.sheet,
            borderRadius: radius.card,
            padding: 22,
            gap: 6,
          },
          webStyle({ boxShadow: float, maxHeight: "90vh", overflowY: "auto" }),
        ]}
      >
        <Text variant="heading" id={id}>
          {props.title}
        </Text>
        {typeof props.children === "string" ? (
          <Text tone="ink2">{props.children}</Text>
        ) : (
          props.children
        )}
        <View
          style={{
            flexDirection: "row",
            flexWrap: "wrap",
            gap: 12,
            marginTop: 12,
            justifyContent: "flex-end",
          }}
        >
          <Button
            kind="second"
            label={props.cancelLabel ?? t("dialog.cancel")}
            onPress={props.onClose}
          />
          <Button
            kind={props.stop ? "stop" : "primary"}
            label={props.confirmLabel}
            busy={props.busy}
            onPress={props.onConfirm}
          />
        </View>
      </View>
    </Overlay>
  );
}
