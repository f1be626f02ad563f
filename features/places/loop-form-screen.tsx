import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { useRef, useState } from "react";
import { View } from "react-native";
import {
  createLoop,
  removeLoop,
  updateLoop,
  type Building,
  type Loop,
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
import { LoopForm, loopServerFields, type LoopField, type LoopProblems } from "./loop-form";
import { changesEnergy, loopBody, loopValues, NONE } from "./loop-values";
import { PlaceActions } from "./place-actions";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";
import { tagService } from "./service-words";
import { useSave } from "./use-save";

export function NewLoopScreen() {
  const { siteId, building } = useLocalSearchParams<{ siteId: string; building?: string }>();
  return <LoopFormLoader siteId={siteId} loopId={null} buildingId={building ?? NONE} />;
}

export function EditLoopScreen() {
  const { siteId, loopId } = useLocalSearchParams<{ siteId: string; loopId: string }>();
  return <LoopFormLoader siteId={siteId} loopId={loopId} buildingId={NONE} />;
}

/** Waits for the site, its buildings and its loops: the form offers them. */
function LoopFormLoader(props: { siteId: string; loopId: string | null; buildingId: string }) {
  const t = useWords("places");
  const { siteId, loopId, buildingId } = props;
  const site = useQuery(placesQueries.site(siteId));
  const buildings = useQuery(placesQueries.buildings(siteId));
  // Archived loops too: one of them may be the loop that is edited, to restore it.
  const loops = useQuery(placesQueries.loops(siteId, true));
  const loop = loops.data?.items.find(({ id }) => id === loopId) ?? null;
  const allowed = loopId === null ? site.data?.can.addLoop : loop?.can.edit;
  if (site.data && buildings.data && loops.data && allowed)
    return (
      <LoopEditor
        site={site.data}
        loop={loop}
        loops={loops.data.items}
        buildings={buildings.data.items}
        buildingId={buildingId}
      />
    );
  const title = t(loopId === null ? "loop.add" : "loop.edit");
  const waiting = [site, buildings, loops].find(({ data }) => data === undefined) ?? site;
  return (
    <Screen title={title} crumbs={[{ label: t("sites.title"), href: placesPaths.sites }]}>
      <Answer of={{ ...waiting, data: waiting.data as unknown }}>{() => <DeniedState />}</Answer>
    </Screen>
  );
}

function LoopEditor(props: {
  site: Site;
  loop: Loop | null;
  loops: readonly Loop[];
  buildings: readonly Building[];
  buildingId: string;
}) {
  const { site, loop, loops, buildings } = props;
  const t = useWords("places");
  const router = useRouter();
  const toast = useToast();
  const format = useFormat(site.zone, site.unitSystem);
  const initial = loopValues(loop, format, props.buildingId);
  // Numbers are kept as shown, so a draft belongs to the units it was typed in.
  const key = `loop.${loop?.id ?? `new-${site.id}`}.${format.unitSystem}`;
  const draft = useDraft(key, initial);
  const unreadable = useRef(new Set<LoopField>());
  const [problems, setProblems] = useState<LoopProblems>({});
  const { values } = draft;
  const body = loopBody(values, loop, format);
  const saving = useSave(
    (service: Loop["service"]) =>
      loop === null
        ? call(createLoop, { params: { siteId: site.id }, body: { ...body, service } })
        : call(updateLoop, { params: { loopId: loop.id }, body: { ...body, service } }),
    loopServerFields,
  );
  const title = loop === null ? t("loop.add") : t("loop.editNamed", { tag: loop.tag });
  const back = loop === null ? placesPaths.site(site.id) : placesPaths.loop(loop.id);

  const submit = () => {
    const found = findProblems();
    setProblems(found);
    const { service } = values;
    if (Object.keys(found).length > 0 || service === null) return;
    saving.save(service, (saved) => {
      draft.clear();
      toast({ message: t(loop === null ? "loop.added" : "save.saved", { name: saved.tag }) });
      router.replace(
        loop === null ? placesPaths.points(site.id, saved.id) : placesPaths.loop(saved.id),
      );
    });
  };
  const findProblems = (): LoopProblems => {
    const glycol = values.fluidKind !== "water";
    const found: LoopProblems = {
      ...(body.tag === "" ? { tag: t("loop.tagNeeded") } : {}),
      ...(body.name === "" ? { name: t("loop.nameNeeded") } : {}),
      ...(values.service === null ? { service: t("loop.serviceNeeded") } : {}),
      ...(glycol && values.glycolPercent === null
        ? { glycolPercent: t("fluid.percentNeeded") }
        : {}),
      ...(glycol && values.glycolBasis === null ? { glycolBasis: t("fluid.basisNeeded") } : {}),
      ...(below(values.flowCutOff, values.designFlow) ? {} : { flowCutOff: t("loop.cutOffAbove") }),
      ...(below(values.deltaTCutOff, values.designDeltaT)
        ? {}
        : { deltaTCutOff: t("loop.cutOffAbove") }),
    };
    for (const field of unreadable.current)
      if (!glycol && field === "glycolPercent") continue;
      else found[field] ??= t("form.unreadable");
    return found;
  };
  const energyChanges =
    loop?.hasReadings === true && values.service !== null
      ? changesEnergy(body, loop, values.service)
      : false;
  return (
    <Screen
      title={title}
      crumbs={[
        { label: t("sites.title"), href: placesPaths.sites },
        { label: site.name, href: placesPaths.site(site.id) },
      ]}
      tag={
        loop ? <LoopTag tag={loop.tag} service={tagService(loop.service)} size="l" /> : undefined
      }
      narrow
      footer={
        <>
          <Button kind="second" label={t("form.cancel")} href={back} />
          <Button
            label={loop === null ? t("loop.add") : t("form.save")}
            busy={saving.busy}
            onPress={submit}
          />
        </>
      }
    >
      <View style={{ gap: 24 }}>
        <DraftNotice draft={draft} />
        <LoopForm
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
          loops={loops}
          buildings={buildings}
        />
        {energyChanges ? (
          <Banner kind="note" live lead={t("loop.recalculatesLead")}>
            {t("loop.recalculates")}
          </Banner>
        ) : null}
        {loop ? (
          <PlaceActions
            kind="loop"
            name={loop.tag}
            archived={loop.archivedAt !== null}
            can={loop.can}
            onArchive={(archived) =>
              call(updateLoop, { params: { loopId: loop.id }, body: { archived } })
            }
            onRemove={() => call(removeLoop, { params: { loopId: loop.id } })}
            onGone={() => router.replace(placesPaths.site(site.id))}
          />
        ) : null}
      </View>
    </Screen>
  );
}

function below(value: number | null, limit: number | null): boolean {
  return value === null || limit === null || value < limit;
}
