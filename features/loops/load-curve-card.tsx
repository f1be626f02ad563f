import { useMemo, useState } from "react";
import { View } from "react-native";

import { downloadDurationCurve, type PointShape } from "@shared/contracts/shape";
import { addressOf, saveFile } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Button,
  Card,
  Row,
  Segments,
  Stack,
  Table,
  Text,
  TextLink,
  useBreakpoint,
  type Column,
} from "@features/ui";

import { LoadCurve } from "./load-curve";
import { useHours } from "./load-figure";
import type { LoadFigures } from "./load-view";
import { powerQuantity, tagService } from "./register-words";

type CurvePoint = PointShape["curve"][number];

/** Power over the hours it was reached, as a curve or as the rows behind it. */
export function LoadCurveCard(
  props: LoadFigures & { shows: "chart" | "table"; onShow: (shows: "chart" | "table") => void },
) {
  const { shows, point, range } = props;
  const t = useWords("load");
  const phone = useBreakpoint() === "phone";
  const download = () =>
    saveFile(
      addressOf(downloadDurationCurve, {
        params: { pointId: point.id },
        query: { from: range.from, to: range.until },
      }),
    );
  return (
    <Card label={t("curve.title")} pad={phone ? 3 : 4}>
      <Row justify="space-between" wrap gap={3} style={{ marginBottom: 8 }}>
        <Text variant={phone ? "subhead" : "heading"} level={2}>
          {t("curve.title")}
        </Text>
        <Segments
          label={t("curve.as")}
          value={shows}
          size="dense"
          options={[
            { value: "chart", label: t("curve.chart") },
            { value: "table", label: t("curve.table") },
          ]}
          onChange={props.onShow}
        />
      </Row>
      {shows === "chart" ? <Picture {...props} /> : <Rows {...props} />}
      <Row justify="flex-end" style={{ marginTop: 10 }}>
        <TextLink label={t("curve.download")} variant="bodyWide" onPress={download} />
      </Row>
    </Card>
  );
}

function Picture({ shape, loop, format, rangeName }: LoadFigures) {
  const t = useWords("load");
  const hours = useHours(format);
  const power = powerQuantity[shape.register];
  const service = tagService(loop.service);
  const { curve } = shape;
  const points = useMemo(
    () =>
      curve.map((point) => ({ hours: point.hours, power: format.toDisplay(point.powerKw, power) })),
    [curve, format, power],
  );
  const total = curve.at(-1)?.hours ?? 0;
  const half = curve.find((point) => point.hours >= total / 2);
  const said = t("curve.said", {
    tag: loop.tag,
    range: rangeName,
    most: format.withUnit(curve[0]?.powerKw ?? null, power),
    least: format.withUnit(curve.at(-1)?.powerKw ?? null, power),
    half: format.withUnit(half?.powerKw ?? null, power),
    hours: hours(total),
  });
  return (
    <LoadCurve
      label={t("curve.name", { tag: loop.tag })}
      summary={said}
      service={service === "changeover" ? shape.register : service}
      points={points}
      mean={
        shape.meanKw === null
          ? null
          : { name: t("curve.mean"), power: format.toDisplay(shape.meanKw, power) }
      }
      unit={format.unit(power).unit}
      format={format}
    />
  );
}

const rowsAtOnce = 25;

function Rows({ shape, format, rangeName }: LoadFigures) {
  const t = useWords("load");
  const [shown, setShown] = useState(rowsAtOnce);
  const hours = useHours(format);
  const power = powerQuantity[shape.register];
  const { curve } = shape;
  const total = curve.at(-1)?.hours ?? 0;
  const share = (point: CurvePoint) =>
    `${format.number(total > 0 ? (point.hours / total) * 100 : null, 1)}\u00A0%`;
  const columns: Column<CurvePoint>[] = [
    {
      key: "hours",
      header: t("curve.hours"),
      unit: "h",
      align: "right",
      render: (point) => format.number(point.hours, 2),
    },
    { key: "share", header: t("curve.share"), align: "right", render: share },
    {
      key: "power",
      header: t("curve.power"),
      unit: format.unit(power).unit,
      figure: (point) => ({ value: format.toDisplay(point.powerKw, power) }),
    },
  ];
  const rest = curve.length - shown;
  return (
    <Stack gap={3}>
      <View>
        <Table<CurvePoint>
          caption={t("curve.caption", { range: rangeName })}
          captionHidden
          columns={columns}
          rows={curve.slice(0, shown)}
          rowKey={(point) => String(point.hours)}
          card={{
            title: (point) => hours(point.hours),
            figure: (point) => format.withUnit(point.powerKw, power),
            lines: (point) => [share(point)],
          }}
        />
      </View>
      {rest > 0 ? (
        <Button
          kind="second"
          size="dense"
          label={t("curve.more", { count: Math.min(rowsAtOnce * 4, rest) })}
          onPress={() => setShown(shown + rowsAtOnce * 4)}
        />
      ) : null}
    </Stack>
  );
}
