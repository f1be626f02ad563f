import { ticks } from "d3-array";
import { useId, useMemo, useState } from "react";
import { View } from "react-native";
import Svg, { Circle, G, Line, Path, Rect, Text as SvgText } from "react-native-svg";

import { useWords, type Format } from "@features/i18n";
import { ChartSurface } from "@features/charts/chart-surface";
import { pixelOf, zeroAxis } from "@features/charts/value-axis";
import {
  serviceColours,
  stroke,
  typeScale,
  useMeasuredWidth,
  useTheme,
  VisuallyHidden,
} from "@features/ui";

import { useHours } from "./load-figure";

export interface LoadCurveProps {
  /** Names the chart. */
  label: string;
  /** One sentence that says what the picture shows. */
  summary: string;
  service: "heating" | "cooling";
  /** From most power to least, in the unit shown; hours never fall. */
  points: readonly { readonly hours: number; readonly power: number }[];
  mean: { readonly name: string; readonly power: number } | null;
  unit: string;
  format: Format;
}

const height = { phone: 260, wide: 320 } as const;

/** The duration curve with a cursor for finger, mouse and keys. */
export function LoadCurve(props: LoadCurveProps) {
  const [width, onLayout] = useMeasuredWidth();
  const tall = width >= 560 ? height.wide : height.phone;
  return (
    <View onLayout={onLayout} style={{ minHeight: tall, alignSelf: "stretch" }}>
      {width > 0 && props.points.length > 1 ? <Drawn {...props} width={width} tall={tall} /> : null}
    </View>
  );
}

/** Places of the plot, px. */
function placesOf(width: number, tall: number) {
  return { left: 44, right: width - (width >= 560 ? 64 : 12), top: 40, bottom: tall - 30 };
}
type Places = ReturnType<typeof placesOf>;

const noGesture = () => undefined;

function Drawn(props: LoadCurveProps & { width: number; tall: number }) {
  const { points, format, unit, width, tall } = props;
  const t = useWords("load");
  const hintId = useId();
  const hours = useHours(format);
  const [at, setAt] = useState<number | null>(null);
  const places = useMemo(() => placesOf(width, tall), [width, tall]);
  const total = points.at(-1)?.hours ?? 1;
  const axis = useMemo(() => zeroAxis(points[0]?.power ?? 0), [points]);
  const xOf = (value: number) => places.left + (value / total) * (places.right - places.left);
  const yOf = (value: number) => pixelOf(value, axis, places.top, places.bottom);
  const index = at === null ? null : Math.min(at, points.length - 1);
  const read = index === null ? null : points[index];
  const words = read && {
    power: `${format.number(read.power)}\u00A0${unit}`,
    hours: hours(read.hours),
    share: `${format.number((read.hours / total) * 100, read.hours / total < 0.1 ? 1 : 0)}\u00A0%`,
  };
  const moveTo = (share: number) => setAt(nearest(points, share * total));
  const onKey = (key: string): boolean => {
    const last = points.length - 1;
    const from = index ?? -1;
    const to = {
      ArrowRight: from + 1,
      ArrowLeft: index === null ? last : from - 1,
      PageDown: from + 10,
      PageUp: index === null ? last : from - 10,
      Home: 0,
      End: last,
    }[key];
    if (key === "Escape" && index !== null) {
      setAt(null);
      return true;
    }
    if (to === undefined) return false;
    setAt(Math.max(0, Math.min(last, to)));
    return true;
  };
  return (
    <View style={{ gap: 4 }}>
      <ChartSurface
        label={props.label}
        describedBy={hintId}
        height={tall}
        gestures={{
          plotLeft: places.left,
          plotWidth: places.right - places.left,
          canPan: false,
          onPoint: moveTo,
          onLeave: () => setAt(null),
          onPan: noGesture,
          onZoom: noGesture,
          onPinch: noGesture,
          onKey,
          onFocusChange: noGesture,
        }}
      >
        <View role="img" aria-label={props.summary} style={{ height: tall }}>
          <Svg width={width} height={tall}>
            <Frame {...props} axis={axis} places={places} total={total} xOf={xOf} yOf={yOf} />
            <Curve {...props} places={places} xOf={xOf} yOf={yOf} />
            {read && words ? (
              <Cursor
                x={xOf(read.hours)}
                y={yOf(read.power)}
                places={places}
                width={width}
                text={t("curve.short", words)}
              />
            ) : null}
          </Svg>
        </View>
      </ChartSurface>
      <VisuallyHidden id={hintId}>{t("curve.keys")}</VisuallyHidden>
      <View role="status" aria-live="polite">
        <VisuallyHidden>{words ? t("curve.reading", words) : ""}</VisuallyHidden>
      </View>
    </View>
  );
}

