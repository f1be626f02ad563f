import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams } from "expo-router";

import type { Loop, Point, Site } from "@shared/contracts/places";
import { FailedAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, EmptyState, LoadingBlocks, LoopTag, Screen } from "@features/ui";

import { LoopPage } from "./loop-page";
import { loopsPaths } from "./loops-paths";
import { loopsQueries } from "./loops-queries";
import { pageBlocks } from "./page-blocks";
import { tagService } from "./register-words";

/** One loop: its energy over a week or any dates, and what that stands on. */
export function LoopScreen() {
  const { loopId } = useLocalSearchParams<{ loopId: string }>();
  const loop = useQuery(loopsQueries.loop(loopId));
  const points = useQuery(loopsQueries.points(loopId));
  const site = useQuery({
    ...loopsQueries.site(loop.data?.siteId ?? ""),
    enabled: loop.data !== undefined,
  });
  const t = useWords("loops");
  if (loop.data && points.data && site.data)
    return <WithPoint loop={loop.data} points={points.data.items} site={site.data} />;
  const failed = [loop, points, site].find((answer) => answer.error !== null);
  return (
    <Screen
      title={loop.data?.name ?? t("one")}
      crumbs={[{ label: t("sites"), href: loopsPaths.sites }]}
    >
      {failed?.error ? (
        <FailedAnswer error={failed.error} onRetry={() => void failed.refetch()} />
      ) : (
        <LoadingBlocks blocks={pageBlocks} />
      )}
    </Screen>
  );
}

function WithPoint(props: { loop: Loop; points: readonly Point[]; site: Site }) {
  const { loop, points, site } = props;
  const { point: asked } = useLocalSearchParams<{ point?: string }>();
  const t = useWords("loops");
  const point =
    points.find(({ id }) => id === asked) ??
    points.find(({ role }) => role === "main") ??
    points[0];
  if (point) return <LoopPage key={point.id} {...props} point={point} />;
  return (
    <Screen
      title={loop.name}
      tag={<LoopTag tag={loop.tag} service={tagService(loop.service)} size="l" />}
      crumbs={[
        { label: t("sites"), href: loopsPaths.sites },
        { label: site.name, href: loopsPaths.site(site.id) },
      ]}
    >
      <EmptyState
        title={t("noPoint.title")}
        detail={t("noPoint.detail")}
        action={
          loop.can.addPoint ? (
            <Button label={t("noPoint.add")} href={loopsPaths.newPoint(site.id, loop.id)} />
          ) : undefined
        }
      />
    </Screen>
  );
}
