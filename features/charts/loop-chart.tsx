import { useId, useMemo, useState, type ReactNode } from "react";
import { View } from "react-native";

import type { Interval } from "@shared/domain/time/interval";
import { useWords, type Format } from "@features/i18n";
import {
  Banner,
  Row,
  serviceColours,
  Text,
  TextLink,
  useMeasuredWidth,
  useTheme,
  VisuallyHidden,
  type Service,
} from "@features/ui";

import { ChartCursor } from "./chart-cursor";
import type { ChartDay } from "./chart-days";
import { ChartFrame } from "./chart-frame";
import { chartLayout, plotWidth, powerLayout } from "./chart-layout";
import { columnAt, nearestColumn, type ChartSeries } from "./chart-series";
import { ChartSurface } from "./chart-surface";
import { chartUnits } from "./chart-units";
import { columnLabels } from "./column-labels";
import { cursorPlace, cursorReading, useCursorText } from "./cursor-reading";
import { plotPicture, type PictureOptions } from "./plot-picture";
import { usePlotDoor } from "./plot-door";
import { powerPicture, shownPower } from "./power-picture";
import { useChartSeries, type LoadSeries } from "./use-chart-series";
import { useChartView } from "./use-chart-view";
import { flowAxis, fromZeroAxis, temperatureAxis } from "./value-axis";
import { leastView } from "./view-window";

export interface LoopChartProps {
  /** Names the chart: “Supply, return and flow, CHW-1B”. */
  label: string;
  /** One sentence that says what the picture shows. */
  summary: string;
  service: PictureOptions["service"];
  /** What there is to draw: water, or only the power of a permanent meter. */
  draws: "water" | "power";
  range: Interval;
  zone: string;
  format: Format;
  /** Energy to write under the days; null where none is worked out. */
  days: readonly ChartDay[] | null;
  load: LoadSeries;
  /** What may be done with the part in view, once it is not all. */
  viewAction?: { readonly label: string; readonly onPress: (view: Interval) => void } | undefined;
  /** The key, left of the note on averaging. */
  foot?: ReactNode;
}

const tagServices = { chilled: "cooling", hot: "heating", changeover: "changeover" } as const;

/**
 * Supply, return and flow over time, or power alone. Give it a `key` of the point and the range: another range is
 * another chart. The frame stands at once; the curves come when Skia is there.
 */
export function LoopChart(props: LoopChartProps) {
  const [width, onLayout] = useMeasuredWidth();
  const { height } = chartLayout(width || 806, energyRows(props));
  return (
    <View onLayout={onLayout} style={{ minHeight: height, alignSelf: "stretch" }}>
      {width > 0 ? <MeasuredChart {...props} width={width} /> : null}
    </View>
  );
}

function energyRows({ days, service }: Pick<LoopChartProps, "days" | "service">): 0 | 1 | 2 {
  if (days === null) return 0;
  return service === "changeover" ? 2 : 1;
}

const noDays: readonly ChartDay[] = [];

