import { useState } from "react";
import { useFormat, useWords } from "@features/i18n";
import { Button, FieldRow, NumberField, Row, SelectField } from "@features/ui";
import type { QuestionView } from "@shared/contracts/imports";
import { COUNTED_VOLUME_UNITS } from "@shared/domain/log-files/column-units";
import type { CountedVolumeUnit, FileRecipe } from "@shared/domain/log-files/recipe";
import { useColumnName } from "./column-controls";
import { QuestionCard } from "./question-card";
import { withPulseWorth } from "./recipe-edits";

interface PulseQuestionProps {
  readonly question: Extract<QuestionView, { code: "pulseValue" }>;
  readonly recipe: FileRecipe;
  readonly onChange: (recipe: FileRecipe) => void;
}

/** What one pulse stands for: a number and its unit, neither filled in beforehand. */
export function PulseQuestion({ question, recipe, onChange }: PulseQuestionProps) {
  const t = useWords("imports");
  const format = useFormat();
  const name = useColumnName();
  const column = recipe.columns[question.columnIndex];
  const [value, setValue] = useState<number | null>(column?.pulseValue ?? null);
  const [unit, setUnit] = useState<CountedVolumeUnit | null>(
    COUNTED_VOLUME_UNITS.find((known) => known === column?.unit) ?? null,
  );
  const given = value !== null && value > 0 && unit !== null ? { pulseValue: value, unit } : null;
  return (
    <QuestionCard
      title={t("columns.pulseValue.title", { column: column ? name(column) : "" })}
      text={t("columns.pulseValue.text", {
        min: format.number(question.minValue, 0),
        max: format.number(question.maxValue, 0),
      })}
    >
      <FieldRow>
        <NumberField label={t("columns.pulseValue.value")} value={value} onChange={setValue} />
        <SelectField
          label={t("columns.pulseValue.unit")}
          value={unit}
          emptyLabel={t("columns.chooseUnit")}
          options={COUNTED_VOLUME_UNITS.map((known) => ({
            value: known,
            label: t(`columns.unit.${known}`),
          }))}
          onChange={setUnit}
        />
      </FieldRow>
      <Row>
        <Button
          kind="second"
          label={t("columns.pulseValue.use")}
          offBecause={given === null ? t("columns.pulseValue.missing") : undefined}
          onPress={() => given && onChange(withPulseWorth(recipe, question.columnIndex, given))}
        />
      </Row>
    </QuestionCard>
  );
}
