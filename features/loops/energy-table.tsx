import { useQuery } from "@tanstack/react-query";
import { useState } from "react";

import type { PlusMinus } from "@shared/contracts/plus-minus";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { FailedAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, LoadingBlocks, Stack, Table, type Column } from "@features/ui";

import { energyTableRows, totalRow, type EnergyTableRow } from "./energy-table-rows";
import type { LoopFigures } from "./loop-context";
import { loopsQueries } from "./loops-queries";
import { energyQuantity, registersOf, type RegisterName } from "./register-words";

const rowsAtOnce = 100;

/** The chart's data as rows of days or hours, with their sum. */
export function EnergyTable(props: LoopFigures & { step: "day" | "hour" }) {
  const { point, range, step } = props;
  const answer = useQuery(loopsQueries.energy(point.id, range, step));
  const t = useWords("loops");
  const [shown, setShown] = useState(rowsAtOnce);
  const columns = useEnergyColumns(props, step);
  if (answer.data === undefined)
    return answer.error ? (
      <FailedAnswer error={answer.error} onRetry={() => void answer.refetch()} />
    ) : (
      <LoadingBlocks blocks={[{ width: "100%", height: 380 }]} />
    );
  const { columns: data, totals } = answer.data;
  if (data === null) return null;
  // The server expects nothing of the time to come; neither does a row.
  const expectedUntilMs = Date.parse(answer.data.from) + totals.expectedS * 1000;
  const rows = energyTableRows(data, expectedUntilMs);
  const total = totalRow(totals, rows, data);
  return (
    <Stack gap={3}>
      <Table<EnergyTableRow>
        caption={t("table.caption", { range: props.rangeName })}
        captionHidden
        columns={columns.all}
        rows={rows.slice(0, shown)}
        rowKey={(row) => row.key}
        total={total}
        totalLabel={t("table.total")}
        card={columns.card}
      />
      {shown < rows.length ? (
        <Button
          kind="second"
          size="dense"
          label={t("table.more", { count: Math.min(rowsAtOnce, rows.length - shown) })}
          onPress={() => setShown(shown + rowsAtOnce)}
        />
      ) : null}
    </Stack>
  );
}

/** The ± of a row's energy: of days and of their sum; an hour has none of its own here. */
function plusMinusOf(
  { summary }: LoopFigures,
  row: EnergyTableRow,
  step: "day" | "hour",
  register: RegisterName,
): PlusMinus | null {
  if (row.startMs === null) return summary.plusMinus[register].energy;
  if (step === "hour") return null;
  const date = localDateOf(row.startMs, summary.zone);
  return summary.days.find((day) => day.date === date)?.plusMinus[register] ?? null;
}

function useEnergyColumns(props: LoopFigures, step: "day" | "hour") {
  const { loop, format } = props;
  const t = useWords("loops");
  const registers = registersOf(loop.service);
  const name = (row: EnergyTableRow) => {
    if (row.startMs === null) return t("table.total");
    const day = format.date(row.startMs, "weekdayDay");
    return step === "day" ? day : `${day}, ${format.time(row.startMs)}`;
  };
  const read = (value: number | null, quantity: "temperature" | "flow", places: number) =>
    format.number(value === null ? null : format.toDisplay(value, quantity), places);
  const worked = (value: number | null, quantity: "temperatureDifference" | "volume") =>
    format.number(
      value === null ? null : format.toDisplay(value, quantity),
      quantity === "volume" ? undefined : 2,
    );
  const leftOut = (row: EnergyTableRow) =>
    row.missingS === 0 ? t("table.nothing") : format.duration(row.missingS);
  const all: Column<EnergyTableRow>[] = [
    { key: "time", header: t(`table.${step}`), render: name },
    {
      key: "supply",
      header: t("table.supply"),
      unit: format.unit("temperature").unit,
      align: "right",
      asRead: (row) => read(row.supplyC, "temperature", 2),
    },
    {
      key: "return",
      header: t("table.return"),
      unit: format.unit("temperature").unit,
      align: "right",
      asRead: (row) => read(row.returnC, "temperature", 2),
    },
    {
      key: "deltaT",
      header: "ΔT",
      unit: format.unit("temperatureDifference").unit,
      align: "right",
      render: (row) => worked(row.deltaTK, "temperatureDifference"),
    },
    {
      key: "flow",
      header: t("table.flow"),
      unit: format.unit("flow").unit,
      align: "right",
      asRead: (row) => read(row.flowM3PerHour, "flow", 1),
    },
    {
      key: "volume",
      header: t("table.volume"),
      unit: format.unit("volume").unit,
      align: "right",
      wideOnly: true,
      render: (row) => worked(row.volumeM3, "volume"),
    },
    ...registers.map((register): Column<EnergyTableRow> => ({
      key: register,
      header: registers.length === 1 ? t("table.energy") : t(`table.${register}`),
      unit: format.unit(energyQuantity[register]).unit,
      figure: (row) => {
        const kwh = row.kwh[register];
        const known = plusMinusOf(props, row, step, register);
        return {
          value: kwh === null ? null : format.toDisplay(kwh, energyQuantity[register]),
          uncertainty: known && known.expanded * format.unit(energyQuantity[register]).factor,
        };
      },
    })),
    { key: "leftOut", header: t("table.leftOut"), render: leftOut },
  ];
  const energies = (row: EnergyTableRow) =>
    registers
      .map((register) =>
        format.figure(
          row.kwh[register],
          plusMinusOf(props, row, step, register)?.expanded ?? null,
          energyQuantity[register],
        ),
      )
      .join(" · ");
  const card = {
    title: name,
    figure: energies,
    lines: (row: EnergyTableRow) => [
      t("table.cardLine", {
        supply: format.withUnit(row.supplyC, "temperature", 2),
        return: format.withUnit(row.returnC, "temperature", 2),
        deltaT: format.withUnit(row.deltaTK, "temperatureDifference", 2),
      }),
      t("table.cardFlow", {
        flow: format.withUnit(row.flowM3PerHour, "flow", 1),
        leftOut: leftOut(row),
      }),
    ],
  };
  return { all, card };
}
