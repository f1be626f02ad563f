import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { Instrument, InstrumentKind } from "@shared/contracts/evidence";
import { Answer } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, CheckField, EmptyState, Screen, Tabs } from "@features/ui";
import { kitPaths } from "./kit-paths";
import { kitQueries } from "./kit-queries";
import { KitTable } from "./kit-table";

type Group = "all" | "flow" | "temperature" | "other";

function groupOf(kind: InstrumentKind): Exclude<Group, "all"> {
  if (kind === "flowMeter" || kind === "permanentMeter") return "flow";
  return kind === "probe" || kind === "referenceThermometer" ? "temperature" : "other";
}

/** Everything that measures, and until when its calibration holds. */
export function KitScreen() {
  const t = useWords("kit");
  const { show, archived } = useLocalSearchParams<{ show?: string; archived?: string }>();
  const withArchived = archived === "yes";
  const answer = useQuery(kitQueries.instruments(withArchived));
  const add = <Button icon="plus" label={t("instrument.add")} href={kitPaths.newInstrument} />;
  const mayCreate = answer.data?.can.create ?? false;
  return (
    <Screen
      title={t("title")}
      actions={
        <>
          <Button kind="second" label={t("bathChecks.title")} href={kitPaths.bathChecks} />
          {mayCreate ? add : null}
        </>
      }
    >
      <Answer of={answer} denied={t("denied")}>
        {({ items, today }) => (
          <View style={{ gap: 16 }}>
            {items.length === 0 ? (
              <EmptyState
                title={t("none")}
                detail={t("noneDetail")}
                action={mayCreate ? add : undefined}
              />
            ) : (
              <Groups items={items} today={today} show={show} />
            )}
            <CheckField
              label={t("showArchived")}
              checked={withArchived}
              onChange={(on) => router.setParams({ archived: on ? "yes" : undefined })}
            />
          </View>
        )}
      </Answer>
    </Screen>
  );
}

function Groups(props: { items: readonly Instrument[]; today: string; show: string | undefined }) {
  const t = useWords("kit");
  const { items, today } = props;
  const groups: readonly Group[] = ["all", "flow", "temperature", "other"];
  const current = groups.find((group) => group === props.show) ?? "all";
  const of = (group: Group) =>
    items.filter(({ kind }) => group === "all" || groupOf(kind) === group);
  return (
    <View style={{ gap: 16 }}>
      <Tabs
        label={t("groups")}
        tabs={groups.map((key) => ({
          key,
          label: t(`group.${key}`, { count: of(key).length }),
        }))}
        current={current}
        onChange={(group) => router.setParams({ show: group === "all" ? undefined : group })}
        panelId="kit"
      />
      <View role="tabpanel" id={`kit-${current}`} aria-label={t(`groupName.${current}`)}>
        <KitTable instruments={of(current)} today={today} />
      </View>
    </View>
  );
}
