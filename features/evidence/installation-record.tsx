import { View } from "react-native";
import type { Installation } from "@shared/contracts/evidence";
import { useWords, type Format } from "@features/i18n";
import { Card, DefinitionRows, Text, useBreakpoint, type Definition } from "@features/ui";

type Rows = (Definition | null)[];

/** The installation as it was read on site, section by section; what nobody said is left out. */
export function InstallationRecord(props: { installation: Installation; format: Format }) {
  const t = useWords("installation");
  const phone = useBreakpoint() === "phone";
  const { installation } = props;
  const sections: [title: string, rows: Rows][] = [
    [t("pipe.title"), usePipeRows(props)],
    [t("position.title"), usePositionRows(props)],
    [t("meter.title"), useMeterRows(props)],
    [t("plate.title"), usePlateRows(props)],
    [t("probes.title"), useProbeRows(props)],
    [t("logger.title"), useLoggerRows(props)],
  ];
  const filled = sections
    .map(([title, rows]) => [title, rows.filter((row) => row !== null)] as const)
    .filter(([, rows]) => rows.length > 0);
  return (
    <Card label={t("asRecorded")}>
      <View style={{ flexDirection: "row", flexWrap: "wrap", gap: 20 }}>
        {filled.map(([title, rows]) => (
          <View key={title} style={{ width: phone ? "100%" : "47%", minWidth: 260, flexGrow: 1 }}>
            <DefinitionRows title={title} rows={rows} />
          </View>
        ))}
        {filled.length === 0 ? <Text tone="ink2">{t("nothingSaid")}</Text> : null}
        {installation.notes ? <Text style={{ width: "100%" }}>{installation.notes}</Text> : null}
      </View>
    </Card>
  );
}

interface RowProps {
  readonly installation: Installation;
  readonly format: Format;
}

function read(label: string, value: string | null): Definition | null {
  return value === null ? null : { label, value, asRead: true };
}

function usePipeRows({ installation, format }: RowProps): Rows {
  const t = useWords("installation");
  const { pipe, bore, enteredBoreMm } = installation;
  const mm = (value: number | null | undefined, places = 2) =>
    value == null ? null : format.withUnit(value, "pipeSize", places);
  return [
    read(t("pipe.circumference"), mm(pipe?.circumferenceMm, 1)),
    read(t("pipe.outside"), mm(pipe?.outsideDiameterMm)),
    read(
      t("pipe.walls"),
      pipe ? pipe.wallReadingsMm.map((wall) => format.number(wall, 2)).join("  ") : null,
    ),
    pipe && pipe.liningMm > 0 ? read(t("pipe.lining"), mm(pipe.liningMm)) : null,
    bore
      ? {
          label: t("pipe.bore"),
          value: `${mm(bore.insideDiameterMm, 4)} ± ${mm(2 * bore.uncertaintyMm)}`,
        }
      : null,
    read(t("pipe.entered"), mm(enteredBoreMm)),
  ];
}

function usePositionRows({ installation, format }: RowProps): Rows {
  const t = useWords("installation");
  const words = useWords("evidence");
  const { straightRun, boreUsedMm } = installation;
  if (straightRun === null) return [];
  const run = (metres: number) =>
    boreUsedMm === null
      ? format.withUnit(metres, "distance", 2)
      : `${format.withUnit(metres, "distance", 2)}, ${format.number((1000 * metres) / boreUsedMm, 3)} D`;
  return [
    read(t("position.upstream"), run(straightRun.upstreamM)),
    read(t("position.downstream"), run(straightRun.downstreamM)),
    { label: t("position.fitting"), value: words(`fitting.${straightRun.nearestFitting}`) },
  ];
}

