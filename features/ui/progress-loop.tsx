import { View } from "react-native";
import Svg, { Path } from "react-native-svg";

import { closedLoop } from "./pipe-drawing";
import { Inline, Text } from "./text";
import { useMeasuredWidth, useTheme } from "./theme";

export interface ProgressLoopProps {
  label: string;
  /** Part done, 0…1; null while the total is not known. */
  part: number | null;
  /** “7,412”. */
  value: string;
  /** “of 12,093 rows”. */
  of?: string;
  /** “about 20 s left”. */
  note?: string;
  height?: number;
}

/** A loop that fills clockwise. Progress is read politely by screen readers, not on every row. */
export function ProgressLoop(props: ProgressLoopProps) {
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const height = props.height ?? 160;
  const percent =
    props.part === null ? undefined : Math.round(Math.min(1, Math.max(0, props.part)) * 100);
  const path = closedLoop(14, 12, width - 14, height - 12, 30);
  return (
    <View
      onLayout={onLayout}
      role="progressbar"
      aria-label={props.label}
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={percent}
      aria-valuetext={[props.value, props.of, props.note].filter(Boolean).join(" ")}
      style={{ height, alignSelf: "stretch" }}
    >
      {width > 60 ? (
        <View aria-hidden style={{ position: "absolute" }}>
          <Svg width={width} height={height}>
            <Path d={path} fill="none" stroke={colour.slateTint} strokeWidth={10} />
            {percent ? (
              <Path
                d={path}
                fill="none"
                stroke={colour.ink}
                strokeWidth={10}
                strokeDasharray={`${(percent / 100) * loopLength(width, height)} ${2 * loopLength(width, height)}`}
              />
            ) : null}
          </Svg>
        </View>
      ) : null}
      <View
        style={{ position: "absolute", inset: 24, alignItems: "center", justifyContent: "center" }}
      >
        <Text variant="figureL" align="center">
          {props.value}
          {props.of ? <Inline variant="unit" tone="ink3">{` ${props.of}`}</Inline> : null}
        </Text>
        {props.note ? (
          <Text variant="small" tone="ink3" align="center">
            {props.note}
          </Text>
        ) : null}
      </View>
    </View>
  );
}

/** Length of the loop's centre line, px: straight parts and four quarter bends of 30. */
function loopLength(width: number, height: number): number {
  const w = width - 28;
  const h = height - 24;
  return 2 * (w - 60) + 2 * (h - 60) + 2 * Math.PI * 30;
}

export type StageState = "done" | "current" | "waiting";

/** The stages under a progress loop. */
export function StageList(props: {
  stages: readonly { key: string; label: string; state: StageState }[];
}) {
  const { colour } = useTheme();
  return (
    <View role="list">
      {props.stages.map((stage) => (
        <View
          key={stage.key}
          role="listitem"
          aria-current={stage.state === "current" ? "step" : undefined}
          style={{
            flexDirection: "row",
            gap: 12,
            alignItems: "center",
            minHeight: 48,
            borderTopWidth: 1,
            borderTopColor: colour.rule,
          }}
        >
          <View aria-hidden style={{ width: 22 }}>
            <StageMark state={stage.state} />
          </View>
          <Text
            variant={stage.state === "current" ? "subhead" : "body"}
            level="none"
            tone={stage.state === "current" ? "ink" : "ink2"}
          >
            {stage.label}
          </Text>
        </View>
      ))}
    </View>
  );
}

function StageMark({ state }: { state: StageState }) {
  const { colour } = useTheme();
  const pen = { fill: "none", strokeLinecap: "round", strokeLinejoin: "round" } as const;
  return (
    <Svg width={20} height={20}>
      {state === "done" ? (
        <Path d="M4 10.500l4 4 8-9" {...pen} stroke={colour.ink} strokeWidth={2.4} />
      ) : state === "current" ? (
        <Path d="M10 3a7 7 0 1 1-6.700 5" {...pen} stroke={colour.ink} strokeWidth={2.6} />
      ) : (
        <Path
          d="M4.500 10a5.500 5.500 0 1 0 11 0a5.500 5.500 0 1 0-11 0"
          {...pen}
          stroke={colour.ruleStrong}
          strokeWidth={2}
        />
      )}
    </Svg>
  );
}
