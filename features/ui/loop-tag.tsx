import { View } from "react-native";
import Svg, { Path, Text as SvgText } from "react-native-svg";

import { useWords } from "@features/i18n";

import { font, useTheme } from "./theme";

/** What a loop carries; `changeover` is a two-pipe loop that does both in turn. */
export type Service = "cooling" | "heating" | "changeover";

export interface LoopTagProps {
  tag: string;
  service: Service;
  /** Outline: the visit is done, or the loop is secondary. */
  outline?: boolean;
  size?: "s" | "m" | "l";
}

const heights = { s: 22.1, m: 24.7, l: 30 } as const;

/** Widths of capitals and digits in the narrow face, as parts of the size; generous by a hair. */
function textWidth(text: string, size: number): number {
  let ems = 0;
  for (const letter of text) {
    if (/[MW]/.test(letter)) ems += 0.74;
    else if (/[-.·/I1 ]/.test(letter)) ems += 0.36;
    else ems += 0.53;
  }
  return ems * size;
}

/** A pipe marker: cooling ends in a notch (heat taken in), heating in a point (heat given out). */
export function LoopTag({ tag, service, outline, size = "m" }: LoopTagProps) {
  const { colour } = useTheme();
  const t = useWords("ui");
  const h = heights[size];
  const type = h * 0.577;
  const tip = 0.279 * h;
  const body = Math.max(textWidth(tag, type), 1.2 * h) + 0.72 * h;
  const w = body + tip;
  const right = w - 0.75;
  const end =
    service === "cooling"
      ? `H${right}L${body} ${h / 2}L${right} ${h - 0.75}`
      : service === "heating"
        ? `H${body}L${right} ${h / 2}L${body} ${h - 0.75}`
        : `H${right}V${h - 0.75}`;
  const shape = `M4 .75${end}H4A3.25 3.25 0 0 1 .75 ${h - 4}V4A3.25 3.25 0 0 1 4 .75z`;
  const main = service === "heating" ? colour.copper : colour.verdigris;
  const onMain = service === "heating" ? colour.onCopper : colour.onVerdigris;
  const both = service === "changeover";
  const textMiddle = service === "changeover" ? (w - 0.28 * h) / 2 : body / 2 + 1;
  return (
    <View
      role="img"
      aria-label={t("tag.said", { tag, service: t(`service.${service}`) })}
      style={{ width: w, height: h, flexShrink: 0 }}
    >
      <Svg width={w} height={h} viewBox={`0 0 ${w} ${h}`}>
        <Path d={shape} fill={outline ? "none" : main} stroke={main} strokeWidth={1.5} />
        {both ? (
          // Two halves at the end: the loop gives heat out for one season and takes it in for the other.
          <Path
            d={`M${right} .75V${h - 0.75}H${right - tip}L${right - tip} .75z`}
            fill={colour.copper}
          />
        ) : null}
        <SvgText
          x={textMiddle}
          y={h / 2 + type * 0.355}
          textAnchor="middle"
          fontFamily={font.narrow.semibold}
          fontSize={type}
          fill={outline ? main : onMain}
        >
          {tag}
        </SvgText>
      </Svg>
    </View>
  );
}
