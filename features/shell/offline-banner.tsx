import { View } from "react-native";

import { useOfflineSince } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Banner, layout, useBreakpoint } from "@features/ui";

/** Says since when there is no connection, and what that means, above every page. */
export function OfflineBanner() {
  const t = useWords("shell");
  const format = useFormat();
  const since = useOfflineSince();
  const { margin } = layout[useBreakpoint()];
  if (since === null) return null;
  return (
    <View style={{ paddingHorizontal: margin, paddingTop: 12 }}>
      <Banner
        kind="note"
        icon="offline"
        live
        lead={t("offline.since", { time: format.time(since) })}
      >
        {t("offline.meaning")}
      </Banner>
    </View>
  );
}
