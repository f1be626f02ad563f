import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { useState, type ReactNode } from "react";
import { View } from "react-native";

import type { Site } from "@shared/contracts/places";
import { FailedAnswer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Button,
  Chip,
  dayInZone,
  EmptyState,
  LoadingBlocks,
  Screen,
  SelectField,
  Text,
  useBreakpoint,
} from "@features/ui";

import { FindingsList } from "./findings-list";
import { WorkingsOverPage } from "@features/workings/workings-over-page";

import { LoopCards } from "./loop-cards";
import { todayPaths } from "./today-paths";
import { todayQueries } from "./today-queries";

/** What needs a look at a site, beside each loop's last day. */
export function TodayScreen() {
  const t = useWords("today");
  const { site: asked } = useLocalSearchParams<{ site?: string }>();
  const sites = useQuery(todayQueries.sites);
  if (sites.data === undefined)
    return (
      <Screen title={t("title")}>
        {sites.error ? (
          <FailedAnswer error={sites.error} onRetry={() => void sites.refetch()} />
        ) : (
          <LoadingBlocks blocks={blocks} />
        )}
      </Screen>
    );
  const { items, can } = sites.data;
  const site = items.find(({ id }) => id === asked) ?? items[0];
  if (site) return <SiteToday site={site} sites={items} />;
  return (
    <Screen title={t("title")}>
      <EmptyState
        title={t("noSites.title")}
        detail={t(can.create ? "noSites.detail" : "noSites.ask")}
        action={
          can.create ? (
            <Button icon="plus" label={t("noSites.action")} href={todayPaths.newSite} />
          ) : undefined
        }
      />
    </Screen>
  );
}

const blocks = [
  { width: 220, height: 26 },
  { width: "100%", height: 200 },
  { width: "100%", height: 200 },
] as const;

function SiteToday({ site, sites }: { site: Site; sites: readonly Site[] }) {
  const t = useWords("today");
  const router = useRouter();
  const size = useBreakpoint();
  const [now] = useState(() => Date.now());
  const today = useQuery(todayQueries.today(site.id));
  const date = today.data?.today ?? dayInZone(now, site.zone);
  const format = useFormat(site.zone, site.unitSystem, date);
  const phone = size === "phone";
  const title = phone ? t("title") : withoutYear(format.day(date, "full"));
  const chooser =
    sites.length > 1 ? (
      <View style={{ minWidth: 220, marginTop: 8 }}>
        <SelectField
          label={t("site")}
          value={site.id}
          options={sites.map(({ id, name }) => ({ value: id, label: name }))}
          onChange={(picked) => router.setParams({ site: picked })}
        />
      </View>
    ) : null;
  return (
    <Screen
      title={title}
      {...(phone ? {} : { kicker: site.name })}
      subtitle={
        <Subtitle
          line={phone ? `${format.day(date, "weekdayDay")}, ${site.name}` : null}
          invented={site.isDemo}
        >
          {chooser}
        </Subtitle>
      }
      actions={
        site.can.import ? (
          <Button kind="second" icon="download" label={t("import")} href={todayPaths.importLog} />
        ) : undefined
      }
    >
      {today.data === undefined ? (
        today.error ? (
          <FailedAnswer error={today.error} onRetry={() => void today.refetch()} />
        ) : (
          <LoadingBlocks blocks={blocks} />
        )
      ) : today.data.loops.length === 0 ? (
        <EmptyState
          title={t("noLoops.title")}
          detail={t("noLoops.detail")}
          action={<Button label={t("noLoops.action")} href={todayPaths.site(site.id)} />}
        />
      ) : (
        <View style={{ flexDirection: size === "wide" ? "row" : "column", gap: 28 }}>
          <View style={size === "wide" ? { width: 368, flexShrink: 0 } : null}>
            <FindingsList findings={today.data.needsALook} format={format} />
          </View>
          <View style={size === "wide" ? { flex: 1, minWidth: 0 } : null}>
            <LoopCards today={today.data} format={format} />
            <WorkingsOverPage />
          </View>
        </View>
      )}
    </Screen>
  );
}

/** "Tuesday 19 May": on the day itself the year goes without saying. */
function withoutYear(full: string): string {
  return full.replace(/\s*\d{4}$/, "");
}

function Subtitle(props: { line: string | null; invented: boolean; children: ReactNode }) {
  const t = useWords("today");
  return (
    <View style={{ gap: 6 }}>
      {props.line === null ? null : <Text tone="ink2">{props.line}</Text>}
      {props.invented ? (
        <View style={{ flexDirection: "row", marginTop: 4 }}>
          <Chip label={t("invented")} tone="line" />
        </View>
      ) : null}
      {props.children}
    </View>
  );
}
