import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { Answer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Button,
  Card,
  Chip,
  EmptyState,
  LoopTag,
  Screen,
  Table,
  Text,
  useBreakpoint,
  type Column,
  type RowCard,
} from "@features/ui";
import { evidencePaths } from "@features/evidence/evidence-paths";
import { importPaths } from "@features/imports/import-paths";
import { ArchivedSwitch } from "./archived-switch";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";
import { tagService } from "./service-words";
import { Way } from "./way";

/** The metering points of a loop. */
export function PointsScreen() {
  const t = useWords("places");
  const { siteId, loopId, archived } = useLocalSearchParams<{
    siteId: string;
    loopId: string;
    archived?: string;
  }>();
  const showArchived = archived === "yes";
  const site = useQuery(placesQueries.site(siteId));
  const loop = useQuery(placesQueries.loop(loopId));
  const points = useQuery(placesQueries.points(loopId, showArchived));
  const add = (
    <Button icon="plus" label={t("point.add")} href={placesPaths.newPoint(siteId, loopId)} />
  );
  const mayAdd = loop.data?.can.addPoint ?? false;
  const crumbs = [
    { label: t("sites.title"), href: placesPaths.sites },
    ...(site.data ? [{ label: site.data.name, href: placesPaths.site(siteId) }] : []),
    ...(loop.data ? [{ label: loop.data.name, href: placesPaths.loop(loopId) }] : []),
  ];
  const waiting = site.data && loop.data ? points : loop.data ? site : loop;
  return (
    <Screen
      title={t("points.title")}
      crumbs={crumbs}
      tag={
        loop.data ? (
          <LoopTag tag={loop.data.tag} service={tagService(loop.data.service)} size="l" />
        ) : undefined
      }
      actions={mayAdd ? add : undefined}
    >
      <Answer of={{ ...waiting, data: points.data && site.data && loop.data }}>
        {() =>
          site.data && loop.data ? (
            <View style={{ gap: 16 }}>
              {(points.data?.items ?? []).length === 0 ? (
                <EmptyState
                  title={t("points.none")}
                  detail={t("points.noneDetail")}
                  action={mayAdd ? add : undefined}
                />
              ) : (
                <PointsTable site={site.data} loop={loop.data} points={points.data?.items ?? []} />
              )}
              <ArchivedSwitch shown={showArchived} />
            </View>
          ) : null
        }
      </Answer>
    </Screen>
  );
}

function PointsTable(props: { site: Site; loop: Loop; points: readonly Point[] }) {
  const { site, loop, points } = props;
  const t = useWords("places");
  const phone = useBreakpoint() === "phone";
  const format = useFormat(site.zone, site.unitSystem);
  const parentOf = ({ parentPointId }: Point) =>
    points.find(({ id }) => id === parentPointId)?.code ?? "";
  const bore = ({ bore: known }: Point) =>
    known ? format.withUnit(known.insideDiameterMm, "pipeSize", 2) : t("points.noPipe");
  const state = (point: Point) =>
    point.archivedAt !== null ? (
      <Chip label={t("archive.archived")} />
    ) : point.hasReadings ? null : (
      <Chip label={t("points.noReadings")} tone="line" />
    );
  const ways = (point: Point) => (
    <View style={{ flexDirection: "row", gap: phone ? 8 : 16, flexWrap: "wrap" }}>
      <Way
        phone={phone}
        label={t("points.evidence")}
        said={t("points.evidenceOf", { code: point.code })}
        href={evidencePaths.evidence(site.id, loop.id, point.id)}
      />
      {point.can.import ? (
        <Way
          phone={phone}
          label={t("points.import")}
          said={t("points.importInto", { code: point.code })}
          href={importPaths.start(point.id)}
        />
      ) : null}
      {point.can.edit ? (
        <Way
          phone={phone}
          label={t("form.edit")}
          said={t("point.editNamed", { code: point.code })}
          href={placesPaths.editPoint(site.id, loop.id, point.id)}
        />
      ) : null}
    </View>
  );
  const columns: Column<Point>[] = [
    { key: "code", header: t("point.code"), render: (point) => point.code },
    { key: "name", header: t("point.name"), render: (point) => point.name },
    { key: "role", header: t("point.role"), render: (point) => t(`role.${point.role}`) },
    { key: "parent", header: t("point.parent"), render: parentOf, wideOnly: true },
    {
      key: "side",
      header: t("point.meterSide"),
      render: (point) => t(`side.${point.meterSide}`),
    },
    {
      key: "pipe",
      header: t("pipe.title"),
      render: (point) => point.bore?.label ?? "",
      wideOnly: true,
    },
    { key: "bore", header: t("pipe.bore"), render: bore, align: "right" },
    ...(points.some((point) => state(point) !== null)
      ? [{ key: "state", header: t("sites.marks"), render: state, wideOnly: true }]
      : []),
    { key: "ways", header: t("loops.ways"), render: ways, width: 250 },
  ];
  const card: RowCard<Point> = {
    title: (point) => `${point.code}, ${point.name}`,
    lines: (point) => [
      `${t(`role.${point.role}`)}, ${t(`side.in.${point.meterSide}`)}`,
      point.bore
        ? `${point.bore.label}, ${t("points.boreOf", { bore: bore(point) })}`
        : bore(point),
      parentOf(point) ? t("loops.fedBy", { tag: parentOf(point) }) : null,
      state(point),
      <View key="ways" style={{ marginTop: 6 }}>
        {ways(point)}
      </View>,
    ],
  };
  const table = (
    <Table
      caption={t("points.of", { tag: loop.tag })}
      captionHidden
      columns={columns}
      rows={points}
      rowKey={(point) => point.id}
      card={card}
      empty={<Text tone="ink2">{t("points.none")}</Text>}
    />
  );
  return phone ? table : <Card pad={0}>{table}</Card>;
}
