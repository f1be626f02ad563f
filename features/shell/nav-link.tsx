import { Link } from "expo-router";
import { Pressable, View } from "react-native";

import { useWords } from "@features/i18n";
import { Icon, layout, target, Text } from "@features/ui";

import { navItems, type Destination } from "./nav-items";

/** One destination: icon beside label on wide rails, over it elsewhere. */
export function NavLink(props: {
  destination: Destination;
  on: boolean;
  form: "wide" | "narrow" | "bar";
}) {
  const { destination, on, form } = props;
  const t = useWords("shell");
  const item = navItems[destination];
  return (
    <Link href={item.href} asChild>
      <Pressable role="link" aria-current={on ? "page" : undefined}>
        <NavFace icon={item.icon} label={t(`nav.${destination}`)} on={on} form={form} />
      </Pressable>
    </Link>
  );
}

export function NavFace(props: {
  icon: Parameters<typeof Icon>[0]["name"];
  label: string;
  on: boolean;
  form: "wide" | "narrow" | "bar";
}) {
  const { on, form } = props;
  const tone = on ? "ink" : "ink2";
  if (form === "wide") {
    return (
      <View
        style={{
          minHeight: target.default,
          flexDirection: "row",
          alignItems: "center",
          gap: 12,
          paddingLeft: 14,
        }}
      >
        <Icon name={props.icon} size={22} tone={tone} />
        <Text variant={on ? "navOn" : "nav"} tone={tone}>
          {props.label}
        </Text>
      </View>
    );
  }
  return (
    <View
      style={{
        minHeight: form === "bar" ? layout.phone.bottomBar : 64,
        alignItems: "center",
        justifyContent: "center",
        gap: 3,
        paddingBottom: form === "bar" ? 4 : 0,
      }}
    >
      <Icon name={props.icon} size={24} tone={tone} />
      <Text variant={on ? "barLabelOn" : "barLabel"} tone={tone}>
        {props.label}
      </Text>
    </View>
  );
}
