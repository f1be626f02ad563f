import { View } from "react-native";
import type { Instrument, Placement } from "@shared/contracts/evidence";
import { useFormat, useWords } from "@features/i18n";
import { Card, Chip, LoopTag, Row, Table, Text, useBreakpoint, type Column } from "@features/ui";
import { CalibrationBar } from "./calibration-bar";
import { bySoonest, certificateToday, lifeScaleOf } from "./calibration-life";
import { CalibrationWords } from "./calibration-words";
import { kitPaths } from "./kit-paths";
import { nameOf, useUncertaintyWords } from "./kit-words";

interface KitTableProps {
  readonly instruments: readonly Instrument[];
  readonly today: string;
}

/** Instruments, soonest to run out first, their calibration lives on one time scale. */
export function KitTable({ instruments, today }: KitTableProps) {
  const t = useWords("kit");
  const format = useFormat();
  const uncertainty = useUncertaintyWords();
  const phone = useBreakpoint() === "phone";
  const scale = lifeScaleOf(instruments, today);
  const rows = [...instruments].sort(bySoonest(today));
  const certified = (instrument: Instrument) => {
    const certificate = certificateToday(instrument, today);
    return certificate === null ? t("calibration.none") : uncertainty(instrument.kind, certificate);
  };
  const bar = (instrument: Instrument) => <CalibrationBar instrument={instrument} scale={scale} />;
  const ends = (instrument: Instrument) => (
    <CalibrationWords instrument={instrument} today={today} />
  );
  const columns: Column<Instrument>[] = [
    {
      key: "name",
      header: t("instrument.title"),
      render: (instrument) => nameOf(instrument),
      width: 110,
    },
    {
      key: "kind",
      header: t("instrument.kind"),
      render: (instrument) => (
        <View>
          <Text variant="table">{t(`kind.${instrument.kind}`)}</Text>
          <Text variant="unit" tone="ink2">
            {t("instrument.serialIs", { serial: instrument.serial })}
          </Text>
        </View>
      ),
    },
    {
      key: "certificate",
      header: t("rangeAndCertificate"),
      wideOnly: true,
      render: (instrument) => (
        <View>
          {instrument.range ? <Text variant="table">{instrument.range}</Text> : null}
          {certified(instrument) === null ? null : (
            <Text variant="table" tone={instrument.range ? "ink2" : "ink"}>
              {certified(instrument)}
            </Text>
          )}
        </View>
      ),
    },
    {
      key: "life",
      header: t("calibration.scale", {
        from: format.date(scale.firstDay * 86_400_000, "dayMonthYear"),
        to: format.date(scale.lastDay * 86_400_000, "dayMonthYear"),
      }),
      render: bar,
      width: 240,
    },
    { key: "ends", header: t("calibration.ends"), render: ends, width: 170 },
    { key: "where", header: t("where"), render: (one) => <Where instrument={one} />, width: 120 },
  ];
  const table = (
    <Table
      caption={t("title")}
      captionHidden
      columns={columns}
      rows={rows}
      rowKey={({ id }) => id}
      href={({ id }) => kitPaths.instrument(id)}
      twoLines
      tone={({ outOfService }) => (outOfService === null ? null : "wrong")}
      empty={<Text tone="ink2">{t("noneOfGroup")}</Text>}
      card={{
        title: (instrument) => nameOf(instrument),
        figure: (instrument) => <Where instrument={instrument} />,
        lines: (instrument) => [
          t("instrument.line", { kind: t(`kind.${instrument.kind}`), serial: instrument.serial }),
          [instrument.range, certified(instrument)].filter(Boolean).join(", ") || null,
          instrument.calibration === "none" ? null : (
            <View key="life" style={{ paddingTop: 4 }}>
              {bar(instrument)}
            </View>
          ),
          <Row key="ends" justify="space-between">
            {ends(instrument)}
          </Row>,
        ],
      }}
    />
  );
  return phone ? table : <Card pad={0}>{table}</Card>;
}

/** Where it is now: on a loop, out of service, put away, or not on any pipe. */
function Where({ instrument }: { instrument: Instrument }) {
  const t = useWords("kit");
  if (instrument.archivedAt !== null) return <Chip label={t("archived")} />;
  if (instrument.outOfService !== null) return <Chip tone="wrong" label={t("outOfService")} />;
  const now = placementNow(instrument.placements);
  if (now === null)
    return (
      <Text variant="table" tone="ink3">
        {t("notInstalled")}
      </Text>
    );
  return <LoopTag tag={now.loopTag} service={serviceOf(now)} />;
}

export function placementNow(placements: readonly Placement[]): Placement | null {
  return placements.find(({ endsAt }) => endsAt === null) ?? null;
}

export function serviceOf({ service }: Pick<Placement, "service">) {
  const services = { chilled: "cooling", hot: "heating", changeover: "changeover" } as const;
  return services[service];
}
