import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { useState, type ReactNode } from "react";
import { View } from "react-native";

import type { Loop, Point, Site } from "@shared/contracts/places";
import { FailedAnswer } from "@features/api";
import { needsYear, useFormat, useWords } from "@features/i18n";
import { useWorkings } from "@features/workings/use-workings";
import { WorkingsAside } from "@features/workings/workings-panel";
import {
  Button,
  dayInZone,
  EmptyState,
  Inspector,
  isoWeek,
  LoadingBlocks,
  LoopTag,
  Screen,
  useBreakpoint,
} from "@features/ui";

import { BusiestCard } from "./busiest-card";
import { ChartCard, type TableStep } from "./chart-card";
import { CompanionsCard } from "./companions-card";
import { DayList } from "./day-list";
import { DownloadsMenu } from "./downloads-menu";
import { Headline } from "./headline";
import { LoadView, type LoadParams } from "./load-view";
import type { FiguresWithWorkings, LoopView } from "./loop-context";
import { LoopInspector } from "./loop-inspector";
import { loopsPaths } from "./loops-paths";
import { pageBlocks } from "./page-blocks";
import { loopsQueries } from "./loops-queries";
import { RangeBar, rangeWords } from "./range-bar";
import { tagService } from "./register-words";
import { askedFigure } from "./asked-figure";
import {
  lastDayOf,
  askedRange,
  defaultRange,
  rangeParams,
  weekOf,
  type ShownRange,
} from "./shown-range";
import { SupportingFigures } from "./supporting-figures";
import { ViewTabs } from "./view-tabs";

interface LoopPageProps {
  loop: Loop;
  points: readonly Point[];
  point: Point;
  site: Site;
}

type Params = Partial<Record<"week" | "from" | "to" | "point" | "show" | "rows" | "view", string>> &
  LoadParams;

/** A point's page: everything that is picked on it stands in the address. */
export function LoopPage(props: LoopPageProps) {
  const { site, point } = props;
  const params = useLocalSearchParams<Params>();
  const [now] = useState(() => Date.now());
  const today = dayInZone(now, site.zone);
  const extent = useQuery(loopsQueries.dayMarks(point.id, weekOf(today)));
  const dayOf = (at: string | null | undefined) =>
    at ? dayInZone(Date.parse(at), site.zone) : null;
  const first = dayOf(extent.data?.firstReadingAt);
  const last = dayOf(extent.data?.lastReadingAt);
  const asked = askedRange(params);
  const range = asked ?? (extent.data ? defaultRange({ first, last }, today) : null);
  if (range) return <Ranged {...props} {...{ range, today, first, last, params }} />;
  return (
    <Frame {...props}>
      {extent.error ? (
        <FailedAnswer error={extent.error} onRetry={() => void extent.refetch()} />
      ) : (
        <Blocks />
      )}
    </Frame>
  );
}

function Blocks() {
  return <LoadingBlocks blocks={pageBlocks} />;
}

/** Header round whatever the page has to say. */
function Frame(
  props: LoopPageProps & { actions?: ReactNode; aside?: ReactNode; children: ReactNode },
) {
  const { loop, site } = props;
  const t = useWords("loops");
  return (
    <Screen
      title={loop.name}
      tag={<LoopTag tag={loop.tag} service={tagService(loop.service)} size="l" />}
      crumbs={[
        { label: t("sites"), href: loopsPaths.sites },
        { label: site.name, href: loopsPaths.site(site.id) },
      ]}
      actions={props.actions}
      aside={props.aside}
    >
      {props.children}
    </Screen>
  );
}

interface RangedProps extends LoopPageProps {
  range: ShownRange;
  today: string;
  first: string | null;
  last: string | null;
  params: Params;
}

