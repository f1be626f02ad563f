import { useQuery } from "@tanstack/react-query";
import { View } from "react-native";
import { correctionsPaths } from "@features/corrections/corrections-paths";
import { useFormat, useWords } from "@features/i18n";
import { TextLink } from "@features/ui";
import type { Correction } from "@shared/contracts/corrections";
import type { ImportDetail } from "@shared/contracts/imports";
import { correctionsOfPointQuery } from "./imports-queries";
import { SideRows } from "./side-rows";

/** What was chosen in the checks, as the corrections it became, each with what it changed. */
export function CorrectionsMade({ detail }: { detail: ImportDetail }) {
  const t = useWords("findings");
  const format = useFormat(detail.site.zone);
  const query = useQuery(correctionsOfPointQuery(detail.point.id));
  const made = (query.data?.items ?? []).filter(({ importId }) => importId === detail.id);
  if (made.length === 0) return null;
  const worth = ({ state, effect }: Correction): string => {
    if (state === "withdrawn") return t("made.withdrawn");
    if (effect === null) return t("worth.unknown");
    const cooling = effect.after.coolingKwh - effect.before.coolingKwh;
    const heating = effect.after.heatingKwh - effect.before.heatingKwh;
    const isCooling = Math.abs(cooling) >= Math.abs(heating);
    const kwh = isCooling ? cooling : heating;
    const size = format.withUnit(Math.abs(kwh), isCooling ? "coolingEnergy" : "heatingEnergy");
    if (Math.abs(kwh) < LEAST_KWH) return t("worth.none");
    return t(kwh > 0 ? "worth.more" : "worth.less", { energy: size });
  };
  const place = { siteId: detail.site.id, loopId: detail.loop.id, pointId: detail.point.id };
  return (
    <View style={{ gap: 8 }}>
      <SideRows
        title={t("made.title", { count: made.length })}
        rows={made.map((correction) => ({
          key: correction.id,
          label: t(`made.kind.${correction.change.kind}`),
          value: worth(correction),
        }))}
      />
      <TextLink label={t("made.open")} href={correctionsPaths.corrections(place)} />
    </View>
  );
}

/** Less than this is no change anybody could see, kWh. */
const LEAST_KWH = 0.005;
