import { View } from "react-native";
import Svg from "react-native-svg";
import { useId } from "react";
import { useFormat, useWords } from "@features/i18n";
import { QualityPatterns, QualityRect, Text, useTheme, type Quality } from "@features/ui";
import type { ImportChecks } from "@shared/contracts/import-checks";

/** Rows by what became of them; the sum is what the logger's step would have given. */
export function RowCounts(props: { rows: ImportChecks["rows"]; withoutTemperature: number }) {
  const { rows, withoutTemperature } = props;
  const t = useWords("imports");
  const format = useFormat();
  const { colour } = useTheme();
  const lines: readonly (readonly [label: string, count: number, quality: Quality | null])[] = [
    [t("checks.measured"), rows.measured, "measured"],
    [t("checks.excluded"), rows.excluded, "excluded"],
    [t("checks.noReading"), rows.noReading, null],
    [t("checks.missing"), rows.missing, "missing"],
  ];
  return (
    <View role="list" aria-label={t("checks.rowsTitle")} style={{ marginTop: 12 }}>
      {lines.map(([label, count, quality]) => (
        <View
          key={label}
          role="listitem"
          style={{
            flexDirection: "row",
            alignItems: "center",
            gap: 12,
            minHeight: 40,
            borderTopWidth: 1,
            borderTopColor: colour.rule,
          }}
        >
          <QualitySwatch quality={quality} />
          <View style={{ flex: 1 }}>
            <Text variant="bodyWide">{label}</Text>
          </View>
          <Text variant="asReadM">{format.number(count, 0)}</Text>
        </View>
      ))}
      <View
        role="listitem"
        style={{
          flexDirection: "row",
          alignItems: "center",
          minHeight: 44,
          borderTopWidth: 2,
          borderTopColor: colour.ink,
        }}
      >
        <View style={{ flex: 1 }}>
          <Text variant="subhead" level="none">
            {t("checks.expected")}
          </Text>
        </View>
        <Text variant="asReadM">{format.number(rows.expected, 0)}</Text>
      </View>
      {withoutTemperature > 0 ? (
        <View role="listitem">
          <Text variant="small" tone="ink2">
            {`${t("checks.withoutTemperature")}: ${format.number(withoutTemperature, 0)}`}
          </Text>
        </View>
      ) : null}
    </View>
  );
}

function QualitySwatch({ quality }: { quality: Quality | null }) {
  const id = useId().replace(/:/g, "");
  return (
    <View aria-hidden style={{ width: 22 }}>
      {quality ? (
        <Svg width={22} height={12}>
          <QualityPatterns id={id} />
          <QualityRect id={id} quality={quality} x={0.6} y={0.6} width={20.8} height={10.8} />
        </Svg>
      ) : null}
    </View>
  );
}
