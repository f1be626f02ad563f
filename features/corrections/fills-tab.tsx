import { useQuery } from "@tanstack/react-query";
import { useRouter } from "expo-router";
import type { Fill } from "@shared/contracts/corrections";
import type { PointSummary } from "@shared/contracts/energy";
import { Answer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  addDays,
  Button,
  Card,
  Chip,
  DateField,
  dayInZone,
  EmptyState,
  FieldRow,
  ListRow,
  Stack,
  Text,
} from "@features/ui";
import type { Format } from "@shared/formats/format";
import type { PlaceProps } from "./corrections-screen";
import { correctionsQueries } from "./corrections-queries";
import { FillCard } from "./fill-card";
import { FillSheet } from "./fill-sheet";

interface FillsTabProps extends PlaceProps {
  /** First and last day looked at, from the address. */
  since: string | undefined;
  until: string | undefined;
  /** The gap whose filling is asked for: from_to. */
  asked: string | undefined;
}

/** Days shown while nobody picked any: a month is what a bill looks at. */
const usualDays = 31;

/** Gaps of a range and what was proposed for them; never in the measured energy. */
export function FillsTab(props: FillsTabProps) {
  const { site, point, today } = props;
  const t = useWords("corrections");
  const router = useRouter();
  const format = useFormat(site.zone, site.unitSystem);
  const extent = useQuery(correctionsQueries.extent(point.id, today));
  const lastAt = extent.data?.lastReadingAt ?? null;
  const lastDay = lastAt === null ? today : dayInZone(Date.parse(lastAt), site.zone);
  const until = props.until ?? lastDay;
  const usual = addDays(until, 1 - usualDays);
  const firstAt = extent.data?.firstReadingAt ?? null;
  const firstDay = firstAt === null ? usual : dayInZone(Date.parse(firstAt), site.zone);
  // Nothing is missing from the time before anybody measured.
  const since = props.since ?? (firstDay > usual && firstDay <= until ? firstDay : usual);
  const fills = useQuery(correctionsQueries.fills(point.id));
  const gaps = useQuery({
    ...correctionsQueries.gaps(point.id, { from: since, to: addDays(until, 1) }),
    enabled: extent.data !== undefined && since <= until,
  });
  const mayFill = fills.data?.can.create ?? false;
  const [from, to] = (props.asked ?? "").split("_");
  return (
    <Stack gap={5}>
      <Text tone="ink2">{t("fills.lead")}</Text>
      <FieldRow>
        <DateField
          label={t("fills.since")}
          value={since}
          max={until}
          onChange={(day) => router.setParams({ since: day ?? undefined })}
        />
        <DateField
          label={t("fills.until")}
          value={until}
          min={since}
          onChange={(day) => router.setParams({ until: day ?? undefined })}
        />
      </FieldRow>
      <Answer of={gaps} denied={t("denied")}>
        {({ leftOut, leftOutCount }) => (
          <Gaps
            leftOut={leftOut}
            total={leftOutCount}
            format={format}
            onFill={
              mayFill ? (gap) => router.setParams({ fill: `${gap.from}_${gap.to}` }) : undefined
            }
          />
        )}
      </Answer>
      <Answer of={fills} denied={t("denied")}>
        {({ items }) => <Fills items={items} format={format} />}
      </Answer>
      {from && to && mayFill ? (
        <FillSheet
          {...props}
          from={from}
          to={to}
          format={format}
          onClose={() => router.setParams({ fill: undefined })}
        />
      ) : null}
    </Stack>
  );
}

type Gap = PointSummary["leftOut"][number];

function Gaps(props: {
  leftOut: readonly Gap[];
  total: number;
  format: Format;
  onFill: ((gap: Gap) => void) | undefined;
}) {
  const { leftOut, total, format, onFill } = props;
  const t = useWords("corrections");
  const at = (instant: string) => format.dateTime(Date.parse(instant));
  if (leftOut.length === 0)
    return <EmptyState title={t("fills.noGaps")} detail={t("fills.noGapsDetail")} />;
  return (
    <Card pad={4}>
      <Text variant="subhead" level={2}>
        {t("fills.gaps", { count: total })}
      </Text>
      {leftOut.map((gap, index) => {
        const span = t("when.span", { from: at(gap.from), to: at(gap.to) });
        const seconds = (Date.parse(gap.to) - Date.parse(gap.from)) / 1000;
        return (
          <ListRow
            key={gap.from}
            first={index === 0}
            title={span}
            detail={`${t(`gap.${gap.kind}`)}, ${format.duration(seconds)}`}
            trail={
              gap.kind === "filled" ? (
                <Chip label={t("gap.filled")} />
              ) : onFill ? (
                <Button
                  kind="second"
                  size="dense"
                  label={t("fills.fill")}
                  said={t("fills.fillSaid", { span })}
                  onPress={() => onFill(gap)}
                />
              ) : undefined
            }
          />
        );
      })}
      {total > leftOut.length ? (
        <Text tone="ink2">{t("fills.longest", { shown: leftOut.length })}</Text>
      ) : null}
    </Card>
  );
}

function Fills(props: { items: readonly Fill[]; format: Format }) {
  const t = useWords("corrections");
  if (props.items.length === 0) return <Text tone="ink2">{t("fills.none")}</Text>;
  return (
    <Stack gap={4}>
      <Text variant="subhead" level={2}>
        {t("fills.title")}
      </Text>
      {props.items.map((fill) => (
        <FillCard key={fill.id} fill={fill} format={props.format} />
      ))}
    </Stack>
  );
}
