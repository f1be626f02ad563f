import { View } from "react-native";
import Svg, { Circle, G, Line, Path, Rect, Text as SvgText } from "react-native-svg";

import { useWords, type Format } from "@features/i18n";
import { serviceColours, typeScale, useTheme, type Service } from "@features/ui";

/** Bore, wall and lining as they are known, mm. */
export interface Bore {
  readonly outsideDiameterMm: number;
  readonly wallMm: number;
  readonly liningMm: number;
  readonly insideDiameterMm: number;
}

const outerPx = 54;

/** The pipe cut across, wall in proportion, with the clamped meter and the path of its sound. */
export function PipeSection(props: { bore: Bore; service: Service; format: Format }) {
  const { bore, format } = props;
  const { colour } = useTheme();
  const t = useWords("loops");
  const hue = serviceColours(props.service, colour).faint;
  const innerPx = outerPx * (bore.insideDiameterMm / bore.outsideDiameterMm);
  const inside = format.number(format.toDisplay(bore.insideDiameterMm, "pipeSize"), places(format));
  const labelWidth = inside.length * 9 + 8;
  return (
    <View
      role="img"
      aria-label={t("pipe.said", {
        inside: format.withUnit(bore.insideDiameterMm, "pipeSize", places(format)),
      })}
      style={{ width: 128, height: 132 }}
    >
      <Svg width={128} height={132} viewBox="0 0 128 132">
        <G x={58} y={66}>
          <Circle r={outerPx} fill={colour.slate} />
          <Circle r={innerPx} fill={hue} />
          <G rotation={-38}>
            <Rect x={outerPx} y={-13} width={10} height={26} rx={2} fill={colour.ink} />
            <Path
              d={`M${innerPx} -3.5H${-innerPx}M${innerPx} 3.5H${-innerPx}`}
              stroke={colour.ink3}
              strokeDasharray="2 3"
              strokeWidth={1.3}
            />
          </G>
          <Line x1={-innerPx} x2={innerPx} y1={0} y2={0} stroke={colour.ink} strokeWidth={1.3} />
          <Path d={`M${-innerPx} 0l8 -4v8zM${innerPx} 0l-8 -4v8z`} fill={colour.ink} />
          <Rect x={-labelWidth / 2} y={-11} width={labelWidth} height={22} fill={hue} />
          <SvgText
            y={5}
            textAnchor="middle"
            fill={colour.ink}
            fontFamily={typeScale.figureS.fontFamily}
            fontSize={typeScale.figureS.fontSize}
          >
            {inside}
          </SvgText>
        </G>
      </Svg>
    </View>
  );
}

/** A tenth of a millimetre, or three places of an inch. */
export function places(format: Format): number {
  return format.unit("pipeSize").unit === "mm" ? 1 : 3;
}
