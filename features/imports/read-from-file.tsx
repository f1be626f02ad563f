import { useState } from "react";
import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import {
  Button,
  LoadingBlocks,
  Mark,
  SelectField,
  Text,
  TextField,
  TextLink,
  useTheme,
} from "@features/ui";
import type { ImportDetail, ImportFile } from "@shared/contracts/imports";
import {
  COLUMN_SIGNS,
  columnSignOf,
  readColumnStarts,
  SIGN_NAMES,
  withColumnSign,
  withColumnStarts,
  withEncoding,
  type ColumnSign,
} from "./dialect-edits";
import { withRecipe } from "./file-card";
import { FactsOfFile } from "./file-facts";
import type { ImportActions } from "./imports-queries";

type Proof = NonNullable<ImportFile["recognition"]>["proofs"][number];
type Recipe = NonNullable<ImportFile["recipe"]>;

interface ReadRow {
  readonly key: string;
  readonly label: string;
  readonly value: string;
  readonly proof?: Proof;
}

const ENCODINGS = ["utf-8", "windows-1252", "utf-16le", "utf-16be"] as const;

/** What only text files have. */
const TEXT_ROWS = ["separator", "encoding"];

/** What was read from a file: each guess with how sure it is, and the line that says so. */
export function ReadFromFile(props: {
  file: ImportFile;
  detail: ImportDetail;
  actions: ImportActions;
  named: boolean;
}) {
  const { file, detail, named } = props;
  const t = useWords("imports");
  const { recognition, recipe } = file;
  // A sheet has cells: how they are written down as text is nobody's choice.
  const isSheet = file.source?.kind === "xlsx";
  const rows = useRows(file).filter(({ key }) => !isSheet || !TEXT_ROWS.includes(key));
  if (file.unreadable) return null;
  if (!recognition || !recipe) return <LoadingBlocks label={t("file.readingUnknown")} />;
  return (
    <View style={{ gap: 20 }}>
      <View>
        <Text variant="subhead" level={2}>
          {named ? file.name : t("file.read.title")}
        </Text>
        <View
          role="list"
          aria-label={t("file.read.of", { name: file.name })}
          style={{ marginTop: 6 }}
        >
          {rows.map((row) => (
            <ProvedRow key={row.key} row={row} />
          ))}
        </View>
        {detail.can.edit && !isSheet ? <HowItIsWritten {...props} recipe={recipe} /> : null}
      </View>
      <FactsOfFile file={file} detail={detail} />
    </View>
  );
}

function useRows({ recognition, recipe }: ImportFile): ReadRow[] {
  const t = useWords("imports");
  const format = useFormat();
  if (!recognition || !recipe) return [];
  const proofOf = (about: Proof["about"]) =>
    recognition.proofs.find((proof) => proof.about === about);
  const measured = recipe.columns.filter(
    ({ meaning, unit }) => meaning !== "skip" && unit !== null,
  );
  const marks = new Set(measured.map(({ decimalMark }) => decimalMark));
  const mark = marks.size > 1 ? "mixed" : marks.has(",") ? "comma" : "point";
  const { headerLine, encoding } = recipe.dialect;
  const { format: times } = recipe.time;
  const timeName = times.kind === "calendar" ? (times.order ?? "open") : times.kind;
  return [
    {
      key: "header",
      label: t("file.read.header"),
      value: headerLine === null ? t("file.read.none") : String(headerLine),
      proof: proofOf("headerLine"),
    },
    {
      key: "separator",
      label: t("file.read.separator"),
      value: t(`file.separatorName.${SIGN_NAMES[columnSignOf(recipe)]}`),
      proof: proofOf("separator"),
    },
    {
      key: "decimal",
      label: t("file.read.decimal"),
      value: t(`file.decimalName.${mark}`),
      proof: proofOf("decimalMark"),
    },
    {
      key: "times",
      label: t("file.read.times"),
      value: t(`file.timeName.${timeName}`),
      proof: proofOf("dateOrder"),
    },
    {
      key: "kind",
      label: t("file.read.kind"),
      value: t(`file.kindName.${recipe.seriesKind}`),
      proof: proofOf("seriesKind"),
    },
    {
      key: "encoding",
      label: t("file.read.encoding"),
      value: t(`file.encodingName.${encoding}`),
      proof: proofOf("encoding"),
    },
    {
      key: "rows",
      label: t("file.read.rows"),
      value: format.number(recognition.dataRowCount, 0),
    },
    { key: "columns", label: t("file.read.columns"), value: String(recognition.columnCount) },
  ];
}

