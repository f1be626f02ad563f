import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { FailedAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import { dayInZone, LoadingBlocks, LoopTag, Screen, Tabs } from "@features/ui";
import { loopsPaths } from "@features/loops/loops-paths";
import type { AskedParams } from "./change-draft";
import { correctionsQueries } from "./corrections-queries";
import { CorrectionsTab } from "./corrections-tab";
import { FillsTab } from "./fills-tab";
import { ResultsTab } from "./results-tab";

/** What every tab knows of the point it is about. */
export interface PlaceProps {
  site: Site;
  loop: Loop;
  point: Point;
  /** The site's date. */
  today: string;
}

const tabs = ["corrections", "fills", "results"] as const;
type Tab = (typeof tabs)[number];

type Params = Partial<Record<"tab" | "until" | "result" | "fill" | "since", string>> & AskedParams;

/** Corrections of a point's readings, fills of their gaps, and every result its energy has had. */
export function CorrectionsScreen() {
  const params = useLocalSearchParams<
    { siteId: string; loopId: string; pointId: string } & Params
  >();
  const t = useWords("corrections");
  const site = useQuery(correctionsQueries.site(params.siteId));
  const loop = useQuery(correctionsQueries.loop(params.loopId));
  const point = useQuery(correctionsQueries.point(params.pointId));
  const [now] = useState(() => Date.now());
  const failed = [site, loop, point].find(({ error }) => error !== null);
  const ready = site.data && loop.data && point.data;
  return (
    <Screen
      title={t("title")}
      subtitle={point.data ? `${point.data.code}, ${point.data.name}` : undefined}
      tag={
        loop.data ? (
          <LoopTag tag={loop.data.tag} service={services[loop.data.service]} size="l" />
        ) : undefined
      }
      crumbs={[
        { label: t("sites"), href: loopsPaths.sites },
        ...(site.data ? [{ label: site.data.name, href: loopsPaths.site(site.data.id) }] : []),
        ...(loop.data
          ? [
              {
                label: loop.data.name,
                href: loopsPaths.loop(loop.data.id, { point: params.pointId }),
              },
            ]
          : []),
      ]}
    >
      {ready ? (
        <Tabbed
          site={site.data}
          loop={loop.data}
          point={point.data}
          today={dayInZone(now, site.data.zone)}
          params={params}
        />
      ) : failed?.error ? (
        <FailedAnswer
          error={failed.error}
          denied={t("denied")}
          onRetry={() => void failed.refetch()}
        />
      ) : (
        <LoadingBlocks />
      )}
    </Screen>
  );
}

const services = { chilled: "cooling", hot: "heating", changeover: "changeover" } as const;

function Tabbed(props: PlaceProps & { params: Params }) {
  const { params, ...place } = props;
  const t = useWords("corrections");
  const router = useRouter();
  const current: Tab = tabs.find((tab) => tab === params.tab) ?? "corrections";
  return (
    <View style={{ gap: 20 }}>
      <Tabs
        label={t("title")}
        tabs={tabs.map((key) => ({ key, label: t(`tab.${key}`) }))}
        current={current}
        onChange={(tab) => router.setParams({ tab, result: undefined, fill: undefined })}
        panelId="corrections"
      />
      <View role="tabpanel" id={`corrections-${current}`} aria-label={t(`tab.${current}`)}>
        {current === "corrections" ? <CorrectionsTab {...place} asked={params} /> : null}
        {current === "fills" ? (
          <FillsTab {...place} since={params.since} until={params.until} asked={params.fill} />
        ) : null}
        {current === "results" ? <ResultsTab {...place} openId={params.result} /> : null}
      </View>
    </View>
  );
}
