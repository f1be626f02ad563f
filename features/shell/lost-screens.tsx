import type { ErrorBoundaryProps } from "expo-router";
import { View } from "react-native";

import { useWords } from "@features/i18n";
import { Button, EmptyState, ErrorState, Screen } from "@features/ui";

/** An address that leads nowhere. */
export function NotFoundScreen() {
  const t = useWords("shell");
  return (
    <Screen title={t("lost.title")} narrow>
      <EmptyState
        title={t("lost.heading")}
        detail={t("lost.detail")}
        action={<Button label={t("lost.home")} href="/" />}
      />
    </Screen>
  );
}

/** A page that broke while drawing: says what was seen, and offers to try again or leave. */
export function CrashScreen({ error, retry }: ErrorBoundaryProps) {
  const t = useWords("shell");
  return (
    <View role="main" style={{ width: "100%", maxWidth: 560, margin: "auto", padding: 16 }}>
      <ErrorState
        title={t("crash.title")}
        seen={error.message}
        actions={<Button label={t("lost.home")} href="/" />}
        onRetry={() => void retry()}
      />
    </View>
  );
}
