import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { addressOf } from "@features/api";
import { Banner, Row, Text, TextLink } from "@features/ui";
import { downloadLogFile, downloadLogText, type ImportFile } from "@shared/contracts/imports";

type Source = NonNullable<ImportFile["source"]>;

/** The workbook or archive a log came in, and what of it a person should know. */
export function SourceOfFile(props: { importId: string; file: ImportFile; source: Source }) {
  const { importId, file, source } = props;
  const t = useWords("imports");
  const format = useFormat();
  const { kind, name, bytes, member, leftOut } = source;
  const notes = [
    ...(source.nameMisleads ? [t(`file.source.misleads.${kind}`, { name })] : []),
    ...(source.countsFrom1904 ? [t("file.source.from1904")] : []),
    ...(source.formulasWithoutValue > 0
      ? [t("file.source.formulas", { count: source.formulasWithoutValue })]
      : []),
  ];
  return (
    <View style={{ gap: 8 }}>
      {member === null ? (
        <Text variant="small" tone="ink2">
          {file.unreadable ? t(`file.source.kind.${kind}`) : t("file.source.unpacking")}
        </Text>
      ) : (
        <Text variant="small" tone="ink2">
          {t(`file.source.in.${kind}`, { name, member, size: format.bytes(bytes) })}
        </Text>
      )}
      <Row gap={4} wrap>
        <TextLink
          variant="small"
          label={t("file.download")}
          said={t("file.downloadOf", { name })}
          href={addressOf(downloadLogFile, { params: { importId, fileId: file.id } })}
        />
        {member === null ? null : (
          <TextLink
            variant="small"
            label={t("file.downloadText")}
            said={t("file.downloadTextOf", { name: file.name })}
            href={addressOf(downloadLogText, { params: { importId, fileId: file.id } })}
          />
        )}
      </Row>
      {leftOut.length > 0 ? (
        <Text variant="small" tone="ink2">
          {t("file.source.leftOut")}{" "}
          {leftOut
            .map((part) =>
              t("file.source.part", {
                name: part.name,
                because: t(`file.source.because.${part.because}`),
              }),
            )
            .join("; ")}
        </Text>
      ) : null}
      {notes.map((note) => (
        <Banner key={note} kind="look">
          {note}
        </Banner>
      ))}
    </View>
  );
}
