import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import { createSite, removeSite, updateSite, type Site } from "@shared/contracts/places";
import { Answer, call } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, DeniedState, DraftNotice, Screen, useDraft, useToast } from "@features/ui";
import { PlaceActions } from "./place-actions";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";
import { occupiedHoursOf, SiteForm, siteFields, siteValues, type SiteProblems } from "./site-form";
import { useSave } from "./use-save";

export function NewSiteScreen() {
  const t = useWords("places");
  return <SiteEditor site={null} title={t("site.add")} />;
}

export function EditSiteScreen() {
  const t = useWords("places");
  const { siteId } = useLocalSearchParams<{ siteId: string }>();
  const answer = useQuery(placesQueries.site(siteId));
  if (answer.data?.can.edit)
    return (
      <SiteEditor site={answer.data} title={t("site.editNamed", { name: answer.data.name })} />
    );
  return (
    <Screen title={t("site.edit")} crumbs={[{ label: t("sites.title"), href: placesPaths.sites }]}>
      <Answer of={answer}>{() => <DeniedState />}</Answer>
    </Screen>
  );
}

function SiteEditor({ site, title }: { site: Site | null; title: string }) {
  const t = useWords("places");
  const load = useWords("load");
  const router = useRouter();
  const toast = useToast();
  const deviceZone = Intl.DateTimeFormat().resolvedOptions().timeZone;
  const draft = useDraft(`site.${site?.id ?? "new"}`, siteValues(site, deviceZone));
  const [problems, setProblems] = useState<SiteProblems>({});
  const { values } = draft;
  const saving = useSave(async () => {
    const occupiedHours = occupiedHoursOf(values, site, deviceZone);
    const body = {
      ...(occupiedHours ? { occupiedHours } : {}),
      name: values.name.trim(),
      zone: values.zone ?? "",
      currency: values.currency ?? "",
      unitSystem: values.unitSystem ?? "si",
      address: values.address.trim() || null,
    };
    return site === null
      ? call(createSite, { body })
      : call(updateSite, { params: { siteId: site.id }, body });
  }, siteFields);

  const submit = () => {
    const found: SiteProblems = {
      ...(values.name.trim() === "" ? { name: t("site.nameNeeded") } : {}),
      ...(values.zone === null ? { zone: t("site.zoneNeeded") } : {}),
      ...(values.currency === null ? { currency: t("site.currencyNeeded") } : {}),
      ...(values.occupiedFrom >= values.occupiedTo ? { occupiedTo: load("occupied.order") } : {}),
      ...(values.weekdays.length === 0 ? { occupiedTo: load("occupied.dayNeeded") } : {}),
    };
    setProblems(found);
    if (Object.keys(found).length > 0) return;
    saving.save(undefined, (saved) => {
      draft.clear();
      toast({ message: t(site === null ? "site.added" : "save.saved", { name: saved.name }) });
      router.replace(placesPaths.site(saved.id));
    });
  };
  const back = site === null ? placesPaths.sites : placesPaths.site(site.id);
  const crumbs = [
    { label: t("sites.title"), href: placesPaths.sites },
    ...(site ? [{ label: site.name, href: back }] : []),
  ];
  return (
    <Screen
      title={title}
      crumbs={crumbs}
      narrow
      footer={
        <>
          <Button kind="second" label={t("form.cancel")} href={back} />
          <Button
            label={site === null ? t("site.add") : t("form.save")}
            busy={saving.busy}
            onPress={submit}
          />
        </>
      }
    >
      <View style={{ gap: 24 }}>
        <DraftNotice draft={draft} />
        <SiteForm
          label={title}
          values={values}
          onChange={(changes) => {
            setProblems({});
            saving.reset();
            draft.set(changes);
          }}
          onSubmit={submit}
          problems={problems}
          errors={saving.errors}
          hoursAssumed={site?.occupiedHours.assumed ?? true}
          storedZone={site === null || site.can.remove ? null : site.zone}
        />
        {site ? (
          <PlaceActions
            kind="site"
            name={site.name}
            archived={site.archivedAt !== null}
            can={site.can}
            onArchive={(archived) =>
              call(updateSite, { params: { siteId: site.id }, body: { archived } })
            }
            onRemove={() => call(removeSite, { params: { siteId: site.id } })}
            onGone={() => router.replace(placesPaths.sites)}
          />
        ) : null}
      </View>
    </Screen>
  );
}
