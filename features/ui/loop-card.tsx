import { View } from "react-native";
import Svg, { Path, Rect } from "react-native-svg";

import { useWords } from "@features/i18n";

import { Figure, type FigureProps } from "./figure";
import { PipeLabel } from "./loop-card-labels";
import type { Service } from "./loop-tag";
import { Mark, type MarkKind } from "./mark";
import { hollowCore, loopHalves, pipeStroke, serviceColours } from "./pipe-drawing";
import { Text } from "./text";
import { useMeasuredWidth, useTheme } from "./theme";

/** A value already in the unit it is shown in, with its ± where one is worked out. */
export interface ShownValue {
  readonly value: number | null;
  readonly unit: string;
  readonly uncertainty?: number | null;
  readonly places?: number;
}

type FigureWorkings = Pick<FigureProps, "onOpenWorkings" | "workingsOpen">;

export interface LoopCardProps {
  service: Service;
  /** What a changeover loop did most of the time shown. */
  doing?: "cooling" | "heating" | null;
  /** Nominal size of the pipe in mm, for the stroke; null where it is not known. */
  nominalMm: number | null;
  meterSide: "supply" | "return";
  supply?: ShownValue;
  return?: ShownValue;
  flow?: ShownValue;
  power?: ShownValue;
  energy?: ShownValue;
  /** Short words before the energy: “Thu”, “Week 20”. */
  energyLabel?: string;
  deltaT?: ShownValue;
  /** Open the workings of the power and of the energy, and say whether they are open. */
  powerWorkings?: FigureWorkings;
  energyWorkings?: FigureWorkings;
  /** Where the card leads a page its power is set larger. */
  powerSize?: "m" | "l";
  /** No data: the loop becomes a dashed outline with the reason inside. */
  empty?: { readonly kind: MarkKind; readonly title: string; readonly detail?: string };
  height?: number;
  /** What it stands on, so labels can break the pipe. */
  ground?: "sheet" | "pad";
}

/** A loop as a pipe: supply solid on top, return hollow below, clamps where the flow is measured. */
export function LoopCard(props: LoopCardProps) {
  const [width, onLayout] = useMeasuredWidth();
  const height = props.height ?? 168;
  return (
    <View onLayout={onLayout} style={{ height, alignSelf: "stretch" }}>
      {width === 0 ? null : props.empty ? (
        <EmptyLoop {...props} width={width} height={height} empty={props.empty} />
      ) : (
        <FullLoop {...props} width={width} height={height} />
      )}
    </View>
  );
}

interface Drawn {
  width: number;
  height: number;
}

function EmptyLoop({
  empty,
  width,
  height,
}: Drawn & { empty: NonNullable<LoopCardProps["empty"]> }) {
  const { colour } = useTheme();
  return (
    <>
      <View aria-hidden style={{ position: "absolute" }}>
        <Svg width={width} height={height}>
          <Path
            d={loopHalves(width, height).whole}
            fill="none"
            stroke={colour.ruleStrong}
            strokeWidth={2.2}
            strokeDasharray="3 6"
            strokeLinecap="round"
          />
        </Svg>
      </View>
      <View
        style={{
          position: "absolute",
          left: 34,
          right: 44,
          top: 20,
          bottom: 20,
          justifyContent: "center",
        }}
      >
        <View style={{ flexDirection: "row", gap: 8, alignItems: "center" }}>
          <Mark kind={empty.kind} />
          <Text variant="subhead" level="none">
            {empty.title}
          </Text>
        </View>
        {empty.detail ? (
          <Text variant="bodyWide" tone="ink2">
            {empty.detail}
          </Text>
        ) : null}
      </View>
    </>
  );
}