function Ranged(props: RangedProps) {
  const { loop, site, point, range, params } = props;
  const t = useWords("loops");
  const router = useRouter();
  const format = useFormat(site.zone, site.unitSystem, props.today);
  const wide = useBreakpoint() === "wide";
  const [details, setDetails] = useState(false);
  const summary = useQuery({
    ...loopsQueries.summary(point.id, range),
    placeholderData: keepPreviousData,
  });
  const days = rangeWords(range, format, props.today);
  const view: LoopView = {
    site,
    loop,
    point,
    points: props.points,
    range,
    today: props.today,
    format,
    rangeName:
      range.week !== null
        ? needsYear(lastDayOf(range), props.today)
          ? t("range.inWeekOf", { week: isoWeek(range.week), year: lastDayOf(range).slice(0, 4) })
          : t("range.inWeek", { week: isoWeek(range.week) })
        : days.one
          ? days.from
          : t("range.days", days),
  };
  const actions = (
    <>
      <RangeBar
        range={range}
        pointId={point.id}
        today={props.today}
        zone={site.zone}
        first={props.first}
        last={props.last}
        onChange={(picked) => router.setParams(rangeParams(picked))}
      />
      <DownloadsMenu pointId={point.id} range={range} />
      {wide ? null : (
        <Button kind="second" label={t("inspector.open")} onPress={() => setDetails(true)} />
      )}
    </>
  );
  const workings = useWorkings();
  const figure = workings.open && askedFigure(workings.open, view, summary.data ?? null);
  const aside = figure ? (
    <WorkingsAside asked={figure} onClose={workings.close} />
  ) : (
    <Inspector title={t("inspector.title")} open={details} onClose={() => setDetails(false)}>
      <LoopInspector
        {...view}
        summary={summary.data ?? null}
        onPoint={(pointId) => router.setParams({ point: pointId })}
      />
    </Inspector>
  );
  return (
    <Frame {...props} actions={actions} aside={aside}>
      {summary.data ? (
        <Figures
          {...view}
          summary={summary.data}
          workings={workings}
          stale={summary.isPlaceholderData}
          params={params}
        />
      ) : summary.error ? (
        <FailedAnswer error={summary.error} onRetry={() => void summary.refetch()} />
      ) : (
        <Blocks />
      )}
    </Frame>
  );
}

function Figures(props: FiguresWithWorkings & { stale: boolean; params: Params }) {
  const { summary, point, params } = props;
  const t = useWords("loops");
  const router = useRouter();
  const phone = useBreakpoint() === "phone";
  if (summary.firstReadingAt === null)
    return (
      <EmptyState
        title={t("noReadings.title")}
        detail={t("noReadings.detail")}
        action={
          point.can.import ? (
            <Button icon="download" label={t("import")} href={loopsPaths.importLog(point.id)} />
          ) : undefined
        }
      />
    );
  const load = params.view === "load";
  const headline = <Headline {...props} />;
  const supporting = <SupportingFigures {...props} />;
  const chart = (
    <ChartCard
      {...props}
      shows={params.show === "table" ? "table" : "chart"}
      step={stepOf(params.rows)}
      onShow={(shows) => router.setParams({ show: shows === "table" ? "table" : undefined })}
      onStep={(step) => router.setParams({ rows: step })}
    />
  );
  return (
    <View aria-busy={props.stale} style={{ gap: phone ? 12 : 20, opacity: props.stale ? 0.6 : 1 }}>
      <ViewTabs
        current={load ? "load" : "energy"}
        onChange={(view) => router.setParams({ view: view === "load" ? "load" : undefined })}
      />
      {load ? (
        <LoadView {...props} blocked={summary.basis.blockedBy ? headline : null} />
      ) : phone ? (
        <>
          {headline}
          <BusiestCard {...props} />
          {chart}
          <CompanionsCard {...props} />
          {supporting}
          <DayList {...props} />
        </>
      ) : (
        <>
          <View style={{ flexDirection: "row", gap: 28, alignItems: "flex-start" }}>
            <BusiestCard {...props} />
            <View style={{ flex: 1, minWidth: 240, gap: 8 }}>
              {headline}
              {supporting}
            </View>
          </View>
          {chart}
          <CompanionsCard {...props} />
        </>
      )}
    </View>
  );
}

function stepOf(rows: string | undefined): TableStep {
  return rows === "hour" || rows === "row" ? rows : "day";
}
