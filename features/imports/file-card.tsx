import { useState } from "react";
import { View } from "react-native";
import { addressOf } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  Icon,
  LoadingBlocks,
  Mark,
  radius,
  Row,
  SelectField,
  Text,
  TextLink,
  useTheme,
  webStyle,
} from "@features/ui";
import { downloadLogFile, type ImportDetail, type ImportFile } from "@shared/contracts/imports";
import { importPaths } from "./import-paths";
import type { ImportActions } from "./imports-queries";
import { DialectFields } from "./read-from-file";
import { SourceOfFile } from "./source-of-file";
import { Unreadable } from "./unreadable-file";
import { withHeaderLine } from "./recipe-edits";

const NO_HEADER = "none";
const LINES_SHOWN = 14;

/** One file: its name, its first lines with the header marked, and where the header is. */
export function FileCard(props: {
  file: ImportFile;
  detail: ImportDetail;
  actions: ImportActions;
}) {
  const { file, detail, actions } = props;
  const t = useWords("imports");
  const format = useFormat(detail.site.zone);
  const { colour } = useTheme();
  return (
    <Card pad={5} label={file.name}>
      <View style={{ gap: 14 }}>
        <Row gap={3} align="flex-start">
          <Icon name="file" size={28} />
          <View style={{ flex: 1, minWidth: 0 }}>
            <Text variant="asReadM">{file.name}</Text>
            <Text variant="small" tone="ink2">
              {t("file.size", {
                size: format.bytes(file.bytes),
                at: format.dateTime(Date.parse(file.uploadedAt)),
              })}
            </Text>
          </View>
          {file.recognition ? <Mark kind="fine" size={22} silent /> : null}
          {detail.can.edit ? (
            <Button
              kind="quiet"
              size="dense"
              iconOnly
              icon="close"
              label={t("file.remove", { name: file.name })}
              onPress={() => actions.removeFile.mutate(file.id)}
            />
          ) : null}
        </Row>
        {file.source ? (
          <SourceOfFile importId={detail.id} file={file} source={file.source} />
        ) : null}
        {file.sameAs ? (
          <Banner
            kind="wrong"
            action={
              <TextLink
                href={importPaths.wizard(file.sameAs.importId)}
                label={t("file.openThat")}
              />
            }
          >
            {t("file.sameAs", {
              name: file.sameAs.name,
              at: format.dateTime(Date.parse(file.sameAs.importedAt)),
            })}
          </Banner>
        ) : null}
        {file.unreadable ? <Unreadable file={file} unreadable={file.unreadable} /> : null}
        {file.unreadable && file.recipe && detail.can.edit ? (
          <DialectFields file={file} actions={actions} recipe={file.recipe} />
        ) : null}
        {!file.unreadable && !file.recognition ? (
          <LoadingBlocks
            label={t("file.readingUnknown")}
            blocks={[{ width: "100%", height: 220 }]}
          />
        ) : null}
        {file.recognition ? (
          <View
            role="group"
            aria-label={t("file.rawLines", { name: file.name })}
            tabIndex={0}
            style={{
              backgroundColor: colour.well,
              borderRadius: radius.field,
              padding: 12,
              overflow: "scroll",
            }}
          >
            {file.recognition.firstLines.slice(0, LINES_SHOWN).map((line, index) => (
              <RawLine
                key={index}
                number={index + 1}
                text={line}
                header={file.recipe?.dialect.headerLine === index + 1}
              />
            ))}
          </View>
        ) : null}
        {file.recognition && file.recipe ? <HeaderLine {...props} /> : null}
      </View>
    </Card>
  );
}

function RawLine({ number, text, header }: { number: number; text: string; header: boolean }) {
  const { colour } = useTheme();
  return (
    <View style={{ flexDirection: "row", gap: 8 }}>
      <View style={{ width: 26 }}>
        <Text variant="asReadS" tone="ink3">
          {number}
        </Text>
      </View>
      <View style={header ? { backgroundColor: colour.markTint } : null}>
        <Text variant="asReadS" noWrap style={webStyle({ whiteSpace: "pre" })}>
          {text === "" ? " " : text}
        </Text>
      </View>
    </View>
  );
}

function HeaderLine({ file, detail, actions }: Parameters<typeof FileCard>[0]) {
  const t = useWords("imports");
  const [changing, setChanging] = useState(false);
  const { recipe, recognition } = file;
  if (!recipe || !recognition) return null;
  const { headerLine, unitsLine } = recipe.dialect;
  const sentence =
    headerLine === null
      ? t("file.noHeader")
      : unitsLine === null
        ? t("file.headerOn", { line: headerLine })
        : t("file.headerUnits", { line: headerLine, units: unitsLine });
  if (!changing) {
    return (
      <Row gap={3} justify="space-between" wrap>
        <Text variant="bodyWide" tone="ink2">
          {sentence}
        </Text>
        {detail.can.edit ? (
          <TextLink onPress={() => setChanging(true)} label={t("file.changeHeader")} />
        ) : null}
      </Row>
    );
  }
  const lines = recognition.firstLines.slice(0, LINES_SHOWN).map((text, index) => ({
    value: String(index + 1),
    label: `${index + 1}: ${text.slice(0, 48)}`,
  }));
  return (
    <SelectField
      label={t("file.headerLine")}
      value={headerLine === null ? NO_HEADER : String(headerLine)}
      options={[{ value: NO_HEADER, label: t("file.headerNone") }, ...lines]}
      onChange={(value) => {
        setChanging(false);
        actions.chooseRecipe.mutate({
          fileId: file.id,
          recipe: withRecipe(withHeaderLine(recipe, value === NO_HEADER ? null : Number(value))),
        });
      }}
    />
  );
}

/** The contract's arrays are mutable, the domain's are not. */
export function withRecipe(recipe: ReturnType<typeof withHeaderLine>) {
  const { meter, time, ...rest } = recipe;
  const { notes, ...times } = time;
  return {
    ...rest,
    time: { ...times, ...(notes && { notes: notes.map((note) => ({ ...note })) }) },
    columns: recipe.columns.map(({ badWords, ...column }) => ({
      ...column,
      ...(badWords && { badWords: [...badWords] }),
    })),
    ...(meter && { meter: { ...meter, exchangedAt: [...meter.exchangedAt] } }),
  };
}

/** Address of the untouched bytes. */
export const rawFileAddress = (importId: string, fileId: string) =>
  addressOf(downloadLogFile, { params: { importId, fileId } });
