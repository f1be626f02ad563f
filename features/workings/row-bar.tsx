import { useId } from "react";
import { View } from "react-native";
import Svg from "react-native-svg";

import type { Workings } from "@shared/contracts/workings";
import { QualityPatterns, QualityRect, useMeasuredWidth, type Quality } from "@features/ui";

const height = 16;
const gap = 5;
/** A hundredth of a hair would be no sight of trouble: each kind gets some room. */
const leastWidth = 22;

/** Rows by what became of them, in one bar; the words under it say the counts. */
export function RowBar({ rows, label }: { rows: Workings["rows"]; label: string }) {
  const id = useId().replace(/:/g, "");
  const [width, onLayout] = useMeasuredWidth();
  const kinds: readonly { quality: Quality; count: number }[] = [
    { quality: "measured", count: rows.measured },
    { quality: "estimated", count: rows.filled },
    { quality: "excluded", count: rows.excluded + rows.noReading },
    { quality: "missing", count: rows.missing ?? 0 },
  ];
  const shown = kinds.filter(({ count }) => count > 0);
  const all = shown.reduce((sum, { count }) => sum + count, 0);
  const room = width - gap * Math.max(0, shown.length - 1) - 2;
  const wished = shown.map(({ count }) => Math.max(leastWidth, (count / all) * room));
  const scale = room / wished.reduce((sum, one) => sum + one, 0);
  let x = 1;
  return (
    <View role="img" aria-label={label} onLayout={onLayout} style={{ height }}>
      {width > 0 && shown.length > 0 ? (
        <Svg width={width} height={height}>
          <QualityPatterns id={id} />
          {shown.map(({ quality }, at) => {
            const own = (wished[at] ?? 0) * scale;
            const from = x;
            x += own + gap;
            return (
              <QualityRect
                key={quality}
                id={id}
                quality={quality}
                x={from}
                y={1}
                width={own}
                height={height - 2}
              />
            );
          })}
        </Svg>
      ) : null}
    </View>
  );
}
