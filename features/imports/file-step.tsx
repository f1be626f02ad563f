import { useState } from "react";
import { View } from "react-native";
import { ApiError } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Banner, DropZone, ErrorState, LoadingBlocks, useBreakpoint } from "@features/ui";
import type { ImportDetail, ImportFile } from "@shared/contracts/imports";
import { FileCard } from "./file-card";
import type { ImportActions } from "./imports-queries";
import { SideColumn } from "./side-column";
import { SideRows, type SideRow } from "./side-rows";

interface Sending {
  readonly name: string;
  readonly share: number;
}

/** Step 1: files in, and what was read from each. */
export function FileStep({ detail, actions }: { detail: ImportDetail; actions: ImportActions }) {
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  const [sending, setSending] = useState<Sending | null>(null);
  const [refused, setRefused] = useState<Error | null>(null);

  const send = async (files: File[]) => {
    setRefused(null);
    try {
      for (const file of files) {
        setSending({ name: file.name, share: 0 });
        await actions.addFile.mutateAsync({
          file,
          onProgress: (share) => setSending({ name: file.name, share }),
        });
      }
    } catch (error) {
      setRefused(error instanceof Error ? error : new Error(String(error)));
    } finally {
      setSending(null);
    }
  };

  const several = detail.files.length > 1;
  const abreast = several && !phone;
  return (
    <SideColumn
      main={
        <>
          {detail.can.edit ? (
            <DropZone
              label={phone ? t("file.drop.titlePhone") : t("file.drop.title")}
              hint={t("file.drop.text")}
              accept={[".csv", ".tsv", ".txt"]}
              multiple
              disabled={sending !== null}
              onFiles={(files) => void send(files)}
            />
          ) : null}
          {sending ? (
            <Banner kind="note" icon="download" live>
              {t("file.uploading", {
                name: sending.name,
                percent: Math.round(sending.share * 100),
              })}
            </Banner>
          ) : null}
          {refused ? <Refused error={refused} /> : null}
          <View
            style={{
              flexDirection: abreast ? "row" : "column",
              // A column that wraps is as wide as the longest line of the file.
              flexWrap: abreast ? "wrap" : "nowrap",
              gap: 16,
            }}
          >
            {detail.files.map((file) => (
              <View
                key={file.id}
                style={{ flexGrow: 1, flexBasis: abreast ? 320 : "auto", minWidth: 0 }}
              >
                <FileCard file={file} detail={detail} actions={actions} />
              </View>
            ))}
          </View>
        </>
      }
      side={detail.files.map((file) => (
        <ReadFromFile key={file.id} file={file} named={several} />
      ))}
    />
  );
}

function Refused({ error }: { error: Error }) {
  return <ErrorState problem={error instanceof ApiError ? error.problem : null} />;
}

const SEPARATOR_NAMES = {
  ",": "comma",
  ";": "semicolon",
  "\t": "tab",
  "|": "bar",
  " ": "space",
} as const;

function ReadFromFile({ file, named }: { file: ImportFile; named: boolean }) {
  const t = useWords("imports");
  const format = useFormat();
  if (file.unreadable) return null;
  const { recognition, recipe } = file;
  if (!recognition || !recipe) return <LoadingBlocks label={t("file.readingUnknown")} />;

  const marks = new Set(
    recipe.columns
      .filter((column) => column.meaning !== "skip" && column.unit !== null)
      .map((column) => column.decimalMark),
  );
  const mark = marks.size > 1 ? "mixed" : marks.has(",") ? "comma" : "point";
  const rows: SideRow[] = [
    {
      label: t("file.read.header"),
      value:
        recipe.dialect.headerLine === null
          ? t("file.read.none")
          : String(recipe.dialect.headerLine),
      asRead: true,
    },
    {
      label: t("file.read.separator"),
      value: t(`file.separatorName.${SEPARATOR_NAMES[recipe.dialect.separator]}`),
      asRead: true,
    },
    { label: t("file.read.decimal"), value: t(`file.decimalName.${mark}`), asRead: true },
    { label: t("file.read.rows"), value: format.number(recognition.dataRowCount, 0), asRead: true },
    { label: t("file.read.columns"), value: String(recognition.columnCount), asRead: true },
    {
      label: t("file.read.encoding"),
      value: t(`file.encodingName.${recipe.dialect.encoding}`),
      asRead: true,
    },
  ];
  return (
    <View style={{ gap: 20 }}>
      <SideRows title={named ? file.name : t("file.read.title")} rows={rows} />
      {recognition.preamble.length > 0 ? (
        <SideRows
          title={t("file.above")}
          rows={recognition.preamble.slice(0, 8).map((entry) => ({
            label: entry.label,
            value: entry.value,
            asRead: true,
          }))}
        />
      ) : null}
    </View>
  );
}
