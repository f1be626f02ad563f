import { useWords } from "@features/i18n";
import { SelectField } from "@features/ui";
import type { ImportFile, QuestionView } from "@shared/contracts/imports";
import type { ColumnRecipe, DateOrder, FileRecipe } from "@shared/domain/log-files/recipe";
import { unitsOfMeaning } from "@shared/domain/log-files/column-units";
import { COLUMN_MEANINGS, isTime, withDateOrder, withMeaning, withUnit } from "./recipe-edits";

export interface ColumnsProps {
  readonly name: string;
  readonly recipe: FileRecipe;
  readonly recognition: NonNullable<ImportFile["recognition"]>;
  readonly questions: readonly QuestionView[];
  readonly locked: boolean;
  readonly onChange: (recipe: FileRecipe) => void;
}

const DATE_ORDERS: readonly DateOrder[] = ["dayMonthYear", "monthDayYear", "yearMonthDay"];

export function useColumnName() {
  const t = useWords("imports");
  return (column: ColumnRecipe) =>
    column.header.trim() || t("columns.unnamed", { number: column.index + 1 });
}

interface ControlProps extends ColumnsProps {
  readonly column: ColumnRecipe;
  /** Short words in a table head, long ones on a card. */
  readonly long?: boolean;
}

/** What the column means. */
export function MeaningControl({ column, recipe, locked, onChange, long }: ControlProps) {
  const t = useWords("imports");
  const name = useColumnName();
  return (
    <SelectField
      label={t("columns.meaningLabel", { column: name(column) })}
      labelHidden
      value={column.meaning}
      disabled={locked}
      options={COLUMN_MEANINGS.map((meaning) => ({
        value: meaning,
        label: t(`columns.${long ? "meaningLong" : "meaning"}.${meaning}`),
      }))}
      onChange={(meaning) => onChange(withMeaning(recipe, column.index, meaning))}
    />
  );
}

/** Its unit, or the order of its dates; nothing for a skipped column. */
export function UnitControl({ column, recipe, locked, questions, onChange }: ControlProps) {
  const t = useWords("imports");
  const name = useColumnName();
  const units = unitsOfMeaning(column.meaning);
  if (units.length > 0) {
    const asked = questions.some(
      (question) =>
        (question.code === "flowUnit" ||
          question.code === "temperatureUnit" ||
          question.code === "columnUnit") &&
        question.columnIndex === column.index,
    );
    return (
      <SelectField
        label={t("columns.unitLabel", { column: name(column) })}
        labelHidden
        value={column.unit}
        attention={asked}
        emptyLabel={t("columns.chooseUnit")}
        disabled={locked}
        options={units.map((unit) => ({ value: unit, label: t(`columns.unit.${unit}`) }))}
        onChange={(unit) => onChange(withUnit(recipe, column.index, unit))}
      />
    );
  }
  const { format } = recipe.time;
  if (!isTime(column.meaning) || column.meaning === "timeOfDay") return null;
  if (format.kind !== "calendar") {
    return (
      <SelectField
        label={t("columns.orderLabel", { column: name(column) })}
        labelHidden
        value={format.kind}
        disabled
        options={[{ value: format.kind, label: t(`columns.order.${format.kind}`) }]}
        onChange={() => undefined}
      />
    );
  }
  return (
    <SelectField
      label={t("columns.orderLabel", { column: name(column) })}
      labelHidden
      value={format.order}
      attention={questions.some((question) => question.code === "dateOrder")}
      emptyLabel={t("columns.order.choose")}
      disabled={locked}
      options={DATE_ORDERS.map((order) => ({ value: order, label: t(`columns.order.${order}`) }))}
      onChange={(order) => onChange(withDateOrder(recipe, order))}
    />
  );
}
