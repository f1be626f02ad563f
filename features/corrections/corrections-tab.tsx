import { useQuery } from "@tanstack/react-query";
import { useRouter } from "expo-router";
import { useState } from "react";
import type { Correction } from "@shared/contracts/corrections";
import { Answer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Button, EmptyState, Stack } from "@features/ui";
import type { AskedParams } from "./change-draft";
import { CorrectionCard } from "./correction-card";
import type { PlaceProps } from "./corrections-screen";
import { correctionsQueries } from "./corrections-queries";
import { ProposeSheet } from "./propose-sheet";
import { WithdrawSheet } from "./withdraw-sheet";

/** Every correction of a point's readings, newest first. */
export function CorrectionsTab(props: PlaceProps & { asked: AskedParams }) {
  const { site, point, asked, today } = props;
  const t = useWords("corrections");
  const router = useRouter();
  const format = useFormat(site.zone, site.unitSystem);
  const list = useQuery(correctionsQueries.list(point.id));
  const extent = useQuery(correctionsQueries.extent(point.id, today));
  const [leaving, setLeaving] = useState<Correction | null>(null);
  const close = () =>
    router.setParams({
      propose: undefined,
      from: undefined,
      to: undefined,
      entered: undefined,
      true: undefined,
      probe: undefined,
      offset: undefined,
    });
  const propose = (
    <Button
      icon="plus"
      label={t("propose.open")}
      onPress={() => router.setParams({ propose: "choose" })}
    />
  );
  return (
    <Answer of={list} denied={t("denied")}>
      {({ items, can }) => (
        <Stack gap={4}>
          {items.length === 0 ? (
            <EmptyState
              title={t("list.none")}
              detail={t("list.noneDetail")}
              action={can.create ? propose : undefined}
            />
          ) : (
            <>
              {can.create ? <Stack align="flex-start">{propose}</Stack> : null}
              {items.map((correction) => (
                <CorrectionCard
                  key={correction.id}
                  correction={correction}
                  format={format}
                  onWithdraw={() => setLeaving(correction)}
                />
              ))}
            </>
          )}
          {asked.propose !== undefined && can.create && !extent.isLoading ? (
            <ProposeSheet
              site={site}
              point={point}
              asked={asked}
              firstAt={extent.data?.firstReadingAt ?? null}
              onClose={close}
            />
          ) : null}
          {leaving ? <WithdrawSheet correction={leaving} onClose={() => setLeaving(null)} /> : null}
        </Stack>
      )}
    </Answer>
  );
}