function MeasuredChart(props: LoopChartProps & { width: number }) {
  const { service, draws, range, zone, format, days, load, width } = props;
  const t = useWords("charts");
  const hintId = useId();
  const layout = useMemo(() => {
    const whole = chartLayout(width, energyRows({ days, service }));
    return draws === "power" ? powerLayout(whole) : whole;
  }, [width, days, service, draws]);
  const units = useMemo(() => chartUnits(format), [format]);
  const [nominalStepS, setStep] = useState<number | null>(null);
  const chart = useChartView(range, leastView(nominalStepS));
  const { view } = chart;
  // What a column of the least width needs is what the server is asked for.
  const pixels = Math.floor((plotWidth(layout) / layout.leastColumn) * 2);
  const loaded = useChartSeries({ range, view, pixels, units, load });
  const { overview, shown } = loaded;
  if (overview && overview.nominalStepS !== nominalStepS) setStep(overview.nominalStepS);
  const [coldest = null, warmest = null] = loaded.temperatureExtent ?? [];
  const temperature = useMemo(
    () => temperatureAxis(coldest === null || warmest === null ? null : [coldest, warmest]),
    [coldest, warmest],
  );
  const [leastFlow = null, mostFlow = null] = loaded.flowExtent ?? [];
  const flow = useMemo(
    () => flowAxis(leastFlow === null || mostFlow === null ? null : [leastFlow, mostFlow]),
    [leastFlow, mostFlow],
  );
  const power = useMemo(() => shown && shownPower(shown, service, units), [shown, service, units]);
  const upper = useMemo(
    () => (draws === "power" ? powerAxis(overview, power, service, units) : temperature),
    [draws, overview, power, service, units, temperature],
  );
  const picture = useMemo(() => {
    if (shown === null || power === null) return null;
    const common = { series: shown, view, layout, service };
    return draws === "power"
      ? powerPicture({ ...common, power, axis: upper })
      : plotPicture({ ...common, temperature, flow });
  }, [draws, shown, power, view, layout, upper, temperature, flow, service]);
  const registers = useMemo(
    () =>
      service === "changeover"
        ? (["heating", "cooling"] as const)
        : ([service === "hot" ? "heating" : "cooling"] as const),
    [service],
  );
  const labels = useMemo(
    () =>
      columnLabels({
        view,
        zone,
        layout,
        days: days ?? noDays,
        registers,
        format,
        weekName: (week) => t("week", { week }),
      }),
    [view, zone, layout, days, registers, format, t],
  );
  const column = shown && chart.cursorMs !== null ? nearestColumn(shown, chart.cursorMs) : null;
  const reading = shown && column !== null ? cursorReading(shown, column) : null;
  const text = useCursorText(reading, format, layout.named);
  /** Values of the curves in the upper panel at a column, in the order of their names. */
  const curvesAt = (column: number): readonly (number | null)[] => {
    if (shown === null || power === null) return [];
    const curves = draws === "power" ? [power] : [shown.supply, shown.return];
    return curves.map((values) => known(values[column]));
  };
  const placeOf = (column: number) =>
    shown &&
    cursorPlace(cursorReading(shown, column), {
      view,
      layout,
      axis: upper,
      values: curvesAt(column),
    });
  const ends = shown && placeOf(lastDrawn(shown, view, (i) => !curvesAt(i).includes(null)));
  const names = useMemo(
    () => ({
      supply: draws === "power" ? t("power") : t("supply"),
      return: t("return"),
      flow: t("flow"),
      quality: t("quality"),
      upperUnit:
        draws === "power"
          ? (service === "chilled" ? units.coolingPower : units.heatingPower).unit
          : units.temperature.unit,
      flowUnit: units.flow.unit,
      energyUnits: registers.map((register) => {
        const { unit } = register === "heating" ? units.heatingEnergy : units.coolingEnergy;
        return registers.length === 1 ? unit : `${t(`register.${register}`)} ${unit}`;
      }),
    }),
    [t, units, registers, draws, service],
  );
  return (
    <View style={{ gap: 6 }}>
      <ChartSurface
        label={t("surface", { name: props.label })}
        describedBy={hintId}
        height={layout.height}
        gestures={{
          plotLeft: layout.left,
          plotWidth: plotWidth(layout),
          canPan: !chart.whole,
          onPoint: chart.moveTo,
          onLeave: chart.clearCursor,
          onPan: chart.pan,
          onZoom: chart.zoom,
          onPinch: chart.pinch,
          onKey: (key, shift) => chart.key(key, shift, shown),
          onFocusChange: () => undefined,
        }}
      >
        <View role="img" aria-label={props.summary} style={{ height: layout.height }}>
          <ChartFrame
            layout={layout}
            view={view}
            upper={upper}
            flow={draws === "power" ? null : flow}
            labels={labels}
            quality={shown?.quality ?? []}
            names={names}
            ends={{ supply: ends?.marks[0] ?? null, return: ends?.marks[1] ?? null }}
            service={tagServices[service]}
            format={format}
          />
          <Curves
            picture={picture}
            left={layout.left}
            top={layout.temperature.top}
            large={layout.named}
          />
          {reading && text && column !== null ? (
            <View style={{ position: "absolute", left: 0, top: 0, pointerEvents: "none" }}>
              <ChartCursor layout={layout} text={text.short} {...(placeOf(column) ?? noPlace)} />
            </View>
          ) : null}
        </View>
      </ChartSurface>
      <VisuallyHidden id={hintId}>{t("keys")}</VisuallyHidden>
      <View role="status" aria-live="polite">
        <VisuallyHidden>{text?.long ?? ""}</VisuallyHidden>
      </View>
      <ChartNote
        series={shown}
        format={format}
        whole={chart.whole}
        onShowAll={chart.showAll}
        viewAction={
          props.viewAction && {
            label: props.viewAction.label,
            onPress: () => props.viewAction?.onPress(view),
          }
        }
        left={layout.named ? layout.left : 0}
        foot={props.foot}
      />
      {loaded.failed ? (
        <Banner
          kind="look"
          lead={t("notLoaded")}
          action={<TextLink label={t("again")} onPress={loaded.retry} />}
          live
        />
      ) : null}
    </View>
  );
}

