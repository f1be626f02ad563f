import { useId } from "react";
import { View } from "react-native";
import Svg, { Defs, Path, Pattern, Rect } from "react-native-svg";

import { useWords } from "@features/i18n";

import { Row } from "./stack";
import { Text } from "./text";
import { useMeasuredWidth, useTheme } from "./theme";

/** What became of a stretch of time. */
export type Quality = "measured" | "estimated" | "excluded" | "missing";

/** One stretch, as parts 0…1 of the strip. */
export interface QualityStretch {
  readonly from: number;
  readonly to: number;
  readonly quality: Quality;
}

/** Hatches of the four qualities; use `url(#${id}-estimated)` and `url(#${id}-excluded)`. */
export function QualityPatterns({ id }: { id: string }) {
  const { colour } = useTheme();
  return (
    <Defs>
      <Pattern id={`${id}-estimated`} width={5} height={5} patternUnits="userSpaceOnUse">
        <Rect width={5} height={5} fill={colour.brassTint} />
        <Path d="M-1 6L6 -1" stroke={colour.brassMid} strokeWidth={1.6} />
      </Pattern>
      <Pattern id={`${id}-excluded`} width={6} height={6} patternUnits="userSpaceOnUse">
        <Rect width={6} height={6} fill={colour.madderTint} />
        <Path d="M0 0L6 6M6 0L0 6" stroke={colour.madderMid} strokeWidth={1.3} />
      </Pattern>
    </Defs>
  );
}

/** A rectangle in the look of its quality; needs QualityPatterns of the same id in the same Svg. */
export function QualityRect(props: {
  id: string;
  quality: Quality;
  x: number;
  y: number;
  width: number;
  height: number;
}) {
  const { colour } = useTheme();
  const { quality, id, ...box } = props;
  switch (quality) {
    case "measured":
      return <Rect {...box} fill={colour.slate} />;
    case "estimated":
      return (
        <Rect {...box} fill={`url(#${id}-estimated)`} stroke={colour.brassMid} strokeWidth={1} />
      );
    case "excluded":
      return (
        <Rect {...box} fill={`url(#${id}-excluded)`} stroke={colour.madderMid} strokeWidth={1} />
      );
    case "missing":
      return (
        <Rect
          {...box}
          fill={colour.sheet}
          stroke={colour.ruleStrong}
          strokeWidth={1.2}
          strokeDasharray="3 2"
        />
      );
  }
}

/** A stretch of time by quality. Short troubles are drawn at least 7 px wide: they must be seen. */
export function QualityStrip(props: {
  label: string;
  stretches: readonly QualityStretch[];
  height?: number;
}) {
  const id = useId().replace(/:/g, "");
  const [width, onLayout] = useMeasuredWidth();
  const height = props.height ?? 12;
  // Trouble last, so a widened short gap stands on top of the measured strip.
  const inOrder = [...props.stretches].sort(
    (a, b) => Number(a.quality !== "measured") - Number(b.quality !== "measured"),
  );
  return (
    <View
      role="img"
      aria-label={props.label}
      onLayout={onLayout}
      style={{ height, alignSelf: "stretch" }}
    >
      {width > 0 ? (
        <Svg width={width} height={height}>
          <QualityPatterns id={id} />
          {inOrder.map((stretch) => {
            const least = stretch.quality === "measured" ? 1 : 7;
            const w = Math.max(least, (stretch.to - stretch.from) * width);
            const x = Math.min(
              width - w,
              Math.max(0, stretch.from * width - (w - (stretch.to - stretch.from) * width) / 2),
            );
            const inset = stretch.quality === "measured" ? 3 : 0.6;
            return (
              <QualityRect
                key={`${stretch.from} ${stretch.quality}`}
                id={id}
                quality={stretch.quality}
                x={x}
                y={inset}
                width={w}
                height={height - 2 * inset}
              />
            );
          })}
        </Svg>
      ) : null}
    </View>
  );
}

/** Key to the four qualities. */
export function QualityKey({ only }: { only?: readonly Quality[] }) {
  const id = useId().replace(/:/g, "");
  const t = useWords("ui");
  const kinds = only ?? (["measured", "estimated", "excluded", "missing"] as const);
  return (
    <Row gap={3} wrap>
      {kinds.map((quality) => (
        <Row key={quality} gap={1}>
          <View aria-hidden>
            <Svg width={20} height={10}>
              <QualityPatterns id={`${id}${quality}`} />
              <QualityRect
                id={`${id}${quality}`}
                quality={quality}
                x={0.6}
                y={0.6}
                width={18.8}
                height={8.8}
              />
            </Svg>
          </View>
          <Text variant="chip" tone="ink2">
            {t(`quality.${quality}`)}
          </Text>
        </Row>
      ))}
    </Row>
  );
}
