import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { useEffect, useRef } from "react";
import { View } from "react-native";
import { FailedAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Button,
  EmptyState,
  LoadingBlocks,
  Screen,
  SelectField,
  Text,
  TextLink,
} from "@features/ui";
import { importPaths } from "./import-paths";
import { placesToImportQuery, useStartImport } from "./imports-queries";

/** Which metering point the logger measured; with one in the URL the import opens at once. */
export function StartImportScreen() {
  const t = useWords("imports");
  const { point } = useLocalSearchParams<{ point?: string }>();
  const start = useStartImport();
  const { mutate } = start;
  const asked = useRef<string | null>(null);
  const open = (pointId: string) =>
    mutate(pointId, {
      onSuccess: (detail) => router.replace(importPaths.wizard(detail.id, "file")),
    });

  useEffect(() => {
    if (!point || asked.current === point) return;
    asked.current = point;
    mutate(point, { onSuccess: (detail) => router.replace(importPaths.wizard(detail.id, "file")) });
  }, [point, mutate]);

  return (
    <Screen
      title={t("start.title")}
      narrow
      crumbs={[{ label: t("logs.title"), href: importPaths.logs }]}
    >
      {start.error ? (
        <FailedAnswer error={start.error} onRetry={() => point && open(point)} />
      ) : point ? (
        <LoadingBlocks />
      ) : (
        <ChoosePoint opening={start.isPending} onOpen={open} />
      )}
    </Screen>
  );
}

function ChoosePoint(props: { opening: boolean; onOpen: (pointId: string) => void }) {
  const t = useWords("imports");
  const chosen = useLocalSearchParams<{ site?: string; loop?: string; chosen?: string }>();
  const sites = useQuery(placesToImportQuery.sites);
  const only = sites.data?.items.length === 1 ? sites.data.items[0]?.id : undefined;
  const siteId = chosen.site ?? only;
  const loops = useQuery({ ...placesToImportQuery.loops(siteId ?? ""), enabled: Boolean(siteId) });
  const points = useQuery({
    ...placesToImportQuery.points(chosen.loop ?? ""),
    enabled: Boolean(chosen.loop),
  });
  const solePoint = points.data?.items.length === 1 ? points.data.items[0]?.id : undefined;
  const pointId = chosen.chosen ?? solePoint;

  if (sites.isPending) return <LoadingBlocks />;
  if (sites.error) return <FailedAnswer error={sites.error} onRetry={() => void sites.refetch()} />;
  if (sites.data.items.length === 0) {
    return (
      <EmptyState
        title={t("start.noSites.title")}
        detail={t("start.noSites.text")}
        action={<Button href="/sites" label={t("start.noSites.action")} />}
      />
    );
  }
  return (
    <View style={{ gap: 18 }}>
      <Text tone="ink2">{t("start.lead")}</Text>
      <SelectField
        label={t("start.site")}
        value={siteId ?? null}
        emptyLabel={t("start.choose")}
        options={sites.data.items.map(({ id, name }) => ({ value: id, label: name }))}
        onChange={(site) => router.setParams({ site, loop: undefined, chosen: undefined })}
      />
      {siteId && loops.data ? (
        loops.data.items.length === 0 ? (
          <Text>
            {t("start.noLoops")} <TextLink href={`/sites/${siteId}`} label={t("start.openSite")} />
          </Text>
        ) : (
          <SelectField
            label={t("start.loop")}
            value={chosen.loop ?? null}
            emptyLabel={t("start.choose")}
            options={loops.data.items.map(({ id, tag, name }) => ({
              value: id,
              label: `${tag} ${name}`,
            }))}
            onChange={(loop) => router.setParams({ loop, chosen: undefined })}
          />
        )
      ) : null}
      {chosen.loop && points.data ? (
        points.data.items.length === 0 ? (
          <Text>
            {t("start.noPoints")}{" "}
            <TextLink href={`/loops/${chosen.loop}`} label={t("start.addPoint")} />
          </Text>
        ) : (
          <SelectField
            label={t("start.point")}
            value={pointId ?? null}
            emptyLabel={t("start.choose")}
            options={points.data.items.map(({ id, code, name }) => ({
              value: id,
              label: `${code} ${name}`,
            }))}
            onChange={(value) => router.setParams({ chosen: value })}
          />
        )
      ) : null}
      <View style={{ alignSelf: "flex-start" }}>
        <Button
          label={t("start.next")}
          busy={props.opening}
          offBecause={pointId ? undefined : t("start.lead")}
          onPress={() => pointId && props.onOpen(pointId)}
        />
      </View>
    </View>
  );
}
