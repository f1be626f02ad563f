import { View } from "react-native";
import Svg, { Circle, G, Path, Rect, Text as SvgText } from "react-native-svg";

import { useFormat } from "@features/i18n";

import { font, typeScale, useTheme } from "./theme";

export interface PipeSectionProps {
  /** All in mm; the drawing is to scale. Null draws an empty dashed ring. */
  pipe: {
    readonly outsideDiameterMm: number;
    readonly wallMm: number;
    readonly liningMm: number;
    readonly insideDiameterMm: number;
  } | null;
  /** A sentence for screen readers: “Bore 102.3 mm inside a wall of 6.0 mm”. */
  label: string;
  /** The bore as shown inside the ring, in the account's unit and without it; left out on null. */
  bore: string | null;
  /** Tints the water; grey while the service is not known. */
  service?: "cooling" | "heating" | null;
  /** Draws the sensors clamped on, with the sound path through the water. */
  sensors?: boolean;
  size?: number;
}

/** A pipe cut across, to scale: wall, lining, bore and where the sensors sit. */
export function PipeSection(props: PipeSectionProps) {
  const { colour } = useTheme();
  const { pipe, service = null, sensors } = props;
  const size = props.size ?? 132;
  // The ring takes 108 of 132 px; the rest is room for the sensors.
  const outer = size * 0.41;
  const scale = pipe ? (2 * outer) / pipe.outsideDiameterMm : 0;
  // A wall is never drawn thinner than its own stroke would be.
  const wall = pipe ? Math.max(1.5, pipe.wallMm * scale) : 0;
  const lining = pipe && pipe.liningMm > 0 ? Math.max(1.2, pipe.liningMm * scale) : 0;
  const inner = Math.max(4, outer - wall - lining);
  const water =
    service === "heating"
      ? colour.copperFaint
      : service === "cooling"
        ? colour.verdigrisFaint
        : colour.well;
  const half = (props.bore?.length ?? 0) * size * 0.035 + size * 0.06;
  const arrow = size * 0.06;
  return (
    <View role="img" aria-label={props.label} style={{ width: size, height: size }}>
      <Svg width={size} height={size} viewBox={`${-size / 2} ${-size / 2} ${size} ${size}`}>
        {pipe === null ? (
          <Circle
            r={outer}
            fill="none"
            stroke={colour.ruleStrong}
            strokeWidth={2}
            strokeDasharray="3 3"
          />
        ) : (
          <>
            <Circle r={outer} fill={colour.slate} />
            {lining > 0 ? <Circle r={outer - wall} fill={colour.slateTint} /> : null}
            <Circle r={inner} fill={water} />
            {sensors ? (
              <G rotation={-38}>
                <Rect
                  x={outer}
                  y={-size * 0.1}
                  width={size * 0.076}
                  height={size * 0.2}
                  rx={2}
                  fill={colour.ink}
                />
                <Path
                  d={`M${inner} -3.5H${-inner}M${inner} 3.5H${-inner}`}
                  stroke={colour.ink3}
                  strokeDasharray="2 3"
                  strokeWidth={1.3}
                />
              </G>
            ) : null}
            {props.bore === null ? null : (
              <>
                <Path d={`M${-inner} 0H${inner}`} stroke={colour.ink} strokeWidth={1.3} />
                <Path
                  d={`M${-inner} 0l${arrow} ${-arrow / 2}v${arrow}zM${inner} 0l${-arrow} ${-arrow / 2}v${arrow}z`}
                  fill={colour.ink}
                />
                <Rect
                  x={-half}
                  y={-size * 0.083}
                  width={2 * half}
                  height={size * 0.167}
                  fill={water}
                />
                <SvgText
                  y={size * 0.038}
                  textAnchor="middle"
                  fontFamily={font.ui.semibold}
                  fontSize={typeScale.figureS.fontSize}
                  fill={colour.ink}
                >
                  {props.bore}
                </SvgText>
              </>
            )}
          </>
        )}
      </Svg>
    </View>
  );
}

/** The bore as written inside a PipeSection, in the account's unit. */
export function useBoreText(siteUnits?: "si" | "inchPound"): (boreMm: number) => string {
  const format = useFormat(undefined, siteUnits);
  return (boreMm) =>
    format.number(
      format.toDisplay(boreMm, "pipeSize"),
      format.unitSystem === "inchPound" ? 2 : boreMm >= 1000 ? 0 : 1,
    );
}
