import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { Building, Loop, Site } from "@shared/contracts/places";
import { fluidFacts } from "@shared/domain/fluids/fluid-facts";
import { Answer } from "@features/api";
import { useFluidWords, useFormat, useWords } from "@features/i18n";
import {
  Button,
  Card,
  Chip,
  EmptyState,
  LoopTag,
  Screen,
  Table,
  TextLink,
  useBreakpoint,
  type Column,
  type RowCard,
} from "@features/ui";
import { ArchivedSwitch } from "./archived-switch";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";
import { tagService } from "./service-words";
import { Way } from "./way";

/** The loops of a site as a register: what each is, and the way to its points and to editing it. */
export function LoopsScreen() {
  const t = useWords("places");
  const { siteId, archived } = useLocalSearchParams<{ siteId: string; archived?: string }>();
  const showArchived = archived === "yes";
  const site = useQuery(placesQueries.site(siteId));
  const buildings = useQuery(placesQueries.buildings(siteId, true));
  const loops = useQuery(placesQueries.loops(siteId, showArchived));
  const add = <Button icon="plus" label={t("loop.add")} href={placesPaths.newLoop(siteId)} />;
  const mayAdd = site.data?.can.addLoop ?? false;
  const crumbs = [
    { label: t("sites.title"), href: placesPaths.sites },
    ...(site.data ? [{ label: site.data.name, href: placesPaths.site(siteId) }] : []),
  ];
  return (
    <Screen title={t("loops.title")} crumbs={crumbs} actions={mayAdd ? add : undefined}>
      <Answer of={site.data ? loops : { ...site, data: undefined }}>
        {({ items }) => (
          <View style={{ gap: 16 }}>
            {items.length === 0 || !site.data ? (
              <EmptyState
                title={t("site.noLoops")}
                detail={t("site.noLoopsDetail")}
                action={mayAdd ? add : undefined}
              />
            ) : (
              <LoopsTable site={site.data} loops={items} buildings={buildings.data?.items ?? []} />
            )}
            <ArchivedSwitch shown={showArchived} />
          </View>
        )}
      </Answer>
    </Screen>
  );
}

function LoopsTable(props: { site: Site; loops: readonly Loop[]; buildings: readonly Building[] }) {
  const { site, loops, buildings } = props;
  const t = useWords("places");
  const phone = useBreakpoint() === "phone";
  const format = useFormat(site.zone, site.unitSystem);
  const fluidWords = useFluidWords();
  const buildingOf = ({ buildingId }: Loop) =>
    buildings.find(({ id }) => id === buildingId)?.name ?? "";
  const parentOf = ({ parentLoopId }: Loop) =>
    loops.find(({ id }) => id === parentLoopId)?.tag ?? "";
  const pressureOf = ({ pressure }: Loop) => {
    const shown = format.withUnit(pressure.absoluteMPa, "pressure", 2);
    return pressure.assumed ? t("loops.assumed", { value: shown }) : shown;
  };
  const fluidOf = (loop: Loop) => {
    const facts =
      loop.fluid.kind === "water" ? null : fluidFacts(loop.fluid, loop.gaugePressureMPa);
    const freezes =
      facts &&
      t("loops.freezes", { temperature: format.withUnit(facts.freezesAtC, "temperature", 1) });
    return [fluidWords(loop.fluid), freezes].filter(Boolean).join(", ");
  };
  const tag = (loop: Loop) => (
    <LoopTag tag={loop.tag} service={tagService(loop.service)} outline={loop.archivedAt !== null} />
  );
  const ways = (loop: Loop) => (
    <View style={{ flexDirection: "row", gap: phone ? 8 : 16, flexWrap: "wrap" }}>
      <Way
        phone={phone}
        label={t("points.title")}
        said={t("points.of", { tag: loop.tag })}
        href={placesPaths.points(site.id, loop.id)}
      />
      {loop.can.edit ? (
        <Way
          phone={phone}
          label={t("form.edit")}
          said={t("loop.editNamed", { tag: loop.tag })}
          href={placesPaths.editLoop(site.id, loop.id)}
        />
      ) : null}
    </View>
  );
  const state = (loop: Loop) =>
    loop.archivedAt === null ? null : <Chip label={t("archive.archived")} />;
  const columns: Column<Loop>[] = [
    { key: "tag", header: t("loop.tag"), render: tag, width: 130 },
    {
      key: "name",
      header: t("loop.name"),
      render: (loop) => (
        <TextLink variant="table" label={loop.name} href={placesPaths.loop(loop.id)} />
      ),
    },
    { key: "building", header: t("loop.building"), render: buildingOf },
    { key: "parent", header: t("loop.parent"), render: parentOf, wideOnly: true },
    { key: "fluid", header: t("loop.fluidTitle"), render: fluidOf },
    {
      key: "pressure",
      header: t("loop.absolutePressure"),
      render: pressureOf,
      align: "right",
      wideOnly: true,
    },
    {
      key: "design",
      header: t("loop.designFlow"),
      render: (loop) => format.withUnit(loop.designFlowM3PerHour, "flow", 1),
      align: "right",
      wideOnly: true,
    },
    ...(loops.some(({ archivedAt }) => archivedAt !== null)
      ? [{ key: "state", header: t("sites.marks"), render: state }]
      : []),
    { key: "ways", header: t("loops.ways"), render: ways, width: 160 },
  ];
  const card: RowCard<Loop> = {
    title: tag,
    lines: (loop) => [
      <TextLink key="name" label={loop.name} href={placesPaths.loop(loop.id)} />,
      [buildingOf(loop), fluidOf(loop)].filter(Boolean).join(", "),
      parentOf(loop) ? t("loops.fedBy", { tag: parentOf(loop) }) : null,
      loop.archivedAt === null ? null : <Chip key="archived" label={t("archive.archived")} />,
      <View key="ways" style={{ marginTop: 6 }}>
        {ways(loop)}
      </View>,
    ],
  };
  const table = (
    <Table
      caption={t("loops.title")}
      captionHidden
      columns={columns}
      rows={loops}
      rowKey={(loop) => loop.id}
      card={card}
    />
  );
  return phone ? table : <Card pad={0}>{table}</Card>;
}
