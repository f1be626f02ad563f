import { useQuery } from "@tanstack/react-query";
import { View } from "react-native";
import type { ImportDetail } from "@shared/contracts/imports";
import { useFormat, useWords } from "@features/i18n";
import { Text } from "@features/ui";
import { importHistoryQuery } from "./result-queries";

/** Who imported, undid and changed an import, and when; nothing until it is known. */
export function ImportHistory({ detail }: { detail: ImportDetail }) {
  const t = useWords("logs");
  const format = useFormat(detail.site.zone);
  const { data } = useQuery(importHistoryQuery(detail));
  if (!data || data.items.length === 0) return null;
  return (
    <View style={{ gap: 8 }}>
      <Text variant="subhead" level={2}>
        {t("history.title")}
      </Text>
      <View role="list" aria-label={t("history.title")} style={{ gap: 8 }}>
        {data.items.map(({ kind, by, at }) => (
          <View key={`${kind} ${at}`} role="listitem">
            <Text variant="bodyWide">{t(`history.${kind}`)}</Text>
            <Text variant="small" tone="ink2">
              {t("history.line", { name: by, at: format.dateTime(Date.parse(at)) })}
            </Text>
          </View>
        ))}
      </View>
    </View>
  );
}
