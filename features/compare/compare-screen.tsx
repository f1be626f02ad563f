import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { MeterComparisonLine } from "@shared/contracts/meter-comparisons";
import { Answer } from "@features/api";
import { makeFormat, useFormat, useWords } from "@features/i18n";
import {
  Button,
  Card,
  CheckField,
  Chip,
  EmptyState,
  MarkedText,
  Screen,
  Table,
  Text,
  useBreakpoint,
  type Column,
} from "@features/ui";
import { comparePaths } from "./compare-paths";
import { compareQueries } from "./compare-queries";
import { verdictMarks } from "./compare-words";

/** What there is to compare: so far, meters with each other. */
export function CompareScreen() {
  const t = useWords("compare");
  const { old } = useLocalSearchParams<{ old?: string }>();
  const withOld = old === "yes";
  const answer = useQuery(compareQueries.meters(withOld));
  const add = <Button icon="plus" label={t("meters.add")} href={comparePaths.newMeters()} />;
  const mayTry = answer.data !== undefined;
  return (
    <Screen title={t("title")} subtitle={t("lead")} actions={mayTry ? add : null}>
      <Answer of={answer} denied={t("denied")}>
        {({ items }) => (
          <View style={{ gap: 16 }}>
            {items.length === 0 ? (
              <EmptyState title={t("meters.none")} detail={t("meters.noneDetail")} />
            ) : (
              <View style={{ gap: 12 }}>
                <Text variant="heading">{t("meters.title")}</Text>
                <ComparisonsTable items={items} withOld={withOld} />
              </View>
            )}
            <CheckField
              label={t("meters.showOld")}
              checked={withOld}
              onChange={(on) => router.setParams({ old: on ? "yes" : undefined })}
            />
          </View>
        )}
      </Answer>
    </Screen>
  );
}

function ComparisonsTable(props: { items: readonly MeterComparisonLine[]; withOld: boolean }) {
  const t = useWords("compare");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const { language, unitSystem } = format;
  const period = ({ from, to, zone }: MeterComparisonLine) => {
    const local = makeFormat(language, unitSystem, zone);
    return `${local.dateTime(Date.parse(from))} – ${local.dateTime(Date.parse(to))}`;
  };
  const energy = ({ name, energyKwh }: MeterComparisonLine["first"]) =>
    `${name}: ${format.figure(energyKwh.value, energyKwh.expanded, "heatingEnergy")}`;
  const verdict = ({ verdict: code, errorsCancel }: MeterComparisonLine) => (
    <MarkedText kind={errorsCancel ? "look" : verdictMarks[code]} variant="table">
      {t(errorsCancel ? "verdictShort.errorsCancel" : `verdictShort.${code}`)}
    </MarkedText>
  );
  const state = (row: MeterComparisonLine) =>
    row.state === "stands" ? null : <Chip tone="line" label={t(`state.${row.state}`)} />;
  const en = (row: MeterComparisonLine) => (row.en === null ? "—" : format.number(row.en, 2));
  const columns: Column<MeterComparisonLine>[] = [
    { key: "title", header: t("column.title"), render: ({ title }) => title },
    { key: "site", header: t("column.site"), render: ({ siteName }) => siteName },
    { key: "period", header: t("column.period"), wideOnly: true, render: period },
    {
      key: "first",
      header: t("column.first"),
      wideOnly: true,
      render: (row) => energy(row.first),
    },
    {
      key: "second",
      header: t("column.second"),
      wideOnly: true,
      render: (row) => energy(row.second),
    },
    { key: "result", header: t("column.result"), render: verdict },
    { key: "en", header: t("result.en"), align: "right", render: en },
    ...(props.withOld ? [{ key: "state", header: t("column.state"), render: state }] : []),
  ];
  const table = (
    <Table
      caption={t("meters.title")}
      captionHidden
      columns={columns}
      rows={props.items}
      rowKey={({ id }) => id}
      href={({ id }) => comparePaths.meters(id)}
      card={{
        title: ({ title }) => title,
        figure: (row) => (row.en === null ? null : `${t("result.en")} ${en(row)}`),
        lines: (row) => [
          `${row.siteName}, ${period(row)}`,
          energy(row.first),
          energy(row.second),
          verdict(row),
          state(row),
        ],
      }}
    />
  );
  return phone ? table : <Card pad={0}>{table}</Card>;
}
