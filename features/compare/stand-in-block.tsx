import { View } from "react-native";
import type { StandInResult } from "@shared/contracts/meter-comparisons";
import { useFormat, useWords } from "@features/i18n";
import { Card, Figure, Table, Text, useBreakpoint, type Column } from "@features/ui";
import { shownFigure } from "./shown-figure";

interface Part {
  readonly key: string;
  readonly label: string;
  readonly kwh: number;
  readonly expandedKwh: number | null;
  readonly hours: number;
}

/** Energy in place of a meter's: measured and estimated apart, each with its label, then the share. */
export function StandInBlock(props: { standIn: StandInResult; consentBy: string | null }) {
  const t = useWords("compare");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const { standIn, consentBy } = props;
  const parts = standIn.parts.map((part): Part => ({
    key: part.code,
    label: t(`standIn.part.${part.code}`),
    kwh: part.energyKwh,
    expandedKwh: part.expandedKwh,
    hours: part.hours,
  }));
  const total: Part = {
    key: "total",
    label: t("standIn.total"),
    kwh: standIn.totalKwh,
    expandedKwh: standIn.expandedKwh,
    hours: parts.reduce((sum, { hours }) => sum + hours, 0),
  };
  const hours = (value: number) => `${format.number(value, 2)}\u00A0h`;
  const energyOf = (part: Part) => shownFigure(format, part.kwh, part.expandedKwh, "heatingEnergy");
  const columns: Column<Part>[] = [
    { key: "part", header: t("standIn.title"), render: ({ label }) => label },
    {
      key: "energy",
      header: t("standIn.energy"),
      unit: format.unit("heatingEnergy").unit,
      figure: (part) => ({ ...energyOf(part), places: 1 }),
    },
    {
      key: "hours",
      header: t("standIn.hours"),
      align: "right",
      render: (part) => hours(part.hours),
    },
  ];
  const table = (
    <Table
      caption={t("standIn.title")}
      captionHidden
      columns={columns}
      rows={phone ? [...parts, total] : parts}
      total={phone ? undefined : total}
      totalLabel={total.label}
      rowKey={({ key }) => key}
      card={{
        title: ({ label }) => label,
        figure: (part) => <Figure {...energyOf(part)} places={1} size="s" />,
        lines: (part) => [hours(part.hours)],
      }}
    />
  );
  const { estimatedPercent } = standIn;
  return (
    <View style={{ gap: 8 }}>
      <Text variant="heading">{t("standIn.title")}</Text>
      {phone ? table : <Card pad={0}>{table}</Card>}
      {estimatedPercent === null ? null : (
        <Text>
          {estimatedPercent === 0
            ? t("standIn.shareNone")
            : t("standIn.share", { percent: format.number(estimatedPercent, 1) })}
        </Text>
      )}
      {standIn.expandedKwh === null ? (
        <Text variant="small" tone="ink2">
          {t("standIn.plusMinusUnknown")}
        </Text>
      ) : null}
      {consentBy === null ? null : (
        <Text variant="small" tone="ink2">
          {t("saved.consentBy", { name: consentBy })}
        </Text>
      )}
    </View>
  );
}
