import { useState } from "react";
import { View } from "react-native";
import { ApiError } from "@features/api";
import { useFieldWords, useWords } from "@features/i18n";
import { Banner, DropZone, ErrorState, useBreakpoint } from "@features/ui";
import type { ImportDetail } from "@shared/contracts/imports";
import { UPLOAD_ENDINGS } from "@shared/domain/log-files/containers";
import { FileCard } from "./file-card";
import type { ImportActions } from "./imports-queries";
import { ReadFromFile } from "./read-from-file";
import { RecipeOffer } from "./recipes/recipe-offer";
import { SideColumn } from "./side-column";

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
              accept={UPLOAD_ENDINGS}
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
                <RecipeOffer file={file} detail={detail} />
                <FileCard file={file} detail={detail} actions={actions} />
              </View>
            ))}
          </View>
        </>
      }
      side={detail.files.map((file) => (
        <ReadFromFile key={file.id} file={file} detail={detail} actions={actions} named={several} />
      ))}
    />
  );
}

function Refused({ error }: { error: Error }) {
  const t = useWords("imports");
  const fieldWords = useFieldWords();
  const problem = error instanceof ApiError ? error.problem : null;
  // What is wrong with the file itself says more than that a field was refused.
  const [first] = problem?.errors ?? [];
  if (!problem || !first) return <ErrorState problem={problem} />;
  return (
    <ErrorState
      title={t("file.refused")}
      problem={{ ...problem, code: first.code, detail: fieldWords(first), remedy: "" }}
    />
  );
}
