import { useState } from "react";
import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Button, Card, CheckField, Row, Text } from "@features/ui";
import type { QuestionView } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { useColumnName } from "./column-controls";
import { QuestionCard } from "./question-card";
import { withBadWords } from "./recipe-edits";

interface StatusQuestionProps {
  readonly question: Extract<QuestionView, { code: "statusWords" }>;
  readonly recipe: FileRecipe;
  readonly onChange: (recipe: FileRecipe) => void;
}

/** Words of a status column with their counts; nothing is ticked beforehand, and none is an answer. */
export function StatusQuestion({ question, recipe, onChange }: StatusQuestionProps) {
  const t = useWords("imports");
  const name = useColumnName();
  const [bad, setBad] = useState<readonly string[]>([]);
  const column = recipe.columns[question.columnIndex];
  return (
    <QuestionCard
      title={t("columns.statusWords.title")}
      text={t("columns.statusWords.text", { column: column ? name(column) : "" })}
    >
      <View>
        {question.words.map(({ word, count, likely }) => (
          <CheckField
            key={word}
            label={word === "" ? t("columns.statusWords.empty") : word}
            hint={[
              t("columns.statusWords.rows", { count }),
              ...(likely === "bad" ? [t("columns.statusWords.likelyBad")] : []),
              ...(likely === "good" ? [t("columns.statusWords.likelyGood")] : []),
            ].join(", ")}
            checked={bad.includes(word)}
            onChange={(checked) =>
              setBad(checked ? [...bad, word] : bad.filter((other) => other !== word))
            }
          />
        ))}
      </View>
      <Row>
        <Button
          kind="second"
          label={t("columns.statusWords.use", { count: bad.length })}
          onPress={() => onChange(withBadWords(recipe, question.columnIndex, bad))}
        />
      </Row>
    </QuestionCard>
  );
}

interface StatusChosenProps {
  readonly recipe: FileRecipe;
  readonly locked: boolean;
  readonly onChange: (recipe: FileRecipe) => void;
}

/** The words that were called bad, with a way to choose again. */
export function StatusChosen({ recipe, locked, onChange }: StatusChosenProps) {
  const t = useWords("imports");
  const name = useColumnName();
  const column = recipe.columns.find(
    ({ meaning, badWords }) => meaning === "status" && badWords !== undefined,
  );
  if (column?.badWords === undefined) return null;
  const words = column.badWords.map((word) => word || t("columns.statusWords.empty")).join(", ");
  return (
    <Card pad={5} label={t("columns.statusChosen.title")}>
      <View style={{ gap: 10 }}>
        <Text variant="subhead" level={2}>
          {t("columns.statusChosen.title")}
        </Text>
        <Text tone="ink2">
          {t(words === "" ? "columns.statusChosen.none" : "columns.statusChosen.some", {
            column: name(column),
            words,
          })}
        </Text>
        {locked ? null : (
          <Row>
            <Button
              kind="second"
              label={t("columns.statusChosen.change")}
              onPress={() => onChange(withBadWords(recipe, column.index, null))}
            />
          </Row>
        )}
      </View>
    </Card>
  );
}
