import type { ReactNode } from "react";
import { StyleSheet, Text } from "react-native";

/** Words for screen readers only. */
export function VisuallyHidden({ children, id }: { children: ReactNode; id?: string }) {
  return (
    <Text id={id} style={styles.hidden}>
      {children}
    </Text>
  );
}

const styles = StyleSheet.create({
  hidden: {
    position: "absolute",
    width: 1,
    height: 1,
    margin: -1,
    overflow: "hidden",
    opacity: 0.01,
  },
});
