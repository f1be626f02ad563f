import { View } from "react-native";
import type { Installation } from "@shared/contracts/evidence";
import { useWords, type Format } from "@features/i18n";
import { Chip, ListRow, Text } from "@features/ui";
import { evidencePaths } from "./evidence-paths";
import { whenOf } from "./when-of";

/** Every version of every installation of the point, newest first; each can be read. */
export function VersionList(props: {
  items: readonly Installation[];
  shown: Installation | null;
  format: Format;
  params: { siteId: string; loopId: string; pointId: string };
}) {
  const t = useWords("installation");
  const { items, shown, format, params } = props;
  if (items.length === 0) return null;
  const at = whenOf(format);
  return (
    <View style={{ gap: 4 }}>
      <Text variant="heading">{t("history")}</Text>
      {items.map((one, index) => (
        <ListRow
          key={one.id}
          first={index === 0}
          title={t("historyRow", { from: at(one.startsAt), version: one.version })}
          detail={[
            t("recordedBy", { name: one.recordedBy, when: at(one.recordedAt) }),
            one.reason ? t("because", { reason: one.reason }) : null,
          ]
            .filter(Boolean)
            .join(" ")}
          trail={<State installation={one} isShown={one.id === shown?.id} />}
          href={evidencePaths.evidence(params.siteId, params.loopId, params.pointId, one.id)}
        />
      ))}
    </View>
  );
}

function State({ installation, isShown }: { installation: Installation; isShown: boolean }) {
  const t = useWords("installation");
  if (isShown) return <Chip tone="picked" label={t("shown")} />;
  if (installation.withdrawnAt !== null) return <Chip tone="line" label={t("withdrawnChip")} />;
  if (installation.supersededAt !== null) return <Chip tone="line" label={t("supersededChip")} />;
  return <Chip label={t("standsChip")} />;
}
