import { useQueryClient } from "@tanstack/react-query";
import { View } from "react-native";
import { applyCorrection, type Correction } from "@shared/contracts/corrections";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  Chip,
  DefinitionRows,
  Row,
  Stack,
  Text,
  useToast,
} from "@features/ui";
import type { Format } from "@shared/formats/format";
import { useChangeWords } from "./use-change-words";

interface CorrectionCardProps {
  correction: Correction;
  format: Format;
  onWithdraw: () => void;
}

const chipTones = {
  working: "plain",
  proposed: "look",
  applied: "picked",
  withdrawn: "line",
  failed: "wrong",
} as const;

/** One correction: what it does, why, who, what it changes, and what may be done about it. */
export function CorrectionCard({ correction, format, onWithdraw }: CorrectionCardProps) {
  const t = useWords("corrections");
  const toast = useToast();
  const client = useQueryClient();
  const { says, when, at } = useChangeWords(format);
  const { change, state, points, effect, failure, can } = correction;
  const applying = useChange({
    send: () => call(applyCorrection, { params: { correctionId: correction.id } }),
    onDone: async () => {
      await client.invalidateQueries();
      toast({ message: t("apply.done") });
    },
  });
  const title = t(`kind.${change.kind}.label`);
  return (
    <Card pad={5}>
      <View role="article" aria-label={title}>
        <Stack gap={3}>
          <Row gap={3} justify="space-between" align="flex-start" wrap>
            <Text variant="subhead" level={3}>
              {title}
            </Text>
            <Chip label={t(`state.${state}`)} tone={chipTones[state]} />
          </Row>
          <Text>{says(change)}</Text>
          <Text tone="ink2">{when(change)}</Text>
          {points.length > 1 ? (
            <Text tone="ink2">
              {t("list.touches", {
                points: points.map(({ code, loopTag }) => `${loopTag} ${code}`).join(", "),
              })}
            </Text>
          ) : null}
          <DefinitionRows label={title} rows={history(correction, at, t)} />
          {state === "working" ? (
            <Text tone="ink2" role="status">
              {t("effect.working")}
            </Text>
          ) : null}
          {effect && state !== "working" ? (
            <Effect correction={correction} format={format} />
          ) : null}
          {failure ? (
            <Banner kind="wrong" lead={failure.message}>
              {failure.remedy}
            </Banner>
          ) : null}
          {applying.formErrors.length > 0 ? (
            <Banner kind="wrong" live>
              {applying.formErrors.join(" ")}
            </Banner>
          ) : null}
          {can.apply || can.withdraw ? (
            <Row gap={3} wrap>
              {can.apply ? (
                <Button
                  label={t("apply.send")}
                  said={t("apply.said", { title })}
                  busy={applying.busy}
                  onPress={() => applying.send(undefined)}
                />
              ) : null}
              {can.withdraw ? (
                <Button
                  kind="second"
                  label={t("withdraw.send")}
                  said={t("withdraw.said", { title })}
                  onPress={onWithdraw}
                />
              ) : null}
            </Row>
          ) : null}
        </Stack>
      </View>
    </Card>
  );
}

function history(
  correction: Correction,
  at: (instant: string) => string,
  t: ReturnType<typeof useWords>,
) {
  const by = (name: string | null, instant: string | null) =>
    name !== null && instant !== null ? t("list.by", { name, at: at(instant) }) : null;
  const rows = [
    { label: t("list.reason"), value: correction.reason },
    { label: t("list.proposed"), value: by(correction.createdBy, correction.createdAt) },
    { label: t("list.applied"), value: by(correction.appliedBy, correction.appliedAt) },
    { label: t("list.withdrawn"), value: by(correction.withdrawnBy, correction.withdrawnAt) },
    { label: t("list.withdrawnReason"), value: correction.withdrawnReason },
  ];
  return rows.flatMap(({ label, value }) => (value === null ? [] : [{ label, value }]));
}

/** What the energy and the volume were and become; that no energy moves is said in words. */
function Effect({ correction, format }: Pick<CorrectionCardProps, "correction" | "format">) {
  const { effect, volumePercent } = correction;
  const t = useWords("corrections");
  if (effect === null) return null;
  const { before, after, volume, rowsChanged } = effect;
  const registers = (["heating", "cooling"] as const).filter((name) => {
    const key = `${name}Kwh` as const;
    return before[key] !== 0 || after[key] !== 0;
  });
  const moves = registers.some((name) => before[`${name}Kwh`] !== after[`${name}Kwh`]);
  const row = (label: string, was: number, becomes: number, write: (value: number) => string) => ({
    label,
    value: t("effect.change", {
      // “±0” would read as an uncertainty.
      change:
        was === becomes
          ? t("results.unchanged")
          : `${becomes > was ? "+" : "−"}${write(Math.abs(becomes - was))}`,
      before: write(was),
      after: write(becomes),
    }),
  });
  const energies = registers.map((name) =>
    row(t(`register.${name}`), before[`${name}Kwh`], after[`${name}Kwh`], (kwh) =>
      format.withUnit(kwh, `${name}Energy`),
    ),
  );
  const volumes =
    volume === null || volume.beforeM3 === volume.afterM3
      ? []
      : [
          row(t("effect.volume"), volume.beforeM3, volume.afterM3, (m3) =>
            format.withUnit(m3, "volume"),
          ),
          {
            label: t("effect.volumeKnown"),
            value:
              volumePercent === null
                ? t("effect.volumeUnknown")
                : format.figure(volume.afterM3, (volume.afterM3 * volumePercent) / 100, "volume"),
          },
        ];
  const count = { count: rowsChanged, rows: format.number(rowsChanged, 0) };
  return (
    <Stack gap={1}>
      <DefinitionRows
        title={t("effect.title")}
        rows={moves ? [...energies, ...volumes] : volumes}
      />
      <Text tone="ink2">{t(moves ? "effect.rows" : "effect.noEnergy", count)}</Text>
    </Stack>
  );
}
