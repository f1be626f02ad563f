import { View } from "react-native";
import Svg, { Path, Rect } from "react-native-svg";

import { useMeasuredWidth, useTheme } from "./theme";

export interface SparkProps {
  /** One sentence that says what the picture shows. */
  label: string;
  /** NaN is a gap in the line. */
  values: ArrayLike<number>;
  /** The stretch the check is about, as parts 0…1. */
  highlight?: {
    readonly from: number;
    readonly to: number;
    readonly tone: "look" | "wrong" | "mark";
  };
  height?: number;
}

/** A mini picture for a check: one line, the stretch in question behind it. */
export function Spark({ label, values, highlight, height = 48 }: SparkProps) {
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const fills = { look: colour.brassTint, wrong: colour.madderTint, mark: colour.markTint };
  const edges = { look: colour.brassMid, wrong: colour.madderMid, mark: colour.mark };
  return (
    <View
      role="img"
      aria-label={label}
      onLayout={onLayout}
      style={{ height, alignSelf: "stretch" }}
    >
      {width > 0 ? (
        <Svg width={width} height={height}>
          {highlight ? (
            <Rect
              x={highlight.from * width}
              y={0}
              width={Math.max(3, (highlight.to - highlight.from) * width)}
              height={height}
              fill={fills[highlight.tone]}
              stroke={edges[highlight.tone]}
              strokeWidth={1}
            />
          ) : null}
          <Path
            d={sparkPath(values, width, height)}
            fill="none"
            stroke={colour.ink}
            strokeWidth={1.5}
            strokeLinejoin="round"
          />
        </Svg>
      ) : null}
    </View>
  );
}

/** The least and the greatest of values; null where all are NaN. */
export function sparkRange(values: ArrayLike<number>): SparkRange | null {
  let least = Infinity;
  let greatest = -Infinity;
  for (let i = 0; i < values.length; i++) {
    const value = values[i] ?? NaN;
    if (value < least) least = value;
    if (value > greatest) greatest = value;
  }
  return least <= greatest ? { least, greatest } : null;
}

export interface SparkRange {
  readonly least: number;
  readonly greatest: number;
}

/**
 * Line through the values, scaled to the box with 3 px to spare; gaps lift the pen. Two lines share a
 * scale where both are given the same range.
 */
export function sparkPath(
  values: ArrayLike<number>,
  width: number,
  height: number,
  range = sparkRange(values),
): string {
  const { least, greatest } = range ?? { least: 0, greatest: 0 };
  const span = greatest > least ? greatest - least : 1;
  const step = width / Math.max(1, values.length - 1);
  let path = "";
  let down = false;
  for (let i = 0; i < values.length; i++) {
    const value = values[i] ?? NaN;
    if (Number.isNaN(value)) {
      down = false;
      continue;
    }
    const y = height - 3 - ((value - least) / span) * (height - 6);
    path += `${down ? "L" : "M"}${(i * step).toFixed(1)} ${y.toFixed(1)}`;
    down = true;
  }
  return path;
}
