import { View } from "react-native";
import Svg, { Circle, Line, Rect, Text as SvgText } from "react-native-svg";
import { useFormat, useWords } from "@features/i18n";
import { font, Text, useMeasuredWidth, useTheme } from "@features/ui";
import type { LoggerClock } from "@shared/domain/log-files/recipe";
import { HOUR_MS } from "@shared/domain/time/interval";
import { zoneOffsets } from "@shared/domain/time/zone-offsets";
import { placeOf } from "./clock-choice";
import { loggerOffsetMs } from "./logger-offset";

const HEIGHT = 104;
const TICKS = 5;

const clockText = (localMs: number): string => new Date(localMs).toISOString().slice(11, 16);

/** The logger's clock above, the site's below, and the line by which the first row moves. */
export function TwoClocks(props: {
  firstRow: { instant: string; cell: string };
  clock: LoggerClock;
  siteZone: string;
}) {
  const t = useWords("imports");
  const format = useFormat(props.siteZone);
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const utcMs = Date.parse(props.firstRow.instant);
  const loggerMs = utcMs + loggerOffsetMs(props.clock, props.siteZone, utcMs);
  const localMs = utcMs + zoneOffsets(props.siteZone).offsetAt(utcMs);
  const moved = localMs - loggerMs;
  const place = placeOf(props.siteZone);
  const sentence =
    moved === 0
      ? t("time.clocks.same")
      : t(moved > 0 ? "time.clocks.moved" : "time.clocks.movedEarlier", {
          by: format.duration(Math.abs(moved) / 1000),
        });

  const firstTickMs = Math.floor(loggerMs / HOUR_MS) * HOUR_MS - HOUR_MS;
  const x = (ms: number) => ((ms - firstTickMs) / (TICKS * HOUR_MS)) * (width - 2) + 1;
  const at = x(loggerMs);
  const label = Math.min(at + 10, Math.max(0, width - 196));
  return (
    <View style={{ marginTop: 18 }}>
      <Text variant="unit" tone="ink2">
        {t("time.clocks.logger")}
      </Text>
      <View
        role="img"
        aria-label={t("time.clocks.summary", {
          logger: clockText(loggerMs),
          local: clockText(localMs),
        })}
        onLayout={onLayout}
        style={{ height: HEIGHT }}
      >
        {width > 0 ? (
          <Svg width={width} height={HEIGHT}>
            {[24, 76].map((y) => (
              <Line key={y} x1={0} x2={width} y1={y} y2={y} stroke={colour.ink} strokeWidth={2} />
            ))}
            {Array.from({ length: TICKS + 1 }, (_, tick) => firstTickMs + tick * HOUR_MS).map(
              (ms, index) => (
                <ClockTick
                  key={ms}
                  x={x(ms)}
                  logger={index < TICKS ? clockText(ms) : null}
                  local={index < TICKS ? clockText(ms + moved) : null}
                />
              ),
            )}
            <Line x1={at} x2={at} y1={24} y2={76} stroke={colour.mark} strokeWidth={2.5} />
            <Circle cx={at} cy={24} r={5} fill={colour.mark} />
            <Circle cx={at} cy={76} r={5} fill={colour.mark} />
            <Rect x={label} y={38} width={186} height={25} rx={5} fill={colour.markTint} />
            <SvgText
              x={label + 10}
              y={55}
              fontSize={14}
              fontFamily={font.narrow.semibold}
              fill={colour.ink}
            >
              {sentence}
            </SvgText>
          </Svg>
        ) : null}
      </View>
      <Text variant="unit" tone="ink2">
        {t("time.clocks.local", { place })}
      </Text>
    </View>
  );
}

function ClockTick(props: { x: number; logger: string | null; local: string | null }) {
  const { colour } = useTheme();
  return (
    <>
      <Line x1={props.x} x2={props.x} y1={16} y2={24} stroke={colour.ink} strokeWidth={1.6} />
      <Line x1={props.x} x2={props.x} y1={76} y2={84} stroke={colour.ink} strokeWidth={1.6} />
      {props.logger ? <TickLabel x={props.x} y={17} text={props.logger} /> : null}
      {props.local ? <TickLabel x={props.x} y={96} text={props.local} /> : null}
    </>
  );
}

function TickLabel(props: { x: number; y: number; text: string }) {
  const { colour } = useTheme();
  return (
    <SvgText
      x={props.x + 5}
      y={props.y}
      fontSize={14}
      fontFamily={font.mono.regular}
      fill={colour.ink2}
    >
      {props.text}
    </SvgText>
  );
}