const noPlace = { x: 0, marks: [] };

const known = (value: number | undefined) =>
  value === undefined || Number.isNaN(value) ? null : value;

/** From zero to the greatest power seen, or below where a meter gave the other register's. */
function powerAxis(
  overview: ChartSeries | null,
  shown: Float64Array | null,
  service: PictureOptions["service"],
  units: ReturnType<typeof chartUnits>,
) {
  const all = [overview && shownPower(overview, service, units), shown].flatMap((values) =>
    values === null ? [] : [...values].filter((value) => !Number.isNaN(value)),
  );
  const least = all.reduce((low, value) => Math.min(low, value), 0);
  const greatest = all.reduce((high, value) => Math.max(high, value), 0);
  return fromZeroAxis(least, greatest);
}

/** The last column in the view whose curves all have a value; −1 where none has. */
function lastDrawn(
  series: ChartSeries,
  view: Interval,
  isDrawn: (column: number) => boolean,
): number {
  for (let i = series.startMs.length - 1; i >= 0; i--) {
    const at = columnAt(series, i);
    if (at > view.endMs || !isDrawn(i)) continue;
    return at < view.startMs ? -1 : i;
  }
  return -1;
}

/** The drawn part: empty, of the drawn size, until Skia is there; a word where it cannot come. */
function Curves(props: {
  picture: ReturnType<typeof plotPicture> | null;
  left: number;
  top: number;
  large: boolean;
}) {
  const { Plot, failed, retry } = usePlotDoor();
  const t = useWords("charts");
  const { colour } = useTheme();
  const colours = useMemo(() => {
    const of = (service: Service) => {
      const hues = serviceColours(service, colour);
      return { supply: hues.main, return: hues.mid, fill: hues.tint };
    };
    return { cooling: of("cooling"), heating: of("heating"), bars: colour.slate };
  }, [colour]);
  const place = { position: "absolute", left: props.left, top: props.top } as const;
  if (failed)
    return (
      <View style={{ ...place, right: 64, top: props.top + 40 }}>
        <Banner
          kind="look"
          lead={t("noDrawing")}
          action={<TextLink label={t("again")} onPress={retry} />}
          live
        >
          {t("noDrawingDetail")}
        </Banner>
      </View>
    );
  if (!Plot || !props.picture) return null;
  return (
    <View style={{ ...place, pointerEvents: "none" }}>
      <Plot picture={props.picture} colours={colours} large={props.large} />
    </View>
  );
}

function ChartNote(props: {
  series: ChartSeries | null;
  format: Format;
  whole: boolean;
  onShowAll: () => void;
  viewAction: { readonly label: string; readonly onPress: () => void } | undefined;
  left: number;
  foot: ReactNode;
}) {
  const t = useWords("charts");
  const { series, format } = props;
  const step =
    series === null || series.nominalStepS === null ? null : format.duration(series.nominalStepS);
  const note =
    series === null || step === null
      ? ""
      : series.averagedOverS === null || series.averagedOverS <= (series.nominalStepS ?? 0)
        ? t("note.rows", { step })
        : t("note.means", { step, over: format.duration(series.averagedOverS) });
  return (
    <Row gap={4} justify="space-between" wrap style={{ paddingLeft: props.left, marginTop: 8 }}>
      <View style={{ flexShrink: 1, minWidth: 0 }}>{props.foot}</View>
      {props.whole ? null : (
        <>
          <TextLink variant="small" label={t("showAll")} onPress={props.onShowAll} />
          {props.viewAction ? <TextLink variant="small" {...props.viewAction} /> : null}
        </>
      )}
      <Text variant="chip" tone="ink3">
        {note}
      </Text>
    </Row>
  );
}
