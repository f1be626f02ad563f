import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Button, Text } from "@features/ui";
import type { QuestionView } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import type { SampleRow } from "@shared/domain/log-files/recognition";
import { QuestionCard } from "./question-card";
import { withMeaning, withoutAlike } from "./recipe-edits";

const EXAMPLES_SHOWN = 4;

interface AlikeQuestionProps {
  readonly question: Extract<QuestionView, { code: "alikeColumns" }>;
  readonly recipe: FileRecipe;
  readonly rows: readonly SampleRow[];
  readonly onChange: (recipe: FileRecipe) => void;
}

/** Two columns of one name: both orders are offered, with values of each, and neither is proposed. */
export function AlikeQuestion({ question, recipe, rows, onChange }: AlikeQuestionProps) {
  const t = useWords("imports");
  const { columnIndexes } = question;
  const [first, second] = columnIndexes;
  const orders =
    columnIndexes.length === 2 && first !== undefined && second !== undefined
      ? [
          [first, second],
          [second, first],
        ]
      : [];
  const choose = (supply: number, back: number) =>
    onChange(withMeaning(withMeaning(recipe, supply, "supply"), back, "return"));
  return (
    <QuestionCard
      title={t("columns.alike.title")}
      text={t("columns.alike.text", {
        numbers: columnIndexes.map((index) => index + 1).join(", "),
      })}
    >
      <View style={{ gap: 4 }}>
        {columnIndexes.map((index) => (
          <Text key={index} variant="asReadS" tone="ink2">
            {t("columns.alike.example", {
              number: index + 1,
              values: rows
                .slice(0, EXAMPLES_SHOWN)
                .map(({ cells }) => cells[index] ?? "")
                .join("  "),
            })}
          </Text>
        ))}
      </View>
      {orders.length === 0 ? <Text variant="small">{t("columns.alike.several")}</Text> : null}
      {orders.map(([supply = 0, back = 0]) => (
        <Button
          key={supply}
          kind="second"
          label={t("columns.alike.use", { supply: supply + 1, return: back + 1 })}
          onPress={() => choose(supply, back)}
        />
      ))}
      <Button
        kind="quiet"
        label={t("columns.alike.neither")}
        onPress={() => onChange(withoutAlike(recipe))}
      />
    </QuestionCard>
  );
}
