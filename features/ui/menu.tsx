import { useEffect, useRef, useState } from "react";
import { Pressable, View } from "react-native";

import { Button, type ButtonKind } from "./button";
import { Icon } from "./icon";
import type { IconName } from "./icon-paths";
import { Text } from "./text";
import { radius, target, useTheme, webStyle } from "./theme";
import { useRoving } from "./use-roving";

export interface MenuItem {
  key: string;
  label: string;
  icon?: IconName;
  /** Removes or stops something. */
  stop?: boolean;
  onPress: () => void;
}

export interface MenuProps {
  label: string;
  items: readonly MenuItem[];
  kind?: ButtonKind;
  icon?: IconName;
  iconOnly?: boolean;
  size?: "dense" | "default";
  align?: "left" | "right";
}

/** A button that opens a short list of actions. Arrows move, Escape closes and gives focus back. */
export function Menu(props: MenuProps) {
  const { colour, float } = useTheme();
  const [open, setOpen] = useState(false);
  const button = useRef<View>(null);
  const box = useRef<View>(null);
  const member = useRoving(props.items.length, () => undefined);

  useEffect(() => {
    if (!open) return;
    const element = box.current as unknown;
    if (element instanceof HTMLElement) {
      element.querySelector<HTMLElement>("[role=menuitem]")?.focus();
    }
    const away = (event: Event) => {
      if (
        element instanceof HTMLElement &&
        event.target instanceof Node &&
        !element.contains(event.target)
      )
        setOpen(false);
    };
    document.addEventListener("mousedown", away);
    document.addEventListener("focusin", away);
    return () => {
      document.removeEventListener("mousedown", away);
      document.removeEventListener("focusin", away);
    };
  }, [open]);

  const close = () => {
    setOpen(false);
    button.current?.focus();
  };
  return (
    <View ref={box} style={{ alignSelf: "flex-start", zIndex: open ? 50 : 0 }}>
      <Button
        ref={button}
        label={props.label}
        kind={props.kind ?? "second"}
        icon={props.icon ?? "more"}
        iconOnly={props.iconOnly}
        size={props.size}
        expanded={open}
        onPress={() => setOpen(!open)}
      />
      {open ? (
        <View
          role="menu"
          aria-label={props.label}
          style={[
            {
              position: "absolute",
              top: "100%",
              marginTop: 6,
              minWidth: 220,
              backgroundColor: colour.sheet,
              borderRadius: radius.card,
              padding: 6,
            },
            props.align === "left" ? { left: 0 } : { right: 0 },
            webStyle({ boxShadow: float }),
          ]}
        >
          {props.items.map((item, index) => {
            const arrows = member(index);
            return (
              <Pressable
                key={item.key}
                ref={arrows.ref}
                role="menuitem"
                tabIndex={index === 0 ? 0 : -1}
                {...{
                  onKeyDown: (event: { key?: string; preventDefault?: () => void }) => {
                    if (event.key === "Escape") close();
                    else arrows.onKeyDown(event);
                  },
                }}
                onPress={() => {
                  close();
                  item.onPress();
                }}
                style={{
                  minHeight: target.default,
                  paddingHorizontal: 12,
                  flexDirection: "row",
                  alignItems: "center",
                  gap: 10,
                  borderRadius: radius.field,
                }}
              >
                {item.icon ? (
                  <Icon name={item.icon} size={20} tone={item.stop ? "madder" : "ink"} />
                ) : null}
                <Text variant="nav" tone={item.stop ? "madder" : "ink"}>
                  {item.label}
                </Text>
              </Pressable>
            );
          })}
        </View>
      ) : null}
    </View>
  );
}
