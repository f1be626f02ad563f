import { View } from "react-native";
import Svg, { Line } from "react-native-svg";
import type { Instrument } from "@shared/contracts/evidence";
import { useMeasuredWidth, useTheme } from "@features/ui";
import { certificateToday, placeOf, type LifeScale } from "./calibration-life";

const height = 28;
const middle = height / 2;
const inset = 3;

/**
 * Life of a certificate on the kit's one time scale: solid until today, dashed until it is due, today
 * drawn through. The words beside it say the same.
 */
export function CalibrationBar(props: { instrument: Instrument; scale: LifeScale }) {
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const { instrument, scale } = props;
  const certificate = certificateToday(instrument, scale.today);
  const at = (isoDay: string) => inset + placeOf(scale, isoDay) * (width - 2 * inset);
  const today = at(scale.today);
  const from = certificate && at(certificate.issuedOn);
  const due = certificate?.dueOn ? at(certificate.dueOn) : null;
  const out = instrument.calibration === "lapsed";
  const soon = instrument.calibration === "dueSoon";
  const tick = (x: number, stroke: string) => (
    <Line x1={x} x2={x} y1={middle - 7} y2={middle + 7} stroke={stroke} strokeWidth={2} />
  );
  return (
    <View aria-hidden onLayout={onLayout} style={{ height, minWidth: 120, width: "100%" }}>
      {width > 0 ? (
        <Svg width={width} height={height}>
          {from === null ? null : (
            <>
              <Line
                x1={from}
                x2={out && due !== null ? due : today}
                y1={middle}
                y2={middle}
                stroke={colour.ink}
                strokeWidth={5}
              />
              {due === null ? null : (
                <Line
                  x1={Math.min(today, due)}
                  x2={Math.max(today, due)}
                  y1={middle}
                  y2={middle}
                  stroke={out ? colour.madderMid : soon ? colour.brassMid : colour.slate}
                  strokeWidth={5}
                  strokeDasharray={soon ? undefined : "3 2"}
                />
              )}
              {tick(from, out ? colour.madder : colour.ink)}
              {due === null ? null : tick(due, out ? colour.madder : colour.ink)}
            </>
          )}
          <Line x1={today} x2={today} y1={1} y2={height - 1} stroke={colour.mark} strokeWidth={2} />
        </Svg>
      ) : null}
    </View>
  );
}
