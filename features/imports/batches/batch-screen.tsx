import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import { MAX_FILES_PER_BATCH, type BatchDetail } from "@shared/contracts/import-batches";
import { UPLOAD_ENDINGS } from "@shared/domain/log-files/containers";
import { Answer, saveFile, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, DropZone, Screen, Text, TextLink, useBreakpoint } from "@features/ui";
import { importPaths } from "../import-paths";
import { BatchCards } from "./batch-cards";
import {
  batchQueries,
  batchReportAddress,
  useBatchActions,
  type BatchActions,
} from "./batch-queries";
import { BatchTable } from "./batch-table";

/** Files of one batch as they come in, move on and are imported; and the report of all of them. */
export function BatchScreen() {
  const t = useWords("batches");
  const crumbs = useCrumbs();
  const { batchId } = useLocalSearchParams<{ batchId: string }>();
  const query = useQuery(batchQueries.detail(batchId));
  if (query.data) return <Batch batch={query.data} />;
  return (
    <Screen title={t("title")} crumbs={crumbs}>
      <Answer of={{ ...query, data: query.data as BatchDetail | undefined }} denied={t("denied")}>
        {() => null}
      </Answer>
    </Screen>
  );
}

function useCrumbs() {
  const t = useWords("batches");
  const ofImports = useWords("imports");
  return [
    { label: ofImports("logs.title"), href: importPaths.logs },
    { label: t("title"), href: importPaths.batches },
  ];
}

function Batch({ batch }: { batch: BatchDetail }) {
  const t = useWords("batches");
  const phone = useBreakpoint() === "phone";
  const actions = useBatchActions(batch.id);
  const imported = batch.files.filter(({ state }) => state === "imported").length;
  const open = batch.files.length - imported - batch.ready;
  return (
    <Screen
      title={t("one.title", { site: batch.site.name })}
      subtitle={t("one.subtitle", { recipe: batch.recipe.name })}
      crumbs={useCrumbs()}
      footer={
        batch.can.edit && imported < batch.files.length ? (
          <Confirm batch={batch} actions={actions} />
        ) : undefined
      }
    >
      <View style={{ gap: 20 }}>
        {batch.can.edit ? <Upload actions={actions} /> : null}
        <Refused batch={batch} actions={actions} />
        {batch.files.length === 0 ? (
          <Text tone="ink2">{t("one.empty")}</Text>
        ) : (
          <>
            <View role="status" style={{ flexDirection: "row", flexWrap: "wrap", gap: 16 }}>
              <Text variant="bodyWide">
                {t("one.summary", { imported, ready: batch.ready, open })}
              </Text>
              <TextLink
                onPress={() => saveFile(batchReportAddress(batch.id))}
                label={t("one.report")}
              />
            </View>
            {phone ? (
              <BatchCards batch={batch} actions={actions} />
            ) : (
              <BatchTable batch={batch} actions={actions} />
            )}
          </>
        )}
      </View>
    </Screen>
  );
}

interface Sending {
  readonly name: string;
  readonly done: number;
  readonly total: number;
}

function Upload({ actions }: { actions: BatchActions }) {
  const t = useWords("batches");
  const phone = useBreakpoint() === "phone";
  const inWords = useErrorWords();
  const [sending, setSending] = useState<Sending | null>(null);
  const [refused, setRefused] = useState<readonly { name: string; why: string }[]>([]);
  const send = async (files: File[]) => {
    setRefused([]);
    for (const [done, file] of files.entries()) {
      setSending({ name: file.name, done, total: files.length });
      try {
        await actions.add(file);
      } catch (error) {
        // One that is refused holds the others up no more than one that asks.
        const why = inWords(error instanceof Error ? error : new Error(String(error)));
        setRefused((before) => [...before, { name: file.name, why }]);
      }
    }
    setSending(null);
  };
  return (
    <View style={{ gap: 12 }}>
      <DropZone
        label={phone ? t("one.dropPhone") : t("one.drop")}
        hint={t("one.hint", { count: MAX_FILES_PER_BATCH })}
        accept={UPLOAD_ENDINGS}
        multiple
        disabled={sending !== null}
        onFiles={(files) => void send(files)}
      />
      {sending ? (
        <Banner kind="note" icon="download" live>
          {t("one.sending", { ...sending, done: sending.done + 1 })}
        </Banner>
      ) : null}
      {refused.map(({ name, why }) => (
        <Banner key={name} kind="wrong" live lead={t("one.refused", { name })}>
          {why}
        </Banner>
      ))}
    </View>
  );
}

function Refused({ batch, actions }: { batch: BatchDetail; actions: BatchActions }) {
  const { choosePoint, remove, confirm } = actions;
  const failed = [choosePoint, remove, confirm].find(({ error }) => error !== null);
  const named = batch.refused.map(({ batchFileId, detail, remedy }) => {
    const name = batch.files.find(({ id }) => id === batchFileId)?.name ?? "";
    return { key: batchFileId, name, text: `${detail} ${remedy}` };
  });
  return (
    <>
      {failed ? (
        <Banner kind="wrong" live>
          {failed.formErrors.join(" ")}
        </Banner>
      ) : null}
      {named.map(({ key, name, text }) => (
        <Banner key={key} kind="wrong" live lead={name}>
          {text}
        </Banner>
      ))}
    </>
  );
}

function Confirm({ batch, actions }: { batch: BatchDetail; actions: BatchActions }) {
  const t = useWords("batches");
  const phone = useBreakpoint() === "phone";
  return (
    <>
      <View style={{ flexGrow: 1 }}>
        {phone ? null : <Text tone="ink2">{t("one.readyNote")}</Text>}
      </View>
      <Button
        label={batch.ready === 0 ? t("one.noneReady") : t("one.confirm", { count: batch.ready })}
        busy={actions.confirm.busy}
        offBecause={batch.can.confirm ? undefined : t("one.readyNote")}
        onPress={() => actions.confirm.send(undefined)}
      />
    </>
  );
}
