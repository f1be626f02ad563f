import { useState } from "react";
import { View } from "react-native";
import Svg, { Rect } from "react-native-svg";
import { useFormat, useWords } from "@features/i18n";
import { Button, Row, Segments, Text, useMeasuredWidth, useTheme } from "@features/ui";
import type { ImportDetail, QuestionView } from "@shared/contracts/imports";
import type { FlowUnit } from "@shared/domain/log-files/recipe";
import { QuestionCard } from "./question-card";
import { speedsByUnit, USUAL_SPEED_M_PER_S, type SpeedUnderUnit } from "./water-speed";

interface FlowUnitQuestionProps {
  readonly question: Extract<QuestionView, { code: "flowUnit" }>;
  readonly pipe: ImportDetail["pipe"];
  readonly onUse: (unit: FlowUnit) => void;
}

/** An unknown flow unit, settled by the water speed that each choice means in this pipe. */
export function FlowUnitQuestion({ question, pipe, onUse }: FlowUnitQuestionProps) {
  const t = useWords("imports");
  const format = useFormat();
  const [picking, setPicking] = useState(false);
  const unitName = (unit: FlowUnit) => t(`columns.unit.${unit}`);
  const values = t("columns.flowUnit.values", {
    min: format.number(question.minValue),
    max: format.number(question.maxValue),
  });
  const speeds = pipe
    ? speedsByUnit(
        { min: question.minValue, max: question.maxValue },
        pipe.insideDiameterMm,
        question.choices,
      )
    : [];
  const likely = speeds.filter((speed) => speed.likely);
  const sole = likely.length === 1 ? likely[0] : undefined;
  const verdict = !pipe
    ? t("columns.flowUnit.noPipe")
    : sole
      ? t("columns.flowUnit.only", { pipe: pipe.label, unit: unitName(sole.unit) })
      : t(likely.length === 0 ? "columns.flowUnit.none" : "columns.flowUnit.several", {
          pipe: pipe.label,
        });
  const greatest = Math.max(4, ...speeds.map((speed) => Math.min(speed.greatestMPerS, 6)));

  return (
    <QuestionCard title={t("columns.flowUnit.title")} text={`${verdict} ${values}`}>
      {speeds.map((speed) => (
        <SpeedBar
          key={speed.unit}
          speed={speed}
          greatestMPerS={greatest}
          name={unitName(speed.unit)}
        />
      ))}
      {pipe ? (
        <Text variant="small" tone="ink2">
          {t("columns.flowUnit.usual", {
            min: format.number(USUAL_SPEED_M_PER_S.least, 1),
            max: format.number(USUAL_SPEED_M_PER_S.greatest, 1),
          })}
        </Text>
      ) : null}
      {sole && !picking ? (
        <Row gap={2} wrap>
          <Button
            label={t("columns.flowUnit.use", { unit: unitName(sole.unit) })}
            onPress={() => onUse(sole.unit)}
          />
          <Button
            kind="second"
            label={t("columns.flowUnit.other")}
            onPress={() => setPicking(true)}
          />
        </Row>
      ) : (
        <Segments
          label={t("columns.flowUnit.title")}
          value={null}
          full
          options={question.choices.map((unit) => ({ value: unit, label: unitName(unit) }))}
          onChange={onUse}
        />
      )}
    </QuestionCard>
  );
}

const BAR_HEIGHT = 18;

function SpeedBar(props: { speed: SpeedUnderUnit; greatestMPerS: number; name: string }) {
  const { speed, greatestMPerS, name } = props;
  const t = useWords("imports");
  const format = useFormat();
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const at = (mPerS: number) => (Math.min(mPerS, greatestMPerS) / greatestMPerS) * (width - 2) + 1;
  const range = t("columns.flowUnit.range", {
    min: format.number(speed.leastMPerS, 1),
    max: format.number(speed.greatestMPerS, 1),
  });
  const from = at(speed.leastMPerS);
  const length = Math.max(3, at(speed.greatestMPerS) - from);
  return (
    <View style={{ gap: 4 }}>
      <Row justify="space-between">
        <Text variant="label">{t("columns.flowUnit.if", { unit: name })}</Text>
        <Text variant="asReadS" tone="ink2">
          {range}
        </Text>
      </Row>
      <View onLayout={onLayout} aria-hidden style={{ height: BAR_HEIGHT }}>
        {width > 0 ? (
          <Svg width={width} height={BAR_HEIGHT}>
            <Rect
              x={0.5}
              y={0.5}
              width={width - 1}
              height={BAR_HEIGHT - 1}
              rx={4}
              fill={colour.sheet}
              stroke={colour.rule}
            />
            <Rect
              x={at(USUAL_SPEED_M_PER_S.least)}
              y={1}
              width={at(USUAL_SPEED_M_PER_S.greatest) - at(USUAL_SPEED_M_PER_S.least)}
              height={BAR_HEIGHT - 2}
              fill={colour.slateTint}
            />
            {speed.likely ? (
              <Rect
                x={from}
                y={3}
                width={length}
                height={BAR_HEIGHT - 6}
                rx={3}
                fill={colour.ink}
              />
            ) : (
              <Rect
                x={from}
                y={3}
                width={length}
                height={BAR_HEIGHT - 6}
                rx={3}
                fill={colour.madderFaint}
                stroke={colour.madderMid}
                strokeWidth={1.6}
                strokeDasharray="4 3"
              />
            )}
          </Svg>
        ) : null}
      </View>
    </View>
  );
}
