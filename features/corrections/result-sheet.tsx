import { useQuery } from "@tanstack/react-query";
import { getEnergyResult } from "@shared/contracts/corrections";
import type { z } from "zod";
import { Answer } from "@features/api";
import { useFluidWords, useWords } from "@features/i18n";
import { DefinitionRows, Sheet, Stack, Table, Text, type Column } from "@features/ui";
import type { Format } from "@shared/formats/format";
import { correctionsQueries } from "./corrections-queries";

type Answered = z.output<(typeof getEnergyResult)["answer"]>;
type Day = Answered["days"][number];

/** An earlier result as it was: what it came from, and its days. */
export function ResultSheet(props: { resultId: string; format: Format; onClose: () => void }) {
  const t = useWords("corrections");
  const result = useQuery(correctionsQueries.result(props.resultId));
  return (
    <Sheet open kind="side" title={t("results.one")} onClose={props.onClose}>
      <Answer of={result} denied={t("denied")}>
        {(answer) => <Result {...answer} format={props.format} />}
      </Answer>
    </Sheet>
  );
}

function Result({ result, days, format }: Answered & { format: Format }) {
  const t = useWords("corrections");
  const fluid = useFluidWords();
  const { loop, point, files, corrections } = result;
  const rows = [
    { label: t("results.at"), value: format.dateTime(Date.parse(result.calculatedAt)) },
    { label: t("results.cause"), value: t(`cause.${result.cause}`) },
    {
      label: t("results.files"),
      value:
        files.length === 0
          ? t("results.noFiles")
          : files
              .map(({ name, rows: count, sha256 }) =>
                t("results.file", {
                  name,
                  rows: format.number(count, 0),
                  hash: sha256.slice(0, 8),
                }),
              )
              .join(", "),
    },
    {
      label: t("tab.corrections"),
      value:
        corrections.length === 0
          ? t("results.noCorrections")
          : corrections.map(({ kind }) => t(`kind.${kind}.label`)).join(", "),
    },
    { label: t("results.meterSide"), value: t(`side.${point.meterSide}`) },
    { label: t("results.fluid"), value: fluid(loop.fluid) },
    {
      label: t("results.pressure"),
      value: t(loop.pressureAssumed ? "results.pressureAssumed" : "results.pressureGiven", {
        pressure: format.number(loop.absoluteMPa, 3),
      }),
    },
    { label: t("results.version"), value: point.version, asRead: true },
    { label: t("results.engine"), value: String(result.engineVersion) },
  ];
  const runs = (["heating", "cooling"] as const).filter((name) =>
    days.some((day) => day[`${name}Kwh`] > 0),
  );
  const columns: Column<Day>[] = [
    { key: "date", header: t("results.day"), render: ({ date }) => format.day(date) },
    ...runs.map((name): Column<Day> => ({
      key: name,
      header: t(`register.${name}`),
      align: "right",
      render: (day) => format.withUnit(day[`${name}Kwh`], `${name}Energy`),
    })),
    {
      key: "covered",
      header: t("results.covered"),
      align: "right",
      render: ({ coveredS }) => format.duration(coveredS),
    },
  ];
  return (
    <Stack gap={4}>
      <DefinitionRows label={t("results.one")} rows={rows} />
      <Text variant="subhead" level={3}>
        {t("results.days")}
      </Text>
      <Table
        caption={t("results.days")}
        captionHidden
        columns={columns}
        rows={days}
        rowKey={({ date }) => date}
        card={{
          title: ({ date }) => format.day(date),
          lines: (day) => [
            ...runs.map(
              (name) =>
                `${t(`register.${name}`)} ${format.withUnit(day[`${name}Kwh`], `${name}Energy`)}`,
            ),
            t("results.coveredFor", { time: format.duration(day.coveredS) }),
          ],
        }}
        empty={<Text tone="ink2">{t("results.noDays")}</Text>}
      />
    </Stack>
  );
}
