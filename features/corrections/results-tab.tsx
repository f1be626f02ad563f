import { useQuery } from "@tanstack/react-query";
import { useRouter } from "expo-router";
import type { EnergyResult } from "@shared/contracts/corrections";
import { Answer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Button,
  Card,
  Chip,
  EmptyState,
  Row,
  Stack,
  Table,
  Text,
  type Column,
  type RowCard,
} from "@features/ui";
import type { Format } from "@shared/formats/format";
import type { PlaceProps } from "./corrections-screen";
import { correctionsQueries } from "./corrections-queries";
import { ResultSheet } from "./result-sheet";

interface Listed {
  readonly result: EnergyResult;
  /** Against the result before; null for the first. */
  readonly change: { readonly heatingKwh: number; readonly coolingKwh: number } | null;
}

/** Every result the point's energy has had, with why it was worked out and what that changed. */
export function ResultsTab(props: PlaceProps & { openId: string | undefined }) {
  const { site, point, openId } = props;
  const t = useWords("corrections");
  const router = useRouter();
  const format = useFormat(site.zone, site.unitSystem);
  const results = useQuery(correctionsQueries.results(point.id));
  return (
    <Answer of={results} denied={t("denied")}>
      {({ items }) =>
        items.length === 0 ? (
          <EmptyState title={t("results.none")} detail={t("results.noneDetail")} />
        ) : (
          <Stack gap={4}>
            <Text tone="ink2">{t("results.lead")}</Text>
            <ResultsTable
              rows={listed(items)}
              format={format}
              onOpen={(result) => router.setParams({ result })}
            />
            {openId === undefined ? null : (
              <ResultSheet
                resultId={openId}
                format={format}
                onClose={() => router.setParams({ result: undefined })}
              />
            )}
          </Stack>
        )
      }
    </Answer>
  );
}

function listed(items: readonly EnergyResult[]): Listed[] {
  return items.map((result, index) => {
    const before = items[index + 1];
    const less = (now: number | null, then: number | null) => (now ?? 0) - (then ?? 0);
    return {
      result,
      change: before
        ? {
            heatingKwh: less(result.heatingKwh, before.heatingKwh),
            coolingKwh: less(result.coolingKwh, before.coolingKwh),
          }
        : null,
    };
  });
}

function ResultsTable(props: {
  rows: readonly Listed[];
  format: Format;
  onOpen: (resultId: string) => void;
}) {
  const { rows, format, onOpen } = props;
  const t = useWords("corrections");
  const at = ({ result }: Listed) => format.dateTime(Date.parse(result.calculatedAt));
  const runs = (["heating", "cooling"] as const).filter((name) =>
    rows.some(({ result }) => (result[`${name}Kwh`] ?? 0) > 0),
  );
  const changeOf = ({ change }: Listed, name: (typeof runs)[number]) => {
    if (change === null) return "";
    const kwh = change[`${name}Kwh`];
    // “±0” would read as an uncertainty.
    if (kwh === 0) return t("results.unchanged");
    const sign = kwh > 0 ? "+" : "−";
    return `${sign}${format.withUnit(Math.abs(kwh), `${name}Energy`)}`;
  };
  const energyOf = ({ result }: Listed, name: (typeof runs)[number]) =>
    format.withUnit(result[`${name}Kwh`], `${name}Energy`);
  const open = (row: Listed) => (
    <Button
      kind="second"
      size="dense"
      label={t("results.open")}
      said={t("results.openSaid", { at: at(row) })}
      onPress={() => onOpen(row.result.id)}
    />
  );
  const current = ({ result }: Listed) =>
    result.isCurrent ? (
      <Row>
        <Chip label={t("results.current")} tone="picked" />
      </Row>
    ) : null;
  const columns: Column<Listed>[] = [
    { key: "at", header: t("results.at"), render: at },
    {
      key: "cause",
      header: t("results.cause"),
      render: ({ result }) => t(`cause.${result.cause}`),
    },
    ...runs.flatMap((name): Column<Listed>[] => [
      {
        key: name,
        header: t(`register.${name}`),
        align: "right",
        render: (row) => energyOf(row, name),
      },
      {
        key: `${name}Change`,
        header: t("results.change"),
        align: "right",
        render: (row) => changeOf(row, name),
        wideOnly: true,
      },
    ]),
    { key: "current", header: t("results.state"), render: current, wideOnly: true },
    { key: "open", header: t("results.way"), render: open, width: 120 },
  ];
  const card: RowCard<Listed> = {
    title: at,
    lines: (row) => [
      t(`cause.${row.result.cause}`),
      ...runs.map(
        (name) => `${t(`register.${name}`)} ${energyOf(row, name)} ${changeOf(row, name)}`,
      ),
      current(row),
      open(row),
    ],
  };
  return (
    <Card pad={0}>
      <Table
        caption={t("tab.results")}
        captionHidden
        columns={columns}
        rows={rows}
        rowKey={({ result }) => result.id}
        card={card}
      />
    </Card>
  );
}
