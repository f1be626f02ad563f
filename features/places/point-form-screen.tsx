import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { useRef, useState } from "react";
import { View } from "react-native";
import {
  createPoint,
  removePoint,
  updatePoint,
  type Loop,
  type Point,
  type Site,
} from "@shared/contracts/places";
import { Answer, call } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Banner,
  Button,
  DeniedState,
  DraftNotice,
  LoopTag,
  Screen,
  useDraft,
  useToast,
} from "@features/ui";
import { BoreHistory } from "./bore-history";
import { NONE } from "./loop-values";
import { PlaceActions } from "./place-actions";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";
import { PointForm, pointServerFields, type PointField, type PointProblems } from "./point-form";
import { pipeOf, pointValues, resolvedPipe, type MeterSide, type PointRole } from "./point-values";
import { tagService } from "./service-words";
import { useSave } from "./use-save";

export function NewPointScreen() {
  const { siteId, loopId } = useLocalSearchParams<{ siteId: string; loopId: string }>();
  return <PointFormLoader siteId={siteId} loopId={loopId} pointId={null} />;
}

export function EditPointScreen() {
  const { siteId, loopId, pointId } = useLocalSearchParams<{
    siteId: string;
    loopId: string;
    pointId: string;
  }>();
  return <PointFormLoader siteId={siteId} loopId={loopId} pointId={pointId} />;
}

function PointFormLoader(props: { siteId: string; loopId: string; pointId: string | null }) {
  const t = useWords("places");
  const { siteId, loopId, pointId } = props;
  const site = useQuery(placesQueries.site(siteId));
  const loop = useQuery(placesQueries.loop(loopId));
  const points = useQuery(placesQueries.points(loopId, true));
  const point = points.data?.items.find(({ id }) => id === pointId) ?? null;
  const allowed = pointId === null ? loop.data?.can.addPoint : point?.can.edit;
  if (site.data && loop.data && points.data && allowed)
    return (
      <PointEditor site={site.data} loop={loop.data} point={point} points={points.data.items} />
    );
  const waiting = [site, loop, points].find(({ data }) => data === undefined) ?? site;
  return (
    <Screen
      title={t(pointId === null ? "point.add" : "point.edit")}
      crumbs={[{ label: t("sites.title"), href: placesPaths.sites }]}
    >
      <Answer of={{ ...waiting, data: waiting.data as unknown }}>{() => <DeniedState />}</Answer>
    </Screen>
  );
}

interface Chosen {
  readonly role: PointRole;
  readonly meterSide: MeterSide;
}

function PointEditor(props: {
  site: Site;
  loop: Loop;
  point: Point | null;
  points: readonly Point[];
}) {
  const { site, loop, point, points } = props;
  const t = useWords("places");
  const router = useRouter();
  const toast = useToast();
  const format = useFormat(site.zone, site.unitSystem);
  const key = `point.${point?.id ?? `new-${loop.id}`}.${format.unitSystem}`;
  const draft = useDraft(key, pointValues(point, format));
  const unreadable = useRef(new Set<PointField>());
  const [problems, setProblems] = useState<PointProblems>({});
  const { values } = draft;
  const pipe = pipeOf(values, point, format);
  const saving = useSave((chosen: Chosen) => {
    const body = {
      ...chosen,
      code: values.code.trim(),
      name: values.name.trim(),
      gapRule: values.gapRule,
      parentPointId: values.parentPointId === NONE ? null : values.parentPointId,
      pipe,
      notes: values.notes.trim() || null,
    };
    return point === null
      ? call(createPoint, { params: { loopId: loop.id }, body })
      : call(updatePoint, { params: { pointId: point.id }, body });
  }, pointServerFields);
  const back = placesPaths.points(site.id, loop.id);
  const title = point === null ? t("point.add") : t("point.editNamed", { code: point.code });

  const findProblems = (): PointProblems => {
    const found: PointProblems = {
      ...(values.code.trim() === "" ? { code: t("point.codeNeeded") } : {}),
      ...(values.name.trim() === "" ? { name: t("point.nameNeeded") } : {}),
      ...(values.role === null ? { role: t("point.roleNeeded") } : {}),
      ...(values.meterSide === null ? { meterSide: t("point.meterSideNeeded") } : {}),
      ...(values.pipeKind === "table" && values.tableId === null
        ? { tableId: t("pipe.tableNeeded") }
        : {}),
      ...(values.pipeKind === "table" && values.tableId !== null && values.dn === null
        ? { dn: t("pipe.dnNeeded") }
        : {}),
    };
    if (values.pipeKind === "measured") {
      if (values.outsideDiameter === null) found.outsideDiameter = t("pipe.outsideNeeded");
      if (values.wall === null) found.wall = t("pipe.wallNeeded");
      for (const field of unreadable.current) found[field] = t("form.unreadable");
      const resolved = resolvedPipe(pipe);
      if (resolved !== null && !resolved.ok) found.wall = t("pipe.noBore");
    }
    return found;
  };
  const submit = () => {
    const found = findProblems();
    setProblems(found);
    const { role, meterSide } = values;
    if (Object.keys(found).length > 0 || role === null || meterSide === null) return;
    saving.save({ role, meterSide }, (saved) => {
      draft.clear();
      toast({ message: t(point === null ? "point.added" : "save.saved", { name: saved.code }) });
      router.replace(back);
    });
  };
  return (
    <Screen
      title={title}
      crumbs={[
        { label: t("sites.title"), href: placesPaths.sites },
        { label: site.name, href: placesPaths.site(site.id) },
        { label: t("points.of", { tag: loop.tag }), href: back },
      ]}
      tag={<LoopTag tag={loop.tag} service={tagService(loop.service)} size="l" />}
      narrow
      footer={
        <>
          <Button kind="second" label={t("form.cancel")} href={back} />
          <Button
            label={point === null ? t("point.add") : t("form.save")}
            busy={saving.busy}
            onPress={submit}
          />
        </>
      }
    >
      <View style={{ gap: 24 }}>
        <DraftNotice draft={draft} />
        <PointForm
          label={title}
          values={values}
          onChange={(changes) => {
            setProblems({});
            saving.reset();
            draft.set(changes);
          }}
          onReadable={(field, readable) => {
            if (readable) unreadable.current.delete(field);
            else unreadable.current.add(field);
          }}
          onSubmit={submit}
          problems={problems}
          errors={saving.errors}
          format={format}
          loop={loop}
          point={point}
          points={points}
        />
        {point?.hasReadings &&
        (values.meterSide !== point.meterSide || values.gapRule !== point.gapRule) ? (
          <Banner kind="note" live lead={t("loop.recalculatesLead")}>
            {t("point.recalculates")}
          </Banner>
        ) : null}
        {point ? <BoreHistory point={point} format={format} /> : null}
        {point ? (
          <PlaceActions
            kind="point"
            name={point.code}
            archived={point.archivedAt !== null}
            can={point.can}
            onArchive={(archived) =>
              call(updatePoint, { params: { pointId: point.id }, body: { archived } })
            }
            onRemove={() => call(removePoint, { params: { pointId: point.id } })}
            onGone={() => router.replace(back)}
          />
        ) : null}
      </View>
    </Screen>
  );
}
