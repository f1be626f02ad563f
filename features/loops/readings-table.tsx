import { useInfiniteQuery } from "@tanstack/react-query";

import type { getReadings } from "@shared/contracts/energy";
import type { z } from "zod";
import { FailedAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, LoadingBlocks, Stack, Table, Text, type Column } from "@features/ui";

import type { LoopFigures } from "./loop-context";
import { loopsQueries } from "./loops-queries";
import { powerQuantity } from "./register-words";

type Reading = z.infer<(typeof getReadings)["answer"]>["items"][number];

/** The readings themselves, a page at a time. */
export function ReadingsTable(props: LoopFigures) {
  const { point, range } = props;
  const t = useWords("loops");
  const answer = useInfiniteQuery(loopsQueries.readings(point.id, range));
  const columns = useReadingColumns(props);
  if (answer.data === undefined)
    return answer.error ? (
      <FailedAnswer error={answer.error} onRetry={() => void answer.refetch()} />
    ) : (
      <LoadingBlocks blocks={[{ width: "100%", height: 380 }]} />
    );
  const rows = answer.data.pages.flatMap((page) => page.items);
  return (
    <Stack gap={3}>
      <Table<Reading>
        caption={t("table.readingsCaption", { range: props.rangeName })}
        captionHidden
        columns={columns.all}
        rows={rows}
        rowKey={(row) => row.at}
        card={columns.card}
        tone={(row) => (row.quality === "excluded" ? "wrong" : null)}
        empty={<Text tone="ink2">{t("table.noReadings")}</Text>}
      />
      {answer.hasNextPage ? (
        <Button
          kind="second"
          size="dense"
          label={t("table.moreReadings")}
          busy={answer.isFetchingNextPage}
          onPress={() => void answer.fetchNextPage()}
        />
      ) : null}
    </Stack>
  );
}

function useReadingColumns({ format }: LoopFigures) {
  const t = useWords("loops");
  const time = (row: Reading) => {
    const at = Date.parse(row.at);
    return `${format.date(at)}, ${format.time(at, at % 60_000 !== 0)}`;
  };
  const shown = (value: number | null, quantity: "temperature" | "flow", places: number) =>
    format.number(value === null ? null : format.toDisplay(value, quantity), places);
  const power = ({ powerKw }: Reading) =>
    powerKw === null
      ? "—"
      : format.withUnit(Math.abs(powerKw), powerQuantity[powerKw < 0 ? "cooling" : "heating"], 1);
  const quality = (row: Reading) => t(`table.quality.${row.quality}`);
  const all: Column<Reading>[] = [
    { key: "time", header: t("table.time"), render: time },
    {
      key: "supply",
      header: t("table.supply"),
      unit: format.unit("temperature").unit,
      align: "right",
      asRead: (row) => shown(row.supplyC, "temperature", 2),
    },
    {
      key: "return",
      header: t("table.return"),
      unit: format.unit("temperature").unit,
      align: "right",
      asRead: (row) => shown(row.returnC, "temperature", 2),
    },
    {
      key: "flow",
      header: t("table.flow"),
      unit: format.unit("flow").unit,
      align: "right",
      asRead: (row) => shown(row.flowM3PerHour, "flow", 2),
    },
    { key: "power", header: t("table.power"), align: "right", render: power },
    { key: "quality", header: t("table.row"), render: quality },
  ];
  const card = {
    title: time,
    figure: power,
    lines: (row: Reading) => [
      t("table.readingLine", {
        supply: format.withUnit(row.supplyC, "temperature", 2),
        return: format.withUnit(row.returnC, "temperature", 2),
        flow: format.withUnit(row.flowM3PerHour, "flow", 2),
      }),
      row.quality === "measured" ? null : quality(row),
    ],
  };
  return { all, card };
}
