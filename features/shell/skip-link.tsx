import { useState } from "react";
import { Pressable } from "react-native";

import { useWords } from "@features/i18n";
import { radius, space, Text, useTheme, webStyle } from "@features/ui";

/** First in the tab order: over the navigation straight to the page. Shows while focused. */
export function SkipLink() {
  const t = useWords("shell");
  const { colour } = useTheme();
  const [focused, setFocused] = useState(false);
  return (
    <Pressable
      role="link"
      onFocus={() => setFocused(true)}
      onBlur={() => setFocused(false)}
      onPress={() => document.getElementById("main")?.focus()}
      style={[
        {
          left: space[4],
          padding: space[3],
          borderRadius: radius.button,
          backgroundColor: colour.ink,
        },
        webStyle({ position: "fixed", top: focused ? 12 : -80, zIndex: 200 }),
      ]}
    >
      <Text variant="button" tone="onInk">
        {t("skip")}
      </Text>
    </Pressable>
  );
}
