import { View } from "react-native";
import Svg, { Path, Rect } from "react-native-svg";
import type { ImportFinding } from "@shared/contracts/import-findings";
import { useFormat, useWords } from "@features/i18n";
import { sparkPath, sparkRange, useMeasuredWidth, useTheme } from "@features/ui";

const HEIGHT = 56;
const isTemperature = (channel: string) => channel === "supplyC" || channel === "returnC";

/** The readings round a finding, the stretch in question behind them; supply and return share a scale. */
export function FindingLines(props: { finding: ImportFinding; zone: string; stops: boolean }) {
  const { finding, zone, stops } = props;
  const t = useWords("findings");
  const format = useFormat(zone);
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const { picture } = finding;
  if (!picture) return null;
  const fromMs = Date.parse(picture.from);
  const lengthMs = Math.max(1, Date.parse(picture.to) - fromMs);
  const part = (instant: string) =>
    Math.min(1, Math.max(0, (Date.parse(instant) - fromMs) / lengthMs));
  const lines = picture.channels.map(({ channel, values }) => ({
    channel,
    values: values.map((value) => value ?? NaN),
  }));
  const shared = sparkRange(
    lines.filter(({ channel }) => isTemperature(channel)).flatMap(({ values }) => values),
  );
  const start = part(picture.mark.from) * width;
  return (
    <View
      role="img"
      aria-label={t("picture", {
        channels: lines.map(({ channel }) => t(`channel.${channel}`)).join(", "),
        from: format.dateTime(fromMs),
        to: format.dateTime(fromMs + lengthMs),
      })}
      onLayout={onLayout}
      style={{ height: HEIGHT, alignSelf: "stretch" }}
    >
      {width > 0 ? (
        <Svg width={width} height={HEIGHT}>
          <Rect
            x={start}
            y={0}
            width={Math.max(3, part(picture.mark.to) * width - start)}
            height={HEIGHT}
            fill={stops ? colour.madderTint : colour.brassTint}
            stroke={stops ? colour.madderMid : colour.brassMid}
            strokeWidth={1}
          />
          {lines.map(({ channel, values }, index) => (
            <Path
              key={channel}
              d={sparkPath(
                values,
                width,
                HEIGHT,
                isTemperature(channel) ? shared : sparkRange(values),
              )}
              fill="none"
              stroke={index === 0 ? colour.ink : colour.ink2}
              strokeDasharray={index === 0 ? undefined : "4 3"}
              strokeWidth={1.5}
              strokeLinejoin="round"
            />
          ))}
        </Svg>
      ) : null}
    </View>
  );
}
