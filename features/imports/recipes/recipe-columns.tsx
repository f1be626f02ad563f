import { View } from "react-native";
import { isChannelMeaning, unitsOfMeaning } from "@shared/domain/log-files/column-units";
import type { ColumnRecipe, FileRecipe } from "@shared/domain/log-files/recipe";
import { useWords } from "@features/i18n";
import { Card, FieldRow, SelectField, Text } from "@features/ui";
import { COLUMN_MEANINGS, withDecimalMark, withMeaning, withUnit } from "../recipe-edits";

interface ColumnsProps {
  readonly recipe: FileRecipe;
  readonly locked: boolean;
  readonly onChange: (recipe: FileRecipe) => void;
}

/** What each column means, in which unit and with which decimal mark; headers stay as they are. */
export function RecipeColumns(props: ColumnsProps) {
  const t = useWords("recipes");
  return (
    <Card pad={5} label={t("edit.columnsTitle")}>
      <View style={{ gap: 20 }}>
        <Text variant="subhead" level={2}>
          {t("edit.columnsTitle")}
        </Text>
        {props.recipe.columns.map((column) => (
          <Column key={column.index} column={column} {...props} />
        ))}
      </View>
    </Card>
  );
}

function Column({ column, recipe, locked, onChange }: ColumnsProps & { column: ColumnRecipe }) {
  const t = useWords("recipes");
  const ofImports = useWords("imports");
  const { index, meaning, unit, decimalMark } = column;
  const name = column.header || t("edit.unnamed", { number: index + 1 });
  const units = unitsOfMeaning(meaning);
  const of = (label: string) => `${label}, ${name}`;
  return (
    <View role="group" aria-label={name} style={{ gap: 8 }}>
      <Text variant="asReadM">{name}</Text>
      <FieldRow>
        <SelectField
          label={of(t("edit.meaning"))}
          value={meaning}
          options={COLUMN_MEANINGS.map((value) => ({
            value,
            label: ofImports(`columns.meaning.${value}`),
          }))}
          onChange={(value) => onChange(withMeaning(recipe, index, value))}
          disabled={locked}
        />
        {units.length > 1 ? (
          <SelectField
            label={of(t("edit.unit"))}
            value={unit}
            emptyLabel={t("edit.chooseUnit")}
            options={units.map((value) => ({ value, label: ofImports(`columns.unit.${value}`) }))}
            onChange={(value) => onChange(withUnit(recipe, index, value))}
            disabled={locked}
          />
        ) : null}
        {isChannelMeaning(meaning) && meaning !== "status" ? (
          <SelectField
            label={of(t("edit.mark"))}
            value={decimalMark}
            options={[
              { value: ".", label: ofImports("columns.decimal.point") },
              { value: ",", label: ofImports("columns.decimal.comma") },
            ]}
            onChange={(value) => onChange(withDecimalMark(recipe, index, value))}
            disabled={locked}
          />
        ) : null}
      </FieldRow>
    </View>
  );
}
