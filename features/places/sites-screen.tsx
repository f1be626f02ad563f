import { useInfiniteQuery } from "@tanstack/react-query";
import { useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { Site } from "@shared/contracts/places";
import { Answer } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Button,
  Card,
  Chip,
  EmptyState,
  Screen,
  Table,
  Text,
  useBreakpoint,
  type Column,
  type RowCard,
} from "@features/ui";
import { ArchivedSwitch } from "./archived-switch";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";

/** The sites of the organisation. */
export function SitesScreen() {
  const t = useWords("places");
  const { archived } = useLocalSearchParams<{ archived?: string }>();
  const showArchived = archived === "yes";
  const answer = useInfiniteQuery(placesQueries.sites(showArchived));
  const mayCreate = answer.data?.pages[0]?.can.create ?? false;
  const add = <Button icon="plus" label={t("site.add")} href={placesPaths.newSite} />;
  return (
    <Screen title={t("sites.title")} actions={mayCreate ? add : undefined}>
      <Answer of={answer}>
        {(data) => {
          const sites = data.pages.flatMap((page) => page.items);
          if (sites.length === 0 && !showArchived)
            return (
              <View style={{ gap: 16 }}>
                <EmptyState
                  title={t("sites.none")}
                  detail={t(mayCreate ? "sites.noneDetail" : "sites.noneReadOnly")}
                  action={mayCreate ? add : undefined}
                />
                <ArchivedSwitch shown={false} />
              </View>
            );
          return (
            <View style={{ gap: 16 }}>
              <SitesTable sites={sites} />
              {answer.hasNextPage ? (
                <Button
                  kind="second"
                  label={t("sites.more")}
                  busy={answer.isFetchingNextPage}
                  onPress={() => void answer.fetchNextPage()}
                />
              ) : null}
              <ArchivedSwitch shown={showArchived} />
            </View>
          );
        }}
      </Answer>
    </Screen>
  );
}

function SitesTable({ sites }: { sites: readonly Site[] }) {
  const t = useWords("places");
  const phone = useBreakpoint() === "phone";
  const marks = (site: Site) =>
    site.isDemo || site.archivedAt !== null ? (
      <View style={{ flexDirection: "row", gap: 6 }}>
        {site.isDemo ? <Chip label={t("site.invented")} tone="line" /> : null}
        {site.archivedAt === null ? null : <Chip label={t("archive.archived")} />}
      </View>
    ) : null;
  const columns: Column<Site>[] = [
    { key: "name", header: t("site.name"), render: (site) => site.name },
    { key: "marks", header: t("sites.marks"), render: marks, width: 150 },
    {
      key: "address",
      header: t("site.address"),
      wideOnly: true,
      render: (site) => site.address ?? "",
    },
    { key: "zone", header: t("site.zone"), render: (site) => site.zone.replace(/_/g, " ") },
    {
      key: "buildings",
      header: t("buildings.title"),
      align: "right",
      render: (site) => String(site.buildingCount),
    },
    {
      key: "loops",
      header: t("loops.title"),
      align: "right",
      render: (site) => String(site.loopCount),
    },
  ];
  const card: RowCard<Site> = {
    title: (site) => site.name,
    lines: (site) => [
      site.address,
      t("sites.counts", {
        buildings: t("sites.buildings", { count: site.buildingCount }),
        loops: t("sites.loops", { count: site.loopCount }),
      }),
      marks(site),
    ],
  };
  const table = (
    <Table
      caption={t("sites.title")}
      captionHidden
      columns={columns}
      rows={sites}
      rowKey={(site) => site.id}
      card={card}
      href={(site) => placesPaths.site(site.id)}
      empty={<Text tone="ink2">{t("sites.none")}</Text>}
    />
  );
  return phone ? table : <Card pad={0}>{table}</Card>;
}
