import { useWords } from "@features/i18n";
import { ErrorState } from "@features/ui";
import type { ImportFile } from "@shared/contracts/imports";

const KNOWN = [
  "empty",
  "notText",
  "noTimes",
  "noRows",
  "tooManyColumns",
  "columnsDoNotMatchHeader",
  "halfDayUnknown",
  "oldSpreadsheet",
  "otherSpreadsheet",
  "archiveBroken",
  "archiveEncrypted",
  "archiveNested",
  "archiveTooLarge",
  "archiveTooDense",
  "archiveTooManyEntries",
  "archiveTooManyFiles",
  "archiveUnsafeName",
  "archiveMethod",
  "archiveEmpty",
  "workbookEmpty",
  "workbookUnsafe",
  "alreadyThere",
] as const;

/** Why a file cannot be read, what was seen, and what helps. */
export function Unreadable(props: {
  file: ImportFile;
  unreadable: NonNullable<ImportFile["unreadable"]>;
}) {
  const t = useWords("imports");
  const { code: given, line, cell } = props.unreadable;
  const code = KNOWN.find((name) => name === given) ?? "other";
  return (
    <ErrorState
      title={t(`file.unreadable.${code}.title`)}
      problem={{
        type: "about:blank",
        title: t(`file.unreadable.${code}.title`),
        status: 422,
        code: given,
        detail: t(`file.unreadable.${code}.text`),
        remedy: line === null ? "" : t("file.unreadable.at", { line }),
      }}
      seen={cell ?? undefined}
    />
  );
}
