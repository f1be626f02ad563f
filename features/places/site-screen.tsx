import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { View } from "react-native";
import type { z } from "zod";
import type { getSiteOverview, Site } from "@shared/contracts/places";
import { rangeOfDates } from "@shared/domain/time/local-calendar";
import { Answer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  addDays,
  Button,
  Chip,
  dayInZone,
  EmptyState,
  Menu,
  mondayOf,
  QualityKey,
  Screen,
  useBreakpoint,
} from "@features/ui";
import { groupByBuilding } from "./building-groups";
import { WorkingsOverPage } from "@features/workings/workings-over-page";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";
import { PipeKey } from "./site-risers";
import { SitePlan } from "./site-plan";
import { useNow } from "./use-now";
import { WeekBar } from "./week-bar";

/** A site: risers from its plant to each building, and each loop's week. */
export function SiteScreen() {
  const { siteId, week } = useLocalSearchParams<{ siteId: string; week?: string }>();
  const answer = useQuery(placesQueries.site(siteId));
  const t = useWords("places");
  if (answer.data) return <SitePage site={answer.data} week={week} />;
  return (
    <Screen title={t("sites.one")} crumbs={[{ label: t("sites.title"), href: placesPaths.sites }]}>
      <Answer of={answer} blocks={planBlocks}>
        {() => null}
      </Answer>
    </Screen>
  );
}

const planBlocks = [
  { width: "100%", height: 150 },
  { width: "100%", height: 150 },
  { width: "100%", height: 150 },
] as const;

const dayIn = (instant: string | null, zone: string) =>
  instant === null ? null : dayInZone(Date.parse(instant), zone);

/** Monday of the last week that readings reach the end of; the only week there is otherwise. */
function lastWholeWeek(firstDay: string | null, lastDay: string): string {
  const monday = mondayOf(lastDay);
  const whole = addDays(monday, 6) <= lastDay;
  return whole || firstDay === null || firstDay >= monday ? monday : addDays(monday, -7);
}

function SitePage({ site, week }: { site: Site; week: string | undefined }) {
  const t = useWords("places");
  const router = useRouter();
  const phone = useBreakpoint() === "phone";
  const now = useNow();
  const today = dayInZone(now, site.zone);
  const asked = week !== undefined && /^\d{4}-\d\d-\d\d$/.test(week) ? mondayOf(week) : null;
  // Without a week in the address: the last whole one that holds readings. A week that has just
  // begun says little, and comparing it with others says less.
  const present = mondayOf(today);
  const latest = useQuery(placesQueries.overview(site.id, present, addDays(present, 7)));
  const last = latest.data?.lastReadingAt ?? null;
  const lastDay = dayIn(last, site.zone);
  const settled = asked !== null || latest.data !== undefined || latest.error !== null;
  const firstDay = dayIn(latest.data?.firstReadingAt ?? null, site.zone);
  const fallback = lastDay === null ? present : lastWholeWeek(firstDay, lastDay);
  const monday = asked ?? fallback;
  const overview = useQuery({
    ...placesQueries.overview(site.id, monday, addDays(monday, 7)),
    enabled: settled,
  });
  const first = latest.data?.firstReadingAt ?? null;

  const actions = (
    <>
      <WeekBar
        monday={monday}
        today={today}
        zoneName={t("week.zone", { zone: site.zone })}
        {...(first === null ? {} : { min: dayInZone(Date.parse(first), site.zone) })}
        {...(lastDay === null ? {} : { max: lastDay })}
        onChange={(picked) => router.setParams({ week: picked })}
      />
      <SiteMenu site={site} />
      {site.can.addLoop && !phone ? (
        <Button icon="plus" label={t("loop.add")} href={placesPaths.newLoop(site.id)} />
      ) : null}
    </>
  );
  return (
    <Screen
      title={site.name}
      crumbs={[{ label: t("sites.title"), href: placesPaths.sites }]}
      subtitle={<SiteMarks site={site} />}
      actions={actions}
    >
      <Answer of={overview} blocks={planBlocks}>
        {(data) => <SiteContent site={site} monday={monday} now={now} data={data} />}
      </Answer>
      <WorkingsOverPage />
    </Screen>
  );
}

type OverviewData = z.infer<(typeof getSiteOverview)["answer"]>;

function SiteMarks({ site }: { site: Site }) {
  const t = useWords("places");
  if (!site.isDemo && site.archivedAt === null) return null;
  return (
    <View style={{ flexDirection: "row", gap: 8, marginTop: 6 }}>
      {site.isDemo ? <Chip label={t("site.invented")} tone="line" /> : null}
      {site.archivedAt === null ? null : <Chip label={t("archive.archived")} icon="archive" />}
    </View>
  );
}

function SiteMenu({ site }: { site: Site }) {
  const t = useWords("places");
  const router = useRouter();
  const phone = useBreakpoint() === "phone";
  const items = [
    // On a phone the drawing needs the room that a button of its own would take.
    ...(phone && site.can.addLoop
      ? [
          {
            key: "add",
            label: t("loop.add"),
            icon: "plus" as const,
            onPress: () => router.push(placesPaths.newLoop(site.id)),
          },
        ]
      : []),
    {
      key: "loops",
      label: t("loops.title"),
      icon: "table" as const,
      onPress: () => router.push(placesPaths.loops(site.id)),
    },
    {
      key: "buildings",
      label: t("buildings.title"),
      icon: "sites" as const,
      onPress: () => router.push(placesPaths.buildings(site.id)),
    },
    ...(site.can.edit
      ? [
          {
            key: "edit",
            label: t("site.edit"),
            icon: "edit" as const,
            onPress: () => router.push(placesPaths.editSite(site.id)),
          },
        ]
      : []),
  ];
  return <Menu label={t("site.menu")} items={items} iconOnly={phone} align="right" />;
}

function SiteContent(props: { site: Site; monday: string; now: number; data: OverviewData }) {
  const { site, monday, data, now } = props;
  const t = useWords("places");
  const format = useFormat(site.zone, site.unitSystem);
  const phone = useBreakpoint() === "phone";
  const week = rangeOfDates(monday, addDays(monday, 7), site.zone);
  if (data.loops.length === 0)
    return (
      <EmptyState
        title={t("site.noLoops")}
        detail={t("site.noLoopsDetail")}
        action={
          site.can.addLoop ? (
            <Button icon="plus" label={t("loop.add")} href={placesPaths.newLoop(site.id)} />
          ) : undefined
        }
      />
    );
  const groups = groupByBuilding(data.buildings, data.loops, {
    loose: t("site.loose"),
    mains: t("site.mains"),
  });
  const soFar = now < week.endMs && now > week.startMs;
  return (
    <>
      <SitePlan
        groups={groups}
        loops={data.loops}
        range={week}
        monday={monday}
        format={format}
        note={soFar ? t("site.soFar") : null}
      />
      <View
        style={{
          flexDirection: phone ? "column" : "row",
          justifyContent: "space-between",
          gap: 12,
          marginTop: 20,
        }}
      >
        <PipeKey supply={t("leg.supply")} return={t("leg.return")} />
        <QualityKey
          only={
            data.loops.some(({ quality }) => quality.some(({ kind }) => kind === "filled"))
              ? ["measured", "estimated", "excluded", "missing"]
              : ["measured", "excluded", "missing"]
          }
        />
      </View>
    </>
  );
}
