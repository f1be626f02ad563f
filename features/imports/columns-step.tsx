import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { ChoiceTiles, Card, Text, useBreakpoint } from "@features/ui";
import type { ImportDetail, ImportFile } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import type { SeriesKind } from "@shared/domain/readings/reading-columns";
import { ColumnCards } from "./column-cards";
import { ColumnTable } from "./column-table";
import { withRecipe } from "./file-card";
import type { ImportActions } from "./imports-queries";
import { Questions } from "./questions";
import { SideColumn } from "./side-column";
import { SideRows } from "./side-rows";

const KINDS: readonly SeriesKind[] = ["instantaneous", "meanFromLabel", "meanToLabel"];

/** Step 2: what each column means and in which unit, and what one row stands for. */
export function ColumnsStep({ detail, actions }: { detail: ImportDetail; actions: ImportActions }) {
  const phone = useBreakpoint() === "phone";
  const files = detail.files.filter((file) => file.recognition && file.recipe);
  const questions = files.map((file) => (
    <Questions key={file.id} file={file} detail={detail} actions={actions} />
  ));
  return (
    <SideColumn
      main={
        <>
          {phone ? questions : null}
          {files.map((file) => (
            <FileColumns key={file.id} file={file} detail={detail} actions={actions} />
          ))}
        </>
      }
      side={
        <>
          {phone ? null : questions}
          <PointFacts detail={detail} />
        </>
      }
    />
  );
}

function FileColumns(props: { file: ImportFile; detail: ImportDetail; actions: ImportActions }) {
  const { file, detail, actions } = props;
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  if (!file.recipe || !file.recognition) return null;
  const change = (recipe: FileRecipe) =>
    actions.chooseRecipe.mutate({ fileId: file.id, recipe: withRecipe(recipe) });
  const shared = {
    name: file.name,
    recipe: file.recipe,
    recognition: file.recognition,
    questions: file.questions,
    locked: !detail.can.edit,
    onChange: change,
  };
  return (
    <View style={{ gap: 16 }}>
      {detail.files.length > 1 ? <Text variant="asReadM">{file.name}</Text> : null}
      {phone ? <ColumnCards {...shared} /> : <ColumnTable {...shared} />}
      <Card pad={5}>
        <ChoiceTiles
          label={t("columns.kind.title")}
          value={file.recipe.seriesKind}
          columns={phone ? 1 : 3}
          choices={KINDS.map((kind) => ({
            value: kind,
            label: t(`columns.kind.${kind}`),
            detail: t(`columns.kind.${kind}Hint`),
          }))}
          onChange={(seriesKind) => file.recipe && change({ ...file.recipe, seriesKind })}
        />
      </Card>
    </View>
  );
}

function PointFacts({ detail }: { detail: ImportDetail }) {
  const t = useWords("imports");
  const format = useFormat(detail.site.zone);
  const pressure = format.withUnit(detail.pressure.absoluteMPa, "pressure");
  return (
    <SideRows
      title={t("columns.point.title")}
      rows={[
        { label: t("columns.point.meterIn"), value: t(`columns.point.${detail.meterSide}`) },
        { label: t("columns.point.pipe"), value: detail.pipe?.label ?? t("columns.point.noPipe") },
        {
          label: t("columns.point.pressure"),
          value: detail.pressure.assumed ? t("columns.point.assumed", { pressure }) : pressure,
        },
      ]}
    />
  );
}
