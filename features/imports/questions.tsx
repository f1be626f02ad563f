import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { Button, Row, Text } from "@features/ui";
import type { ImportDetail, ImportFile, QuestionView } from "@shared/contracts/imports";
import { TEMPERATURE_UNITS } from "@shared/domain/log-files/column-units";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import type { SampleRow } from "@shared/domain/log-files/recognition";
import { AlikeQuestion } from "./alike-question";
import { BoreQuestion } from "./bore-question";
import { useColumnName } from "./column-controls";
import { withRecipe } from "./file-card";
import { FlowUnitQuestion } from "./flow-unit-question";
import type { ImportActions } from "./imports-queries";
import { KindTiles } from "./kind-tiles";
import { PulseQuestion } from "./pulse-question";
import { QuestionCard } from "./question-card";
import {
  withDateOrder,
  withDecimalMark,
  withKind,
  withPositivePower,
  withUnit,
} from "./recipe-edits";
import { SetQuestion } from "./set-question";
import { StatusQuestion } from "./status-question";

interface QuestionsProps {
  readonly file: ImportFile;
  readonly detail: ImportDetail;
  readonly actions: ImportActions;
}

/** What the file itself does not prove, each with what would settle it. Nothing is picked beforehand. */
export function Questions({ file, detail, actions }: QuestionsProps) {
  const { recipe } = file;
  if (!recipe || !detail.can.edit) return null;
  const change = (next: FileRecipe) =>
    actions.chooseRecipe.mutate({ fileId: file.id, recipe: withRecipe(next) });
  return (
    <>
      {file.questions.map((question, index) => (
        <OneQuestion
          key={`${question.code} ${index}`}
          question={question}
          recipe={recipe}
          detail={detail}
          sampleRows={file.recognition?.sampleRows ?? []}
          onChange={change}
        />
      ))}
    </>
  );
}

function OneQuestion(props: {
  question: QuestionView;
  recipe: FileRecipe;
  detail: ImportDetail;
  sampleRows: readonly SampleRow[];
  onChange: (recipe: FileRecipe) => void;
}) {
  const { question, recipe, onChange } = props;
  const t = useWords("imports");
  const format = useFormat(props.detail.site.zone);
  const name = useColumnName();
  const column = "columnIndex" in question ? recipe.columns[question.columnIndex] : undefined;

  switch (question.code) {
    case "flowUnit":
      return (
        <FlowUnitQuestion
          question={question}
          pipe={props.detail.pipe}
          onUse={(unit) => onChange(withUnit(recipe, question.columnIndex, unit))}
        />
      );
    case "temperatureUnit":
      return (
        <QuestionCard
          title={t("columns.temperatureUnit.title", { column: column ? name(column) : "" })}
          text={t("columns.temperatureUnit.text", {
            min: format.number(question.minValue),
            max: format.number(question.maxValue),
          })}
        >
          <Row gap={2} wrap>
            {TEMPERATURE_UNITS.map((unit) => (
              <Button
                key={unit}
                kind="second"
                label={t("columns.temperatureUnit.use", { unit: t(`columns.unit.${unit}`) })}
                onPress={() => onChange(withUnit(recipe, question.columnIndex, unit))}
              />
            ))}
          </Row>
        </QuestionCard>
      );
    case "dateOrder":
      return (
        <QuestionCard
          title={t("columns.dateOrder.title")}
          text={t("columns.dateOrder.text", { first: question.firstCell, last: question.lastCell })}
        >
          {question.choices.map((order, index) => {
            const step = question.stepSeconds[index] ?? null;
            return (
              <View key={order} style={{ gap: 4 }}>
                <Button
                  kind="second"
                  label={t("columns.dateOrder.use", { order: t(`columns.order.${order}`) })}
                  onPress={() => onChange(withDateOrder(recipe, order))}
                />
                <Text variant="small" tone="ink2">
                  {step === null
                    ? t("columns.dateOrder.stepUnknown", { order: t(`columns.order.${order}`) })
                    : t("columns.dateOrder.step", {
                        order: t(`columns.order.${order}`),
                        step: format.duration(step),
                      })}
                </Text>
              </View>
            );
          })}
        </QuestionCard>
      );
    case "decimalMark":
      return (
        <QuestionCard
          title={t("columns.decimalMark.title", { column: column ? name(column) : "" })}
          text={t("columns.decimalMark.text", { cell: question.cell, line: question.line })}
        >
          <Row gap={2} wrap>
            {([".", ","] as const).map((mark) => (
              <Button
                key={mark}
                kind="second"
                label={t("columns.decimalMark.use", {
                  mark: t(mark === "." ? "columns.decimal.point" : "columns.decimal.comma"),
                })}
                onPress={() => onChange(withDecimalMark(recipe, question.columnIndex, mark))}
              />
            ))}
          </Row>
        </QuestionCard>
      );
    case "columnMeaning":
      return (
        <QuestionCard
          title={t("columns.missing.title", {
            meaning: t(`columns.meaningLong.${question.meaning}`),
          })}
          text={t("columns.missing.text")}
        />
      );
    case "columnUnit":
      return (
        <QuestionCard
          title={t("columns.columnUnit.title", { column: column ? name(column) : "" })}
          text={t("columns.columnUnit.text", {
            min: format.number(question.minValue),
            max: format.number(question.maxValue),
          })}
        >
          <Row gap={2} wrap>
            {question.choices.map((unit) => (
              <Button
                key={unit}
                kind="second"
                label={t("columns.columnUnit.use", { unit: t(`columns.unit.${unit}`) })}
                onPress={() => onChange(withUnit(recipe, question.columnIndex, unit))}
              />
            ))}
          </Row>
        </QuestionCard>
      );
    case "seriesKind":
      return (
        <QuestionCard
          title={t("columns.seriesKind.title")}
          text={t("columns.seriesKind.text", { header: question.header })}
        >
          <KindTiles
            label={t("columns.kind.title")}
            value={null}
            columns={1}
            onChange={(kind) => onChange(withKind(recipe, kind))}
          />
        </QuestionCard>
      );
    case "positivePower":
      return (
        <QuestionCard
          title={t("columns.positivePower.title")}
          text={t("columns.positivePower.text", {
            min: format.number(question.minValue),
            max: format.number(question.maxValue),
          })}
        >
          <Row gap={2} wrap>
            {(["heating", "cooling", "byTemperature"] as const).map((positive) => (
              <Button
                key={positive}
                kind="second"
                label={t(`columns.positivePower.${positive}`)}
                onPress={() => onChange(withPositivePower(recipe, positive))}
              />
            ))}
          </Row>
        </QuestionCard>
      );
    case "pulseValue":
      return <PulseQuestion question={question} recipe={recipe} onChange={onChange} />;
    case "statusWords":
      return <StatusQuestion question={question} recipe={recipe} onChange={onChange} />;
    case "alikeColumns":
      return (
        <AlikeQuestion
          question={question}
          recipe={recipe}
          rows={props.sampleRows}
          onChange={onChange}
        />
      );
    case "whichSet":
      return (
        <SetQuestion
          question={question}
          recipe={recipe}
          pointName={props.detail.point.name}
          onChange={onChange}
        />
      );
    case "pointBore":
      return <BoreQuestion recipe={recipe} detail={props.detail} onChange={onChange} />;
    case "loggerClock":
      return null;
  }
}
