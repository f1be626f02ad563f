import { useInfiniteQuery } from "@tanstack/react-query";
import { View } from "react-native";
import { FailedAnswer, useSession } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Button,
  Chip,
  EmptyState,
  LoadingBlocks,
  LoopTag,
  Row,
  Screen,
  Table,
  Text,
} from "@features/ui";
import type { ImportState, ImportSummary } from "@shared/contracts/imports";
import { importPaths } from "./import-paths";
import { importsQuery } from "./imports-queries";
import { LogFilters, useLogFilters } from "./log-filters";
import { serviceOfLoop } from "./loop-service";

/** Every import of the organisation, newest first; also where one that was left is found again. */
export function LogsScreen() {
  const t = useWords("imports");
  const { data: session } = useSession();
  const ofLogs = useWords("logs");
  const filters = useLogFilters();
  const isNarrowed = Object.values(filters).some((value) => value !== undefined);
  const query = useInfiniteQuery(importsQuery(filters));
  const imports = query.data?.pages.flatMap((page) => page.items) ?? [];
  const mayImport = session?.can.importLogs ?? false;
  const start = (
    <>
      <Button kind="second" label={ofLogs("recipes")} href={importPaths.recipes} />
      {mayImport ? (
        <>
          <Button kind="second" label={ofLogs("many")} href={importPaths.batches} />
          <Button icon="download" label={t("logs.import")} href={importPaths.start()} />
        </>
      ) : null}
    </>
  );
  return (
    <Screen title={t("logs.title")} actions={start}>
      <View style={{ gap: 20 }}>
        {imports.length > 0 || isNarrowed ? <LogFilters imports={imports} /> : null}
        {query.isPending ? <LoadingBlocks blocks={[{ width: "100%", height: 260 }]} /> : null}
        {query.error && imports.length === 0 ? (
          <FailedAnswer error={query.error} onRetry={() => void query.refetch()} />
        ) : null}
        {query.isSuccess && imports.length === 0 && isNarrowed ? (
          <EmptyState
            title={ofLogs("filter.none.title")}
            detail={ofLogs("filter.none.text")}
            action={
              <Button kind="second" label={ofLogs("filter.none.clear")} href={importPaths.logs} />
            }
          />
        ) : null}
        {query.isSuccess && imports.length === 0 && !isNarrowed ? (
          <EmptyState
            title={t("logs.empty.title")}
            detail={t("logs.empty.text")}
            action={
              mayImport ? <Button label={t("logs.import")} href={importPaths.start()} /> : undefined
            }
          />
        ) : null}
        {imports.length > 0 ? <ImportsTable imports={imports} /> : null}
        {query.hasNextPage ? (
          <Row>
            <Button
              kind="second"
              label={t("logs.more")}
              busy={query.isFetchingNextPage}
              onPress={() => void query.fetchNextPage()}
            />
          </Row>
        ) : null}
      </View>
    </Screen>
  );
}

function ImportsTable({ imports }: { imports: readonly ImportSummary[] }) {
  const t = useWords("imports");
  const format = useFormat();
  const files = (item: ImportSummary) => item.fileNames.join(", ") || t("logs.noFile");
  const covers = (item: ImportSummary) =>
    item.firstInstant && item.lastInstant
      ? `${format.date(Date.parse(item.firstInstant), "dayMonthYear")} – ${format.date(Date.parse(item.lastInstant), "dayMonthYear")}`
      : "—";
  const tag = (item: ImportSummary) => (
    <LoopTag tag={item.loop.tag} service={serviceOfLoop(item.loop.service)} size="s" />
  );
  return (
    <Table
      caption={t("logs.caption")}
      captionHidden
      rows={imports}
      rowKey={(item) => item.id}
      href={(item) => importPaths.wizard(item.id)}
      tone={(item) => (item.state === "failed" ? "wrong" : item.state === "asking" ? "look" : null)}
      columns={[
        { key: "loop", header: t("logs.columns.files"), render: files },
        { key: "tag", header: t("logs.columns.loop"), render: tag },
        {
          key: "state",
          header: t("logs.columns.state"),
          render: (item) => (
            <Row>
              <StateChip state={item.state} />
            </Row>
          ),
        },
        {
          key: "rows",
          header: t("logs.columns.rows"),
          align: "right",
          asRead: (item) => format.number(item.rowsStored, 0),
        },
        { key: "covers", header: t("logs.columns.covers"), render: covers, wideOnly: true },
        {
          key: "by",
          header: t("logs.columns.by"),
          render: (item) => item.createdBy,
          wideOnly: true,
        },
        {
          key: "at",
          header: t("logs.columns.at"),
          render: (item) => format.dateTime(Date.parse(item.createdAt)),
        },
      ]}
      card={{
        title: files,
        figure: (item) => <StateChip state={item.state} />,
        lines: (item) => [
          <Row key="tag" gap={2}>
            {tag(item)}
            <Text variant="small" tone="ink2">
              {item.point.name}
            </Text>
          </Row>,
          `${item.createdBy}, ${format.dateTime(Date.parse(item.createdAt))}`,
        ],
      }}
    />
  );
}

const TONES: Partial<Record<ImportState, "look" | "wrong">> = {
  asking: "look",
  ready: "look",
  failed: "wrong",
};

function StateChip({ state }: { state: ImportState }) {
  const t = useWords("imports");
  return <Chip label={t(`state.${state}`)} tone={TONES[state] ?? "plain"} />;
}