function useMeterRows({ installation, format }: RowProps): Rows {
  const t = useWords("installation");
  const { instruments, zero, soundSpeed, zeroLPerS, correctedFlowLPerS, shownFlowLPerS } =
    installation;
  const litres = (value: number | null, places: number) =>
    value === null ? null : `${format.number(value, places)} L/s`;
  const speed = (value: number | null | undefined, places: number) =>
    value == null ? null : format.withUnit(value, "velocity", places);
  const zeroRead = speed(zero?.readingMPerS, 3);
  return [
    read(t("meter.meter"), instruments.flowMeter?.serial ?? null),
    read(t("meter.shown"), litres(shownFlowLPerS, 2)),
    correctedFlowLPerS === null
      ? null
      : { label: t("meter.corrected"), value: litres(correctedFlowLPerS, 4) },
    zero
      ? {
          label: t("zero.stopped"),
          value: t(zero.flowStopped ? "zero.yes" : "zero.no"),
        }
      : null,
    read(
      t("zero.reading"),
      zeroRead === null
        ? null
        : [zeroRead, litres(zeroLPerS, 5)].filter((part) => part !== null).join(", "),
    ),
    zero ? { label: t("zero.action"), value: t(`zero.actions.${zero.action}`) } : null,
    read(t("sound.displayed"), speed(soundSpeed?.displayedMPerS, 0)),
    read(
      t("sound.fluidC"),
      soundSpeed ? format.withUnit(soundSpeed.fluidC, "temperature", 1) : null,
    ),
  ];
}

function usePlateRows({ installation, format }: RowProps): Rows {
  const t = useWords("installation");
  const { meterPlate, plateTerm } = installation;
  if (meterPlate === null) return [];
  const { accuracyClass, permanentFlowM3PerHour, minimumDeltaTK, certificate } = meterPlate;
  const places = (value: number) => (Number.isInteger(value) ? 0 : 1);
  return [
    read(t("plate.class"), `${accuracyClass}`),
    read(
      t("plate.flow"),
      permanentFlowM3PerHour === null
        ? null
        : `${format.number(permanentFlowM3PerHour, places(permanentFlowM3PerHour))} m³/h`,
    ),
    read(
      t("plate.deltaT"),
      minimumDeltaTK === null ? null : `${format.number(minimumDeltaTK, places(minimumDeltaTK))} K`,
    ),
    read(t("plate.certificate"), certificate?.number ?? null),
    plateTerm && {
      label: t("plate.result"),
      value: `± ${format.number(plateTerm.expandedPercent, 2)} %`,
    },
  ];
}

function useProbeRows({ installation, format }: RowProps): Rows {
  const t = useWords("installation");
  const { probes, instruments, bathCheckUsed } = installation;
  if (probes === null) return [];
  const side = (which: "supply" | "return") => {
    const { mounting, depthMm, insulated } = probes[which];
    const serial = instruments[which === "supply" ? "supplyProbe" : "returnProbe"]?.serial ?? "";
    const words = [
      serial,
      t(`probes.mountings.${mounting}`),
      depthMm === null ? null : format.withUnit(depthMm, "pipeSize", 0),
      insulated ? t("probes.insulated") : t("probes.notInsulated"),
    ];
    return { label: t(`probes.${which}`), value: words.filter(Boolean).join(", ") };
  };
  return [
    side("supply"),
    side("return"),
    {
      label: t("probes.check"),
      value:
        bathCheckUsed === null
          ? t("probes.noCheck")
          : t("probes.checkOf", {
              day: format.day(bathCheckUsed.checkedOn, "dayMonthYear"),
              mean: format.withUnit(bathCheckUsed.meanDifferenceK, "temperatureDifference", 3),
            }),
    },
  ];
}

function useLoggerRows({ installation, format }: RowProps): Rows {
  const t = useWords("installation");
  const { instruments, clocks, fluidTestedOn } = installation;
  const seconds = (value: number | null) => (value === null ? "—" : `${format.number(value, 0)} s`);
  return [
    read(t("logger.logger"), instruments.logger?.serial ?? null),
    ...clocks.map(({ loggerSerial, startOffsetS, endOffsetS }) => ({
      label: t("clock.row", { serial: loggerSerial }),
      value: t("clock.offsets", { start: seconds(startOffsetS), end: seconds(endOffsetS) }),
    })),
    fluidTestedOn === null
      ? null
      : { label: t("fluid.testedOn"), value: format.day(fluidTestedOn, "dayMonthYear") },
  ];
}