/** The point whose hours come next: that power was reached for at least as long. */
function nearest(points: LoadCurveProps["points"], hours: number): number {
  let low = 0;
  let high = points.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((points[middle]?.hours ?? 0) < hours) low = middle + 1;
    else high = middle;
  }
  return low;
}

interface Scales {
  places: Places;
  xOf: (hours: number) => number;
  yOf: (power: number) => number;
}

function Frame(
  props: LoadCurveProps &
    Scales & { axis: ReturnType<typeof zeroAxis>; total: number; width: number },
) {
  const { axis, places, xOf, yOf, total, mean, format, unit, width } = props;
  const { colour } = useTheme();
  const { left, right, top, bottom } = places;
  const hourTicks = ticks(0, total, width >= 560 ? 7 : 4);
  return (
    <G>
      {axis.ticks.map((tick) => (
        <G key={tick}>
          <Line
            x1={left}
            x2={right}
            y1={yOf(tick)}
            y2={yOf(tick)}
            stroke={tick === 0 ? colour.ruleStrong : colour.rule}
          />
          <Word x={left - 8} y={yOf(tick) + 4.5} anchor="end">
            {format.number(tick, axis.decimals)}
          </Word>
        </G>
      ))}
      <Word x={left} y={top - 10}>
        {unit}
      </Word>
      {hourTicks.map((tick, place) => (
        <G key={tick}>
          <Line x1={xOf(tick)} x2={xOf(tick)} y1={top} y2={bottom + 6} stroke={colour.rule} />
          <Word x={xOf(tick)} y={bottom + 22} anchor="middle">
            {place === hourTicks.length - 1
              ? `${format.number(tick, 0)}\u00A0h`
              : format.number(tick, tick % 1 === 0 ? 0 : 1)}
          </Word>
        </G>
      ))}
      {mean ? (
        <G>
          <Line
            x1={left}
            x2={right}
            y1={yOf(mean.power)}
            y2={yOf(mean.power)}
            stroke={colour.ink2}
            strokeWidth={stroke.control}
            strokeDasharray="2 4"
          />
          {width >= 560 ? (
            <Word x={right + 8} y={yOf(mean.power) + 4.5} strong>
              {mean.name}
            </Word>
          ) : (
            <Word x={right - 4} y={yOf(mean.power) - 6} anchor="end" strong>
              {mean.name}
            </Word>
          )}
        </G>
      ) : null}
    </G>
  );
}

function Curve({ points, service, places, xOf, yOf }: LoadCurveProps & Scales) {
  const { colour } = useTheme();
  const hues = serviceColours(service, colour);
  const line = points
    .map(
      ({ hours, power }, i) =>
        `${i === 0 ? "M" : "L"}${xOf(hours).toFixed(1)} ${yOf(power).toFixed(1)}`,
    )
    .join("");
  const { left, right, bottom } = places;
  return (
    <G>
      <Path
        d={`${line}L${right} ${bottom}L${left} ${bottom}Z`}
        fill={hues.tint}
        fillOpacity={0.55}
      />
      <Path
        d={line}
        fill="none"
        stroke={hues.main}
        strokeWidth={stroke.chartFocus}
        strokeLinejoin="round"
      />
    </G>
  );
}

/** Roughly what a letter of the narrow face takes, px; the pill must hold its words. */
const letterPx = 6.6;

function Cursor(props: { x: number; y: number; places: Places; width: number; text: string }) {
  const { x, y, places, text } = props;
  const { colour } = useTheme();
  const width = Math.min(props.width, text.length * letterPx + 24);
  const left = Math.min(props.width - width, Math.max(0, x - width / 2));
  return (
    <G>
      <Line x1={x} x2={x} y1={27} y2={places.bottom} stroke={colour.mark} strokeWidth={1.6} />
      <Circle cx={x} cy={y} r={4.5} fill={colour.sheet} stroke={colour.mark} strokeWidth={2.2} />
      <Rect x={left} y={0} width={width} height={27} rx={6} fill={colour.mark} />
      <SvgText
        x={left + width / 2}
        y={18.5}
        textAnchor="middle"
        fill={colour.onMark}
        fontFamily={typeScale.tableHead.fontFamily}
        fontSize={typeScale.tableHead.fontSize}
      >
        {text}
      </SvgText>
    </G>
  );
}

function Word(props: {
  x: number;
  y: number;
  anchor?: "start" | "middle" | "end";
  strong?: boolean;
  children: string;
}) {
  const { colour } = useTheme();
  return (
    <SvgText
      x={props.x}
      y={props.y}
      textAnchor={props.anchor ?? "start"}
      fill={props.strong ? colour.ink2 : colour.ink3}
      fontFamily={(props.strong ? typeScale.tableHead : typeScale.chip).fontFamily}
      fontSize={typeScale.small.fontSize}
    >
      {props.children}
    </SvgText>
  );
}
