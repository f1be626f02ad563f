import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Button, Text } from "@features/ui";
import type { QuestionView } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import type { PointSet } from "@shared/domain/log-files/recognition";
import { useColumnName } from "./column-controls";
import { QuestionCard } from "./question-card";
import { withSet } from "./recipe-edits";

/** A set by what its headers have in common, else by its columns' numbers. */
export function useSetName() {
  const t = useWords("imports");
  return ({ name, columns }: PointSet) =>
    name === ""
      ? t("columns.whichSet.unnamed", {
          numbers: columns.map(({ index }) => index + 1).join(", "),
        })
      : `“${name}”`;
}

interface SetQuestionProps {
  readonly question: Extract<QuestionView, { code: "whichSet" }>;
  readonly recipe: FileRecipe;
  readonly pointName: string;
  readonly onChange: (recipe: FileRecipe) => void;
}

/** Columns of several metering points: which are this one's. */
export function SetQuestion({ question, recipe, pointName, onChange }: SetQuestionProps) {
  const t = useWords("imports");
  const setName = useSetName();
  const columnName = useColumnName();
  return (
    <QuestionCard
      title={t("columns.whichSet.title", { point: pointName })}
      text={t("columns.whichSet.text")}
    >
      {question.sets.map((set) => (
        <View key={set.columns.map(({ index }) => index).join()} style={{ gap: 4 }}>
          <Button
            kind="second"
            label={t("columns.whichSet.use", { name: setName(set) })}
            onPress={() => onChange(withSet(recipe, set))}
          />
          <Text variant="asReadS" tone="ink2">
            {set.columns
              .flatMap(({ index }) => recipe.columns[index] ?? [])
              .map(columnName)
              .join(", ")}
          </Text>
        </View>
      ))}
    </QuestionCard>
  );
}
