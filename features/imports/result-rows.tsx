import { View } from "react-native";
import type { ImportChecks } from "@shared/contracts/import-checks";
import type { ImportDetail } from "@shared/contracts/imports";
import { saveFile } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { ListRow, Text, useTheme } from "@features/ui";
import { problemRowsAddress } from "./result-queries";
import { RowCounts } from "./row-counts";
import { rowsOfFiles } from "./rows-left-out";

/** Rows read, used, excluded and left out by reason, and all that had a problem as a file. */
export function ResultRows({ detail, checks }: { detail: ImportDetail; checks: ImportChecks }) {
  const t = useWords("logs");
  const ofImports = useWords("imports");
  const { language } = useFormat();
  const { read, leftOut, because } = rowsOfFiles(checks, detail.repair);
  return (
    <View>
      <Text variant="subhead" level={2}>
        {ofImports("result.rows")}
      </Text>
      <View role="list" aria-label={ofImports("result.rows")} style={{ marginTop: 12 }}>
        <CountRow label={t("rows.read")} count={read} />
        {leftOut > 0 || because.length > 0 ? (
          <CountRow label={t("rows.leftOut")} count={leftOut} />
        ) : null}
        {because.map(({ reason, count }) => (
          <CountRow key={reason} label={t(`rows.${reason}`)} count={count} small />
        ))}
      </View>
      <RowCounts rows={checks.rows} withoutTemperature={checks.rowsWithoutTemperature} />
      <View style={{ marginTop: 12 }}>
        <ListRow
          icon="download"
          title={t("rows.download")}
          detail={t("rows.downloadHint")}
          onPress={() => saveFile(problemRowsAddress(detail.id, language))}
        />
      </View>
    </View>
  );
}

function CountRow(props: { label: string; count: number; small?: boolean }) {
  const format = useFormat();
  const { colour } = useTheme();
  return (
    <View
      role="listitem"
      style={{
        flexDirection: "row",
        alignItems: "center",
        gap: 12,
        minHeight: props.small ? 32 : 40,
        paddingLeft: props.small ? 20 : 0,
        borderTopWidth: props.small ? 0 : 1,
        borderTopColor: colour.rule,
      }}
    >
      <View style={{ flex: 1 }}>
        <Text variant={props.small ? "small" : "bodyWide"} tone={props.small ? "ink2" : "ink"}>
          {props.label}
        </Text>
      </View>
      <Text variant={props.small ? "asReadS" : "asReadM"}>{format.number(props.count, 0)}</Text>
    </View>
  );
}