function ProvedRow({ row }: { row: ReadRow }) {
  const t = useWords("imports");
  const { colour } = useTheme();
  const { proof } = row;
  return (
    <View
      role="listitem"
      style={{ paddingVertical: 8, borderTopWidth: 1, borderTopColor: colour.rule, minHeight: 40 }}
    >
      <View style={{ flexDirection: "row", gap: 12, alignItems: "center" }}>
        <View style={{ flex: 1, minWidth: 0 }}>
          <Text variant="bodyWide" tone="ink2">
            {row.label}
          </Text>
        </View>
        <View style={{ flexShrink: 1 }}>
          <Text variant="asReadM" align="right">
            {row.value}
          </Text>
        </View>
      </View>
      {proof ? (
        <View style={{ flexDirection: "row", gap: 8, alignItems: "center", marginTop: 2 }}>
          <Mark kind={proof.certainty === "proved" ? "fine" : "note"} size={14} silent />
          <View style={{ flex: 1, minWidth: 0 }}>
            <Text variant="small" tone="ink2">
              {proofWords(t, proof)}
            </Text>
          </View>
        </View>
      ) : null}
    </View>
  );
}

function proofWords(t: ReturnType<typeof useWords>, proof: Proof): string {
  const { certainty, line } = proof;
  // The sign itself is named beside; a blank in quotes would say nothing.
  const cell = proof.about === "separator" ? null : proof.cell;
  if (line === null) return t(`file.proof.${certainty}`);
  if (cell === null || cell === "") return t(`file.proof.${certainty}Line`, { line });
  return t(`file.proof.${certainty}Cell`, { line, cell });
}

function HowItIsWritten(props: { file: ImportFile; actions: ImportActions; recipe: Recipe }) {
  const t = useWords("imports");
  const [changing, setChanging] = useState(false);
  if (!changing)
    return (
      <View style={{ marginTop: 6, alignSelf: "flex-start" }}>
        <TextLink
          label={t("file.changeReading")}
          said={t("file.changeReadingOf", { name: props.file.name })}
          onPress={() => setChanging(true)}
        />
      </View>
    );
  return <DialectFields {...props} onDone={() => setChanging(false)} />;
}

/** What parts the columns and how characters are spelt; either has the file read anew. */
export function DialectFields(props: {
  file: ImportFile;
  actions: ImportActions;
  recipe: Recipe;
  onDone?: () => void;
}) {
  const { file, actions, recipe, onDone } = props;
  const t = useWords("imports");
  const sign = columnSignOf(recipe);
  const give = (changed: ReturnType<typeof withColumnSign>) => {
    onDone?.();
    actions.chooseRecipe.mutate({ fileId: file.id, recipe: withRecipe(changed) });
  };
  return (
    <View style={{ gap: 14, marginTop: 12 }}>
      <SelectField
        label={t("file.read.separator")}
        hint={t("file.signHint")}
        value={sign}
        options={COLUMN_SIGNS.map((value) => ({
          value,
          label: t(`file.separatorName.${SIGN_NAMES[value]}`),
        }))}
        onChange={(value) => {
          if (value !== sign) give(withColumnSign(recipe, value as ColumnSign));
        }}
      />
      {sign === "fixed" && file.recognition ? <ColumnPlaces recipe={recipe} onGive={give} /> : null}
      <SelectField
        label={t("file.read.encoding")}
        value={recipe.dialect.encoding}
        options={ENCODINGS.map((value) => ({ value, label: t(`file.encodingChoice.${value}`) }))}
        onChange={(value) => {
          const wanted = ENCODINGS.find((encoding) => encoding === value);
          if (wanted && wanted !== recipe.dialect.encoding) give(withEncoding(recipe, wanted));
        }}
      />
    </View>
  );
}

function ColumnPlaces(props: {
  recipe: Recipe;
  onGive: (recipe: ReturnType<typeof withColumnStarts>) => void;
}) {
  const { recipe, onGive } = props;
  const t = useWords("imports");
  const known = (recipe.dialect.columnStarts ?? []).join(", ");
  const [text, setText] = useState(known);
  const [wrong, setWrong] = useState(false);
  const apply = () => {
    const starts = readColumnStarts(text);
    setWrong(starts === null);
    if (starts !== null && starts.join(", ") !== known) onGive(withColumnStarts(recipe, starts));
  };
  return (
    <View style={{ gap: 8 }}>
      <TextField
        label={t("file.places")}
        hint={t("file.placesHint")}
        value={text}
        onChange={(value) => {
          setText(value);
          setWrong(false);
        }}
        error={wrong ? t("file.placesWrong") : undefined}
        autoComplete="off"
      />
      <View style={{ alignSelf: "flex-start" }}>
        <Button kind="second" size="dense" label={t("file.apply")} onPress={apply} />
      </View>
    </View>
  );
}
