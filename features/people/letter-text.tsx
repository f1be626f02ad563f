import { Linking, View } from "react-native";

import { Text, TextLink, webStyle } from "@features/ui";

const address = /(https?:\/\/\S+)/;

/** A letter's plain text, line for line, with its links to press. */
export function LetterText({ text }: { text: string }) {
  // Every second part is what the pattern caught: the links.
  const parts = text.trim().split(address);
  return (
    <View style={{ marginTop: 12, gap: 8 }}>
      {parts.map((part, index) =>
        index % 2 === 1 ? (
          <TextLink
            key={index}
            variant="bodyWide"
            label={withoutSecret(part)}
            onPress={() => void Linking.openURL(part)}
          />
        ) : part.trim() === "" ? null : (
          <Text key={index} variant="bodyWide" style={webStyle({ whiteSpace: "pre-wrap" })}>
            {part.trim()}
          </Text>
        ),
      )}
    </View>
  );
}

/** The secret works, but need not stand readable on a screen that is shared or photographed. */
function withoutSecret(link: string): string {
  return link.replace(/#.+$/, "#…");
}
