import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { Card, Text, useBreakpoint } from "@features/ui";
import type { ImportDetail, ImportFile } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { ColumnCards } from "./column-cards";
import { ColumnTable } from "./column-table";
import { AlsoForPoint } from "./also-for-point";
import { CounterFields } from "./counter-fields";
import { withRecipe } from "./file-card";
import type { ImportActions } from "./imports-queries";
import { KindTiles } from "./kind-tiles";
import { Questions } from "./questions";
import { withKind } from "./recipe-edits";
import { SideColumn } from "./side-column";
import { SideRows } from "./side-rows";
import { StatusChosen } from "./status-question";

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
  const isKindAsked = file.questions.some(({ code }) => code === "seriesKind");
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
      <CounterFields
        recipe={file.recipe}
        zone={detail.site.zone}
        locked={!detail.can.edit}
        onChange={change}
      />
      <StatusChosen recipe={file.recipe} locked={!detail.can.edit} onChange={change} />
      <AlsoForPoint file={file} detail={detail} />
      {file.recipe.columns.some(({ meaning }) => isRate(meaning)) && !isKindAsked ? (
        <Card pad={5}>
          <View style={{ gap: 12 }}>
            <KindTiles
              label={t("columns.kind.title")}
              value={file.recipe.seriesKind}
              columns={phone ? 1 : 3}
              onChange={(kind) => file.recipe && change(withKind(file.recipe, kind))}
            />
            {losesCovariance(file.recipe) ? (
              <Text variant="small" tone="ink2">
                {t("columns.meansOnly")}
              </Text>
            ) : null}
          </View>
        </Card>
      ) : null}
    </View>
  );
}

function isRate(meaning: FileRecipe["columns"][number]["meaning"]): boolean {
  return (
    meaning === "flow" ||
    meaning === "velocity" ||
    meaning === "pulses" ||
    meaning === "supply" ||
    meaning === "return" ||
    meaning === "power"
  );
}

/** Means of flow and temperatures, from which the product's mean cannot be had any more. */
function losesCovariance({ columns, seriesKind }: FileRecipe): boolean {
  const has = (...wanted: readonly string[]) =>
    columns.some(({ meaning }) => wanted.includes(meaning));
  if (has("power", "heatingCounter", "coolingCounter")) return false;
  return (
    has("volumeCounter", "pulses") || (has("flow", "velocity") && seriesKind !== "instantaneous")
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
