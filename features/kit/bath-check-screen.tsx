import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { BathCheck } from "@shared/contracts/evidence";
import { Answer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Banner, Button, Card, Screen, Table, Text } from "@features/ui";
import { BathCheckFigures } from "./bath-check-form-screen";
import { BathCheckVerdicts } from "./bath-check-verdicts";
import { kitPaths } from "./kit-paths";
import { kitQueries } from "./kit-queries";

/** One same-bath check with its readings. */
export function BathCheckScreen() {
  const t = useWords("kit");
  const format = useFormat();
  const { bathCheckId } = useLocalSearchParams<{ bathCheckId: string }>();
  const answer = useQuery(kitQueries.bathCheck(bathCheckId));
  const check = answer.data;
  return (
    <Screen
      title={
        check
          ? t("bathChecks.ofDay", { day: format.day(check.checkedOn, "dayMonthYear") })
          : t("bathChecks.one")
      }
      subtitle={check ? `${check.firstSerial} − ${check.secondSerial}` : undefined}
      crumbs={[
        { label: t("title"), href: kitPaths.kit },
        { label: t("bathChecks.title"), href: kitPaths.bathChecks },
      ]}
      actions={
        check?.can.edit ? (
          <Button
            kind="second"
            icon="edit"
            label={t("bathChecks.correct")}
            href={kitPaths.correctBathCheck(check.id)}
          />
        ) : null
      }
      narrow
    >
      <Answer of={answer} denied={t("denied")}>
        {(found) => <CheckBody check={found} />}
      </Answer>
    </Screen>
  );
}

function CheckBody({ check }: { check: BathCheck }) {
  const t = useWords("kit");
  const format = useFormat();
  const celsius = (value: number) => format.withUnit(value, "temperature");
  const rows = check.readings.map((reading, at) => ({ ...reading, at: at + 1 }));
  const difference = ({ firstC, secondC }: (typeof rows)[number]) =>
    format.withUnit(firstC - secondC, "temperatureDifference", 3);
  return (
    <View style={{ gap: 20 }}>
      {check.supersededAt === null ? null : (
        <Banner kind="note" lead={t("bathChecks.replaced")}>
          {t("bathChecks.replacedDetail", {
            when: format.dateTime(Date.parse(check.supersededAt)),
          })}
        </Banner>
      )}
      <Card>
        <BathCheckFigures {...check} serials={[check.firstSerial, check.secondSerial]} />
      </Card>
      <BathCheckVerdicts verdicts={check.verdicts} />
      {check.notes ? <Text>{check.notes}</Text> : null}
      <Text variant="small" tone="ink3">
        {t("bathChecks.recordedBy", {
          name: check.recordedBy,
          when: format.dateTime(Date.parse(check.recordedAt)),
        })}
      </Text>
      <Table
        caption={t("bathChecks.readings")}
        columns={[
          { key: "at", header: t("bathChecks.number"), render: ({ at }) => String(at) },
          { key: "first", header: check.firstSerial, asRead: ({ firstC }) => celsius(firstC) },
          { key: "second", header: check.secondSerial, asRead: ({ secondC }) => celsius(secondC) },
          { key: "difference", header: t("bathChecks.meanShort"), render: difference },
        ]}
        rows={rows}
        rowKey={({ at }) => String(at)}
        card={{
          title: ({ at }) => String(at),
          figure: difference,
          lines: ({ firstC, secondC }) => [`${celsius(firstC)}, ${celsius(secondC)}`],
        }}
      />
    </View>
  );
}
