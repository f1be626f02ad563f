import { memo, useId } from "react";
import Svg, { G, Line, Rect, Text as SvgText, TSpan } from "react-native-svg";

import type { SeriesAnswer } from "@shared/contracts/energy";
import type { Interval } from "@shared/domain/time/interval";
import { formatFigure, type Format } from "@features/i18n";
import {
  QualityPatterns,
  QualityRect,
  serviceColours,
  typeScale,
  useTheme,
  type Quality,
} from "@features/ui";

import type { ChartLayout } from "./chart-layout";
import { plotWidth } from "./chart-layout";
import type { ColumnLabel } from "./column-labels";
import { pixelOf, type ValueAxis } from "./value-axis";

export interface ChartFrameProps {
  layout: ChartLayout;
  view: Interval;
  /** Of the upper panel: temperature, or power where there is no water to draw. */
  upper: ValueAxis;
  /** Null where there is no lower panel. */
  flow: ValueAxis | null;
  labels: readonly ColumnLabel[];
  quality: SeriesAnswer["quality"];
  names: {
    readonly supply: string;
    readonly return: string;
    readonly flow: string;
    readonly quality: string;
    readonly upperUnit: string;
    readonly flowUnit: string;
    readonly energyUnits: readonly string[];
  };
  /** Heights of the curves' ends, px; null where there is no curve. */
  ends: { readonly supply: number | null; readonly return: number | null };
  service: "cooling" | "heating" | "changeover";
  format: Format;
}

const shownQuality = {
  measured: "measured",
  filled: "estimated",
  excluded: "excluded",
  missing: "missing",
} as const satisfies Record<string, Quality>;

/** Everything round the curves: grid, axes, days with their energy, quality. It needs no Skia. */
export const ChartFrame = memo(function ChartFrame(props: ChartFrameProps) {
  const { layout, view } = props;
  const { colour } = useTheme();
  const { left, right } = layout;
  const pxPerMs = plotWidth(layout) / (view.endMs - view.startMs);
  const xOf = (ms: number) => Math.min(right, Math.max(left, left + (ms - view.startMs) * pxPerMs));
  return (
    <Svg width={layout.width} height={layout.height}>
      <Axis
        axis={props.upper}
        panel={layout.temperature}
        layout={layout}
        hideLowest={props.flow !== null}
        strongZero={props.flow === null}
      />
      {props.flow ? (
        <Axis axis={props.flow} panel={layout.flow} layout={layout} strongZero />
      ) : null}
      {props.labels.map((label) => (
        <Line
          key={`${label.kind} ${label.lineMs}`}
          x1={xOf(label.lineMs)}
          x2={xOf(label.lineMs)}
          y1={layout.temperature.top}
          y2={label.kind === "hour" ? layout.flow.bottom : layout.quality.bottom + 6}
          stroke={colour.rule}
          strokeDasharray={label.kind === "hour" ? "2 4" : undefined}
        />
      ))}
      <Line
        x1={right}
        x2={right}
        y1={layout.temperature.top}
        y2={layout.quality.bottom + 6}
        stroke={colour.rule}
      />
      <QualityTints {...props} xOf={xOf} />
      <Strip {...props} xOf={xOf} />
      <ColumnNames {...props} xOf={xOf} />
      {layout.named ? <CurveNames {...props} /> : null}
    </Svg>
  );
});

function Axis(props: {
  axis: ValueAxis;
  panel: { readonly top: number; readonly bottom: number };
  layout: ChartLayout;
  hideLowest?: boolean;
  strongZero?: boolean;
}) {
  const { colour } = useTheme();
  const { axis, panel, layout } = props;
  const { top, bottom } = panel;
  return (
    <G>
      {axis.ticks.map((tick, index) => {
        const y = pixelOf(tick, axis, top, bottom);
        const strong = props.strongZero === true && tick === 0;
        return (
          <G key={tick}>
            <Line
              x1={layout.left}
              x2={layout.right}
              y1={y}
              y2={y}
              stroke={strong ? colour.ruleStrong : colour.rule}
            />
            {props.hideLowest === true && index === 0 ? null : (
              <SmallText x={layout.left - 8} y={y + 4.5} anchor="end">
                {tick.toFixed(axis.decimals).replace("-", "−")}
              </SmallText>
            )}
          </G>
        );
      })}
    </G>
  );
}

