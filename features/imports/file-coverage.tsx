import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import {
  Card,
  QualityStrip,
  Row,
  Table,
  Text,
  useBreakpoint,
  type QualityStretch,
} from "@features/ui";
import type { ImportChecks } from "@shared/contracts/import-checks";

type FileChecks = ImportChecks["files"][number];
const GAPS_LISTED = 12;

/** Covered time of one file as a strip, its counts, and its gaps. */
export function FileCoverage(props: {
  name: string;
  named: boolean;
  zone: string;
  checks: FileChecks;
}) {
  const { checks, zone, name } = props;
  const t = useWords("imports");
  const format = useFormat(zone);
  const phone = useBreakpoint() === "phone";
  if (checks.firstInstant === null || checks.lastInstant === null) return null;
  const fromMs = Date.parse(checks.firstInstant);
  const toMs = Date.parse(checks.lastInstant);
  const gaps = checks.gaps.map((gap) => ({
    ...gap,
    fromMs: Date.parse(gap.from),
    toMs: Date.parse(gap.to),
  }));
  const part = (ms: number) => (ms - fromMs) / Math.max(1, toMs - fromMs);
  const stretches: QualityStretch[] = [
    { from: 0, to: 1, quality: "measured" },
    ...gaps.map((gap) => ({
      from: part(gap.fromMs),
      to: part(gap.toMs),
      quality: "missing" as const,
    })),
  ];
  const repeated = checks.steps
    .filter((step) => step.code === "identicalRepeats" || step.code === "conflictingRepeats")
    .reduce((sum, step) => sum + step.count, 0);
  const counts: readonly (readonly [string, string])[] = [
    [
      t("time.covers.rowEvery"),
      checks.nominalStepS === null ? "—" : format.duration(checks.nominalStepS),
    ],
    [t("time.covers.expected"), format.number(checks.expectedRows, 0)],
    [t("time.covers.found"), format.number(checks.rowsRead, 0)],
    [t("time.covers.repeated"), format.number(repeated, 0)],
    [t("time.covers.gaps"), format.number(checks.gapCount, 0)],
  ];
  return (
    <Card pad={5}>
      <View style={{ gap: 12 }}>
        <Row justify="space-between" wrap>
          <Text variant="subhead" level={2}>
            {props.named ? t("time.covers.titleNamed", { name }) : t("time.covers.title")}
          </Text>
          <Text variant="small" tone="ink2">
            {t("time.covers.localTime")}
          </Text>
        </Row>
        <Row justify="space-between" wrap>
          <Text variant="asReadM">{format.dateTime(fromMs)}</Text>
          <Text variant="asReadM">{format.dateTime(toMs)}</Text>
        </Row>
        <QualityStrip
          label={t("time.covers.strip", { name, gaps: checks.gapCount })}
          stretches={stretches}
          height={22}
        />
        <Row gap={5} wrap>
          {counts.map(([label, value]) => (
            <Row key={label} gap={1}>
              <Text variant="bodyWide" tone="ink2">
                {label}
              </Text>
              <Text variant="asReadM">{value}</Text>
            </Row>
          ))}
        </Row>
        {gaps.length === 0 ? (
          <Text variant="bodyWide" tone="ink2">
            {t("time.covers.noGaps")}
          </Text>
        ) : phone ? (
          <View role="list" aria-label={t("time.covers.gapsCaption", { name })} style={{ gap: 10 }}>
            {gaps.slice(0, GAPS_LISTED).map((gap) => (
              <View key={gap.from} role="listitem">
                <Text variant="asReadS">
                  {`${format.dateTime(gap.fromMs)} – ${format.dateTime(gap.toMs)}`}
                </Text>
                <Text variant="small" tone="ink2">
                  {`${t("time.covers.rows")} ${format.number(gap.missingRows, 0)}. ${flowAround(gap)}`}
                </Text>
              </View>
            ))}
          </View>
        ) : (
          <Table
            caption={t("time.covers.gapsCaption", { name })}
            captionHidden
            rows={gaps.slice(0, GAPS_LISTED)}
            rowKey={(gap) => gap.from}
            columns={[
              {
                key: "from",
                header: t("time.covers.from"),
                asRead: (gap) => format.dateTime(gap.fromMs),
              },
              {
                key: "to",
                header: t("time.covers.to"),
                asRead: (gap) => format.dateTime(gap.toMs),
              },
              {
                key: "rows",
                header: t("time.covers.rows"),
                align: "right",
                asRead: (gap) => format.number(gap.missingRows, 0),
              },
              {
                key: "around",
                header: t("time.covers.around"),
                render: (gap) => flowAround(gap),
              },
            ]}
            card={{
              title: (gap) => format.dateTime(gap.fromMs),
              figure: (gap) => <Text variant="asReadM">{format.number(gap.missingRows, 0)}</Text>,
              lines: (gap) => [format.dateTime(gap.toMs), flowAround(gap)],
            }}
          />
        )}
        {checks.gapCount > GAPS_LISTED ? (
          <Text variant={phone ? "small" : "bodyWide"} tone="ink2">
            {t("time.covers.moreGaps", { count: checks.gapCount - GAPS_LISTED })}
          </Text>
        ) : null}
      </View>
    </Card>
  );

  function flowAround(gap: FileChecks["gaps"][number]): string {
    if (gap.flowBeforeM3PerHour === null && gap.flowAfterM3PerHour === null) return "—";
    return t("time.covers.flow", {
      before: format.withUnit(gap.flowBeforeM3PerHour, "flow"),
      after: format.withUnit(gap.flowAfterM3PerHour, "flow"),
    });
  }
}
