import { placesPaths } from "@features/places/places-paths";
import { useWords } from "@features/i18n";
import { Button, Row } from "@features/ui";
import type { ImportDetail } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { QuestionCard } from "./question-card";

interface BoreQuestionProps {
  readonly recipe: FileRecipe;
  readonly detail: ImportDetail;
  readonly onChange: (recipe: FileRecipe) => void;
}

/** Water speed without a bore: where to enter the pipe, and how to go on once it is there. */
export function BoreQuestion({ recipe, detail, onChange }: BoreQuestionProps) {
  const t = useWords("imports");
  const { site, loop, point } = detail;
  return (
    <QuestionCard
      title={t("columns.pointBore.title")}
      text={t("columns.pointBore.text", { point: point.name })}
    >
      <Row gap={2} wrap>
        <Button
          kind="second"
          label={t("columns.pointBore.enter")}
          href={placesPaths.editPoint(site.id, loop.id, point.id)}
        />
        <Button
          kind="quiet"
          label={t("columns.pointBore.again")}
          onPress={() => onChange(recipe)}
        />
      </Row>
    </QuestionCard>
  );
}
