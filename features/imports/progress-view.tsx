import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { Button, ProgressLoop, Row, StageList, Text, type StageState } from "@features/ui";
import type { ImportDetail } from "@shared/contracts/imports";
import type { ImportActions } from "./imports-queries";

const STAGES = {
  reading: ["recognising"],
  checking: ["reading", "checking"],
  importing: ["reading", "checking", "storing", "energy"],
} as const;

/** A long job: a loop that fills, then its stages. It can be left. */
export function ProgressView({
  detail,
  actions,
}: {
  detail: ImportDetail;
  actions: ImportActions;
}) {
  const t = useWords("imports");
  const format = useFormat();
  const { progress } = detail;
  const kind =
    detail.state === "reading" || detail.state === "checking" ? detail.state : "importing";
  const stages: readonly string[] = STAGES[kind];
  const stage = progress?.stage ?? "waiting";
  const reached = stages.indexOf(stage);
  const stateOf = (index: number): StageState =>
    stage === "done" || index < reached ? "done" : index === reached ? "current" : "waiting";
  const total = progress?.rowsTotal ?? null;
  const read = progress?.rowsRead ?? 0;
  return (
    <View style={{ maxWidth: 560, width: "100%", alignSelf: "center", gap: 20 }}>
      <ProgressLoop
        label={t(`progress.title.${stage}`)}
        part={total ? Math.min(1, read / total) : null}
        value={format.number(read, 0)}
        of={total ? t("progress.of", { total: format.number(total, 0) }) : t("progress.rows")}
        note={
          progress?.secondsLeft == null
            ? undefined
            : t("progress.left", { time: format.duration(Math.max(1, progress.secondsLeft)) })
        }
      />
      <View>
        <Text variant="heading" level={2}>
          {t(`progress.title.${stage}`)}
        </Text>
        <Text tone="ink2">{t("progress.leave")}</Text>
      </View>
      <StageList
        stages={stages.map((key, index) => ({
          key,
          label: t(`progress.stage.${key}`),
          state: stateOf(index),
        }))}
      />
      <Row gap={3} wrap>
        {detail.can.cancel ? (
          <Button
            kind="second"
            label={t("progress.stop")}
            busy={actions.cancel.isPending}
            onPress={() => actions.cancel.mutate()}
          />
        ) : null}
        <Button label={t("progress.today")} href="/" />
      </Row>
    </View>
  );
}
