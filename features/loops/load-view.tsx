import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useRouter } from "expo-router";
import type { ReactNode } from "react";
import { View } from "react-native";

import type { PointShape } from "@shared/contracts/shape";
import { FailedAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import { EmptyState, LoadingBlocks, Text, useBreakpoint } from "@features/ui";

import { LoadBase } from "./load-base";
import { LoadCurveCard } from "./load-curve-card";
import { LoadDeltaT } from "./load-delta-t";
import { LoadExcess } from "./load-excess";
import { LoadPeaks } from "./load-peaks";
import type { OpenWorkings } from "@features/workings/use-workings";
import type { LoopView } from "./loop-context";
import { loopsQueries, type PeakWindow } from "./loops-queries";

/** What every part of the load view is about. */
export interface LoadFigures extends LoadContext {
  readonly shape: PointShape;
}

interface LoadContext extends LoopView {
  readonly workings: OpenWorkings;
}

export type LoadParams = Partial<Record<"window" | "base" | "curve", string>>;

const blocks = [
  { width: "100%", height: 230 },
  { width: "100%", height: 380 },
  { width: "100%", height: 220 },
] as const;

/**
 * The shape behind the energy: peak, duration, ΔT, base load and the flow nobody needed. `blocked`
 * stands in its place where readings give no energy.
 */
export function LoadView(props: LoadContext & { params: LoadParams; blocked: ReactNode }) {
  const { point, range, params, blocked } = props;
  const t = useWords("load");
  const windowMinutes = windowOf(params.window);
  const hours = params.base === "unoccupied" ? "unoccupied" : "all";
  const answer = useQuery({
    ...loopsQueries.shape(point.id, range, { windowMinutes, hours }),
    placeholderData: keepPreviousData,
  });
  if (blocked !== null) return <>{blocked}</>;
  if (answer.data === undefined)
    return answer.error ? (
      <FailedAnswer error={answer.error} onRetry={() => void answer.refetch()} />
    ) : (
      <LoadingBlocks blocks={blocks} />
    );
  if (answer.data.coveredS === 0)
    return <EmptyState title={t("none.title")} detail={t("none.detail")} />;
  return <Shown {...props} shape={answer.data} stale={answer.isPlaceholderData} />;
}

function Shown(props: LoadFigures & { params: LoadParams; stale: boolean }) {
  const { shape, params, stale, format, loop } = props;
  const t = useWords("load");
  const router = useRouter();
  const phone = useBreakpoint() === "phone";
  const deltaT = <LoadDeltaT {...props} />;
  const base = (
    <LoadBase
      {...props}
      onHours={(hours) => router.setParams({ base: hours === "all" ? undefined : hours })}
    />
  );
  return (
    <View aria-busy={stale} style={{ gap: phone ? 12 : 20, opacity: stale ? 0.6 : 1 }}>
      <LoadPeaks
        {...props}
        window={windowOf(params.window)}
        onWindow={(minutes) => router.setParams({ window: minutes === "60" ? undefined : minutes })}
      />
      <LoadCurveCard
        {...props}
        shows={params.curve === "table" ? "table" : "chart"}
        onShow={(shows) => router.setParams({ curve: shows === "table" ? "table" : undefined })}
      />
      {phone ? (
        <>
          {deltaT}
          {base}
        </>
      ) : (
        <View style={{ flexDirection: "row", gap: 20, alignItems: "stretch" }}>
          <View style={{ flex: 1, minWidth: 0 }}>{deltaT}</View>
          <View style={{ flex: 1, minWidth: 0 }}>{base}</View>
        </View>
      )}
      <LoadExcess {...props} />
      <Text variant="small" tone="ink3">
        {loop.service === "changeover" ? `${t(`register.${shape.register}`)} ` : ""}
        {t("steps", { step: format.duration(shape.stepMinutes * 60) })}
      </Text>
    </View>
  );
}

function windowOf(asked: string | undefined): PeakWindow {
  return asked === "15" || asked === "30" ? asked : "60";
}