function FullLoop(props: LoopCardProps & Drawn) {
  const { colour } = useTheme();
  const t = useWords("ui");
  const { width, height, service } = props;
  const ground = props.ground ?? "sheet";
  const pipe = pipeStroke(props.nominalMm);
  const hues = serviceColours(service, colour, props.doing);
  const halves = loopHalves(width, height);
  const mid = height / 2;
  const right = width - 24;
  const flange = pipe / 2 + 3;
  const heating = hues.main === colour.copper;
  const tip = 8.1 * (heating ? 1 : -1);
  return (
    <>
      <View aria-hidden style={{ position: "absolute" }}>
        <Svg width={width} height={height}>
          <Path d={halves.supply} fill="none" stroke={hues.main} strokeWidth={pipe} />
          <Path d={halves.return} fill="none" stroke={hues.mid} strokeWidth={pipe} />
          <Path d={halves.return} fill="none" stroke={hues.faint} strokeWidth={hollowCore(pipe)} />
          <Path
            d={`M${10 - flange} ${mid - 3}h${2 * flange}M${10 - flange} ${mid + 3}h${2 * flange}`}
            stroke={colour.ink}
            strokeWidth={2.2}
          />
          <Rect
            x={10 - flange + 2}
            y={mid - 2}
            width={2 * flange - 4}
            height={4}
            fill={colour[ground]}
          />
          <Rect x={right - 13.5} y={mid - 13.5} width={27} height={27} fill={colour[ground]} />
          <Path
            d={`M${right - tip} ${mid - 9}L${right + tip} ${mid}L${right - tip} ${mid + 9}z`}
            fill={hues.main}
          />
          <FlowArrow
            pipe={pipe}
            x={props.meterSide === "supply" ? Math.max(152, right - 170) : right - 38}
            fill={hues.main}
            on={colour[ground]}
          />
        </Svg>
      </View>
      <PipeLabel
        edge="top"
        side="left"
        name={t("loop.supply")}
        shown={props.supply}
        ground={ground}
      />
      <PipeLabel
        edge="bottom"
        side="left"
        name={t("loop.return")}
        shown={props.return}
        ground={ground}
      />
      <PipeLabel
        edge={props.meterSide === "supply" ? "top" : "bottom"}
        side="right"
        name={t("loop.flow")}
        nameHidden
        shown={props.flow}
        ground={ground}
        clamps={pipe}
      />
      <View
        style={{
          position: "absolute",
          left: 32,
          right: 46,
          top: 28,
          bottom: 28,
          flexDirection: "row",
          alignItems: "center",
          justifyContent: "space-between",
          gap: 8,
        }}
      >
        <View style={{ flexShrink: 1 }}>
          {props.power ? (
            <Figure
              {...props.power}
              size={props.powerSize ?? "m"}
              said={t("loop.power")}
              {...props.powerWorkings}
            />
          ) : null}
          {props.energy ? (
            <View style={{ flexDirection: "row", gap: 5, alignItems: "baseline" }}>
              {props.energyLabel ? (
                <Text variant="unit" tone="ink3">
                  {props.energyLabel}
                </Text>
              ) : null}
              <Figure
                {...props.energy}
                size="s"
                said={t("loop.energy")}
                {...props.energyWorkings}
              />
            </View>
          ) : null}
        </View>
        {props.deltaT ? (
          <View style={{ alignItems: "flex-end" }}>
            <Text variant="small" tone="ink3" hidden>
              ΔT
            </Text>
            <Figure {...props.deltaT} size="s" said={t("loop.deltaT")} />
          </View>
        ) : null}
      </View>
    </>
  );
}

/** Which way supply runs: two strokes cut into a wide pipe, one arrowhead on a thin one. */
function FlowArrow({ pipe, x, fill, on }: { pipe: number; x: number; fill: string; on: string }) {
  if (pipe < 9) return <Path d={`M${x} 7l13 7-13 7z`} fill={fill} />;
  const h = pipe * 0.36;
  const stroke = { fill: "none", stroke: on, strokeWidth: 1.7 } as const;
  return (
    <>
      <Path
        d={`M${x} ${14 - h}l6 ${h}l-6 ${h}`}
        {...stroke}
        strokeLinecap="round"
        strokeLinejoin="round"
      />
      <Path
        d={`M${x + 14} ${14 - h}l6 ${h}l-6 ${h}`}
        {...stroke}
        strokeLinecap="round"
        strokeLinejoin="round"
      />
    </>
  );
}
