import { View } from "react-native";

import type { ShapePeak } from "@shared/contracts/shape";
import { useWords } from "@features/i18n";
import { Card, Figure, Row, Segments, Text, useBreakpoint, useTheme } from "@features/ui";

import type { WorkingsKey } from "@features/workings/workings-key";

import { LoadFigure, useHours } from "./load-figure";
import type { LoadFigures } from "./load-view";
import type { PeakWindow } from "./loops-queries";
import { powerQuantity, registersOf } from "./register-words";
import { shownFigure } from "./shown-figure";

const windows: readonly PeakWindow[] = ["15", "30", "60"];

/** The peak by both definitions, each with when it was and what load factor stands on it. */
export function LoadPeaks(
  props: LoadFigures & { window: PeakWindow; onWindow: (minutes: PeakWindow) => void },
) {
  const { shape, format } = props;
  const t = useWords("load");
  const phone = useBreakpoint() === "phone";
  const { colour } = useTheme();
  const hours = useHours(format);
  const power = powerQuantity[shape.register];
  const minutes = shape.windowMinutes;
  const { fixed, rolling } = shape.peaks;
  return (
    <Card label={t("peak.title")} pad={phone ? 3 : 4}>
      <Row justify="space-between" wrap gap={3} style={{ marginBottom: 12 }}>
        <Text variant={phone ? "subhead" : "heading"} level={2}>
          {t("peak.title")}
        </Text>
        <Segments
          label={t("peak.window")}
          value={props.window}
          size={phone ? "default" : "dense"}
          options={windows.map((value) => ({
            value,
            label: t("peak.minutes", { minutes: value }),
          }))}
          onChange={props.onWindow}
        />
      </Row>
      {fixed === null && rolling === null ? (
        <Text tone="ink2">
          {minutes < shape.stepMinutes
            ? t("peak.stepLonger", { step: format.duration(shape.stepMinutes * 60), minutes })
            : t("peak.noWhole", { minutes })}
        </Text>
      ) : (
        <View style={{ flexDirection: "row", flexWrap: "wrap", gap: phone ? 16 : 28 }}>
          <Peak
            {...props}
            title={t("peak.fixed")}
            words={t("peak.fixedWords", { minutes })}
            peak={fixed}
          />
          <Peak
            {...props}
            title={t("peak.rolling", { minutes })}
            words={t("peak.rollingWords", { minutes })}
            peak={rolling}
          />
        </View>
      )}
      <View
        style={{
          flexDirection: "row",
          flexWrap: "wrap",
          columnGap: phone ? 16 : 28,
          rowGap: 12,
          marginTop: 14,
          paddingTop: 12,
          borderTopWidth: 1,
          borderTopColor: colour.rule,
        }}
      >
        <LoadFigure
          title={t("peak.mean")}
          figure={shownFigure(format, shape.meanKw, power, undefined, shape.meanPlusMinus)}
          workings={props.workings.figure(
            powerKey(props, { from: props.range.from, to: props.range.until }),
          )}
        >
          {t("peak.meanWords")}
        </LoadFigure>
        {shape.design ? (
          <LoadFigure
            title={t("peak.design")}
            figure={shownFigure(format, shape.design.powerKw, power)}
          >
            {shape.design.fullLoadHours === null
              ? null
              : t("peak.designWords", { hours: hours(shape.design.fullLoadHours) })}
          </LoadFigure>
        ) : null}
      </View>
    </Card>
  );
}

/** A mean power over a window, whose workings are of the register that the shape is of. */
function powerKey(
  { shape, loop }: LoadFigures,
  { from, to }: { readonly from: string; readonly to: string },
): WorkingsKey {
  const alone = registersOf(loop.service).length === 1;
  return { figure: "power", ...(alone ? {} : { register: shape.register }), from, to };
}

function Peak(props: LoadFigures & { title: string; words: string; peak: ShapePeak | null }) {
  const { peak, format, shape } = props;
  const t = useWords("load");
  const phone = useBreakpoint() === "phone";
  const hours = useHours(format);
  const from = peak && Date.parse(peak.from);
  return (
    <View style={{ flexGrow: 1, flexBasis: 150, minWidth: 150, gap: 2 }}>
      <Text variant="small" tone="ink3" hidden>
        {props.title}
      </Text>
      <Figure
        {...shownFigure(
          format,
          peak?.powerKw ?? null,
          powerQuantity[shape.register],
          undefined,
          peak?.plusMinus ?? null,
        )}
        size={phone ? "m" : "l"}
        said={props.title}
        {...(peak === null ? {} : props.workings.figure(powerKey(props, peak)))}
      />
      {peak === null || from === null ? null : (
        <>
          <Text variant="small" tone="ink2">
            {t("peak.when", {
              day: format.date(from),
              from: format.time(from),
              to: format.time(Date.parse(peak.to)),
            })}
          </Text>
          {peak.loadFactor === null ? null : (
            <Text variant="subhead" level="none" style={{ marginTop: 4 }}>
              {t("peak.factor", { value: format.number(peak.loadFactor, 3) })}
            </Text>
          )}
          {peak.fullLoadHours === null ? null : (
            <Text variant="small" tone="ink2">
              {t("peak.hours", { hours: hours(peak.fullLoadHours) })}
            </Text>
          )}
        </>
      )}
      <Text variant="small" tone="ink3">
        {props.words}
      </Text>
    </View>
  );
}
