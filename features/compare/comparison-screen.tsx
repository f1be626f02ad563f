import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import { downloadMeterComparison, type MeterComparison } from "@shared/contracts/meter-comparisons";
import { addressOf, Answer, saveFile } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Banner, Button, Screen, Text, TextLink } from "@features/ui";
import { comparePaths } from "./compare-paths";
import { compareQueries } from "./compare-queries";
import { ComparisonResult } from "./comparison-result";
import { WithdrawSheet } from "./withdraw-sheet";

/** A saved comparison, as it came out when it was saved. */
export function ComparisonScreen() {
  const t = useWords("compare");
  const { comparisonId } = useLocalSearchParams<{ comparisonId: string }>();
  const answer = useQuery(compareQueries.comparison(comparisonId));
  const crumbs = [{ label: t("title"), href: comparePaths.compare }];
  if (answer.data) return <Saved comparison={answer.data} crumbs={crumbs} />;
  return (
    <Screen title={t("meters.title")} crumbs={crumbs}>
      <Answer of={answer} denied={t("denied")}>
        {() => null}
      </Answer>
    </Screen>
  );
}

function Saved(props: {
  comparison: MeterComparison;
  crumbs: readonly { label: string; href: string }[];
}) {
  const t = useWords("compare");
  const { comparison } = props;
  const format = useFormat(comparison.zone);
  const [withdrawing, setWithdrawing] = useState(false);
  const at = (instant: string) => format.dateTime(Date.parse(instant));
  const csv = addressOf(downloadMeterComparison, {
    params: { meterComparisonId: comparison.id },
  });
  return (
    <Screen
      title={comparison.title}
      crumbs={props.crumbs}
      subtitle={`${comparison.siteName}, ${at(comparison.from)} – ${at(comparison.to)}`}
      actions={
        <>
          <Button
            kind="second"
            icon="download"
            label={t("saved.csv")}
            onPress={() => saveFile(csv)}
          />
          {comparison.can.edit ? (
            <>
              <Button
                kind="second"
                label={t("saved.correct")}
                href={comparePaths.correctMeters(comparison.id)}
              />
              <Button
                kind="quiet"
                label={t("saved.withdraw")}
                onPress={() => setWithdrawing(true)}
              />
            </>
          ) : null}
        </>
      }
    >
      <View style={{ gap: 24, maxWidth: 860, width: "100%" }}>
        <Standing comparison={comparison} at={at} />
        <ComparisonResult
          result={comparison.result}
          consentBy={comparison.input.standIn?.consentBy ?? null}
        />
        {comparison.notes === null ? null : (
          <View style={{ gap: 4 }}>
            <Text variant="heading">{t("saved.notes")}</Text>
            <Text>{comparison.notes}</Text>
          </View>
        )}
        <Text variant="small" tone="ink3">
          {t("saved.by", { at: at(comparison.recordedAt), name: comparison.recordedBy })}
        </Text>
      </View>
      {withdrawing ? (
        <WithdrawSheet comparison={comparison} onClose={() => setWithdrawing(false)} />
      ) : null}
    </Screen>
  );
}

/** Whether it still counts, and what stands before or after it. */
function Standing(props: { comparison: MeterComparison; at: (instant: string) => string }) {
  const t = useWords("compare");
  const { state, supersededById, supersedesId, withdrawnAt, ...rest } = props.comparison;
  return (
    <>
      {state === "superseded" ? (
        <Banner
          kind="look"
          lead={t("saved.supersededLead")}
          action={
            supersededById === null ? undefined : (
              <TextLink label={t("saved.openLater")} href={comparePaths.meters(supersededById)} />
            )
          }
        >
          {t("saved.superseded")}
        </Banner>
      ) : null}
      {withdrawnAt === null ? null : (
        <Banner kind="wrong" lead={t("saved.withdrawnLead")}>
          {t("saved.withdrawn", {
            at: props.at(withdrawnAt),
            name: rest.withdrawnBy ?? "",
            reason: rest.withdrawnReason ?? "",
          })}
        </Banner>
      )}
      {rest.readingsChanged && state === "stands" ? (
        <Banner kind="look" lead={t("saved.changedLead")}>
          {t("saved.changed")}
        </Banner>
      ) : null}
      {supersedesId === null ? null : (
        <Text tone="ink2">
          {t("saved.replaces")}{" "}
          <TextLink label={t("saved.openEarlier")} href={comparePaths.meters(supersedesId)} />
        </Text>
      )}
    </>
  );
}