/** Axis values and units: the narrow face, one size under a table's. */
function SmallText(props: {
  x: number;
  y: number;
  anchor?: "start" | "middle" | "end";
  children: string;
}) {
  const { colour } = useTheme();
  return (
    <SvgText
      x={props.x}
      y={props.y}
      textAnchor={props.anchor ?? "start"}
      fill={colour.ink3}
      fontFamily={typeScale.chip.fontFamily}
      fontSize={typeScale.small.fontSize}
    >
      {props.children}
    </SvgText>
  );
}

type Placed = ChartFrameProps & { xOf: (ms: number) => number };

/** A pale column behind the curves where rows were left out. */
function QualityTints({ quality, layout, view, xOf }: Placed) {
  const { colour } = useTheme();
  const tints = {
    filled: colour.brassTint,
    excluded: colour.madderTint,
    missing: colour.slateTint,
  } as const;
  return (
    <G>
      {quality.map((run) => {
        if (run.kind === "measured" || run.toMs < view.startMs || run.fromMs > view.endMs)
          return null;
        const x = xOf(run.fromMs);
        return (
          <Rect
            key={`${run.kind} ${run.fromMs}`}
            x={x}
            y={layout.temperature.top}
            width={Math.max(1.5, xOf(run.toMs) - x)}
            height={layout.flow.bottom - layout.temperature.top}
            fill={tints[run.kind]}
            opacity={0.55}
          />
        );
      })}
    </G>
  );
}

/** A short gap is drawn at least this wide, or nobody would see it. */
const leastTroublePx = 7;

function Strip({ quality, layout, view, xOf }: Placed) {
  const { colour } = useTheme();
  const id = useId().replace(/:/g, "");
  const { top, bottom } = layout.quality;
  const inView = quality.filter((run) => run.toMs > view.startMs && run.fromMs < view.endMs);
  const troubles = inView.filter((run) => run.kind !== "measured");
  return (
    <G>
      <QualityPatterns id={id} />
      {inView
        .filter((run) => run.kind === "measured")
        .map((run) => (
          <Rect
            key={run.fromMs}
            x={xOf(run.fromMs)}
            y={top}
            width={Math.max(0.5, xOf(run.toMs) - xOf(run.fromMs))}
            height={bottom - top}
            fill={colour.slate}
          />
        ))}
      {troubles.map((run) => {
        const exact = xOf(run.toMs) - xOf(run.fromMs);
        const width = Math.max(leastTroublePx, exact);
        const middle = (xOf(run.fromMs) + xOf(run.toMs)) / 2;
        const x = Math.min(layout.right - width, Math.max(layout.left, middle - width / 2));
        return (
          <G key={`${run.kind} ${run.fromMs}`}>
            <Rect
              x={x - 1.5}
              y={top - 3}
              width={width + 3}
              height={bottom - top + 6}
              fill={colour.sheet}
            />
            <QualityRect
              id={id}
              quality={shownQuality[run.kind]}
              x={x}
              y={top - 2}
              width={width}
              height={bottom - top + 4}
            />
          </G>
        );
      })}
    </G>
  );
}

