import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { BathCheck } from "@shared/contracts/evidence";
import { Answer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Button,
  Card,
  CheckField,
  Chip,
  EmptyState,
  MarkedText,
  Screen,
  Table,
  useBreakpoint,
  type Column,
} from "@features/ui";
import { kitPaths } from "./kit-paths";
import { kitQueries } from "./kit-queries";

/** Same-bath checks of probe pairs, newest first. */
export function BathChecksScreen() {
  const t = useWords("kit");
  const { replaced } = useLocalSearchParams<{ replaced?: string }>();
  const withReplaced = replaced === "yes";
  const answer = useQuery(kitQueries.bathChecks(withReplaced));
  const add = <Button icon="plus" label={t("bathChecks.add")} href={kitPaths.newBathCheck()} />;
  const mayCreate = answer.data?.can.create ?? false;
  return (
    <Screen
      title={t("bathChecks.title")}
      crumbs={[{ label: t("title"), href: kitPaths.kit }]}
      actions={mayCreate ? add : null}
    >
      <Answer of={answer} denied={t("denied")}>
        {({ items }) => (
          <View style={{ gap: 16 }}>
            {items.length === 0 ? (
              <EmptyState
                title={t("bathChecks.none")}
                detail={t("bathChecks.noneDetail")}
                action={mayCreate ? add : undefined}
              />
            ) : (
              <ChecksTable checks={items} />
            )}
            <CheckField
              label={t("bathChecks.showReplaced")}
              checked={withReplaced}
              onChange={(on) => router.setParams({ replaced: on ? "yes" : undefined })}
            />
          </View>
        )}
      </Answer>
    </Screen>
  );
}

function ChecksTable({ checks }: { checks: readonly BathCheck[] }) {
  const t = useWords("kit");
  const format = useFormat();
  const phone = useBreakpoint() === "phone";
  const kelvin = (value: number | null) =>
    value === null ? "—" : format.withUnit(value, "temperatureDifference", 3);
  const verdict = (check: BathCheck) => {
    if (check.supersededAt !== null) return <Chip tone="line" label={t("bathChecks.replaced")} />;
    const worst = check.verdicts.some(({ weight }) => weight !== "fine");
    return (
      <MarkedText kind={worst ? "look" : "fine"} variant="table">
        {t(worst ? "bathChecks.look" : "bathChecks.fine")}
      </MarkedText>
    );
  };
  const pairOf = ({ firstSerial, secondSerial }: BathCheck) => `${firstSerial} − ${secondSerial}`;
  const columns: Column<BathCheck>[] = [
    {
      key: "day",
      header: t("bathChecks.checkedOn"),
      render: ({ checkedOn }) => format.day(checkedOn, "dayMonthYear"),
    },
    { key: "pair", header: t("bathChecks.pair"), render: pairOf },
    {
      key: "count",
      header: t("bathChecks.pairs"),
      align: "right",
      render: ({ pairs }) => String(pairs),
    },
    {
      key: "mean",
      header: t("bathChecks.meanShort"),
      align: "right",
      render: ({ meanDifferenceK }) => kelvin(meanDifferenceK),
    },
    {
      key: "residual",
      header: t("bathChecks.residualShort"),
      align: "right",
      wideOnly: true,
      render: ({ residualK }) => kelvin(residualK),
    },
    {
      key: "drift",
      header: t("bathChecks.driftShort"),
      align: "right",
      render: ({ driftK }) => kelvin(driftK),
    },
    { key: "verdict", header: t("bathChecks.verdict"), render: verdict },
  ];
  const table = (
    <Table
      caption={t("bathChecks.title")}
      captionHidden
      columns={columns}
      rows={checks}
      rowKey={({ id }) => id}
      href={({ id }) => kitPaths.bathCheck(id)}
      card={{
        title: (check) => format.day(check.checkedOn, "dayMonthYear"),
        figure: ({ meanDifferenceK }) => kelvin(meanDifferenceK),
        lines: (check) => [
          pairOf(check),
          t("bathChecks.pairsAndResidual", {
            pairs: check.pairs,
            residual: kelvin(check.residualK),
          }),
          verdict(check),
        ],
      }}
    />
  );
  return phone ? table : <Card pad={0}>{table}</Card>;
}