function ColumnNames({ labels, layout, names, format, xOf }: Placed) {
  const { colour } = useTheme();
  const { dayBaseline, energyBaselines, ruleY, left, right } = layout;
  const registerColours = [colour.copper, colour.verdigris];
  return (
    <G>
      {labels.map((label) => {
        const x =
          label.kind === "hour" ? xOf(label.lineMs) : (xOf(label.fromMs) + xOf(label.toMs)) / 2;
        return (
          <G key={`${label.kind} ${label.lineMs}`}>
            {label.name === "" ? null : (
              <SvgText
                x={x}
                y={dayBaseline}
                textAnchor="middle"
                fill={label.kind === "hour" ? colour.ink3 : colour.ink2}
                fontFamily={typeScale.chip.fontFamily}
                fontSize={typeScale.chip.fontSize}
              >
                {label.name}
                {label.faint === "" ? null : <TSpan fill={colour.ink3}>{` ${label.faint}`}</TSpan>}
              </SvgText>
            )}
            {energyBaselines.map((y, row) => {
              const value = label.energies[row];
              if (value === undefined) return null;
              const known = label.uncertainties[row] ?? null;
              const text = formatFigure(value, known, format.language, label.energyPlaces);
              return (
                <SvgText
                  key={y}
                  x={x}
                  y={y}
                  textAnchor="middle"
                  fill={
                    energyBaselines.length > 1 ? (registerColours[row] ?? colour.ink) : colour.ink
                  }
                  fontFamily={typeScale.figureS.fontFamily}
                  fontSize={typeScale.figureS.fontSize}
                >
                  {text.value}
                  {text.uncertainty === null ? null : (
                    <TSpan
                      fill={colour.ink3}
                      fontFamily={typeScale.chip.fontFamily}
                      fontSize={typeScale.chip.fontSize}
                    >{` ±${text.uncertainty}`}</TSpan>
                  )}
                </SvgText>
              );
            })}
          </G>
        );
      })}
      {ruleY === null ? null : (
        <Line x1={left} x2={right} y1={ruleY} y2={ruleY} stroke={colour.rule} />
      )}
      {energyBaselines.map((y, row) =>
        labels.every(({ energies }) => energies[row] === undefined) ? null : (
          <SvgText
            key={y}
            x={right + 8}
            y={y}
            fill={colour.ink3}
            fontFamily={typeScale.chip.fontFamily}
            fontSize={typeScale.chip.fontSize}
          >
            {names.energyUnits[row] ?? ""}
          </SvgText>
        ),
      )}
    </G>
  );
}

/** Names at the right ends of the curves, pushed apart where the curves meet. */
function CurveNames({ layout, names, ends, service, flow }: ChartFrameProps) {
  const { colour } = useTheme();
  const hue = serviceColours(service, colour).main;
  const x = layout.right + 8;
  const face = { fontFamily: typeScale.chip.fontFamily, fontSize: typeScale.chip.fontSize };
  const strong = { ...face, fontFamily: typeScale.tableHead.fontFamily };
  const [supply, back] = apart(ends.supply, ends.return);
  return (
    <G>
      <SmallText x={x} y={layout.temperature.top + 5}>
        {names.upperUnit}
      </SmallText>
      {back === null ? null : (
        <SvgText x={x} y={back + 4.5} fill={hue} {...strong}>
          {names.return}
        </SvgText>
      )}
      {supply === null ? null : (
        <SvgText x={x} y={supply + 4.5} fill={hue} {...strong}>
          {names.supply}
        </SvgText>
      )}
      {flow === null ? null : (
        <>
          <SmallText x={x} y={layout.flow.top + 8}>
            {names.flowUnit}
          </SmallText>
          <SvgText x={x} y={layout.flow.bottom - 18} fill={colour.ink2} {...face}>
            {names.flow}
          </SvgText>
        </>
      )}
      <SvgText x={x} y={layout.quality.bottom + 2} fill={colour.ink2} {...face}>
        {names.quality}
      </SvgText>
    </G>
  );
}

function apart(a: number | null, b: number | null): [number | null, number | null] {
  const least = 16;
  if (a === null || b === null || Math.abs(a - b) >= least) return [a, b];
  const middle = (a + b) / 2;
  return a <= b
    ? [middle - least / 2, middle + least / 2]
    : [middle + least / 2, middle - least / 2];
}
