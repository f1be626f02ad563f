import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams, useRouter } from "expo-router";
import { useRef, useState } from "react";
import { View } from "react-native";

import type { Loop, Site } from "@shared/contracts/places";
import { removeLoopPump, saveLoopPump, type PumpFields } from "@shared/contracts/shape";
import { Answer, call } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Button, DeniedState, DraftNotice, Screen, useDraft, useToast } from "@features/ui";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";
import { PumpForm, pumpServerNames, type PumpField, type PumpProblems } from "./pump-form";
import { pumpBody, pumpValues } from "./pump-values";
import { useSave } from "./use-save";

/** The pump that moves a loop's water: what its excess flow costs hangs on it. */
export function PumpFormScreen() {
  const t = useWords("load");
  const places = useWords("places");
  const { siteId, loopId } = useLocalSearchParams<{ siteId: string; loopId: string }>();
  const site = useQuery(placesQueries.site(siteId));
  const loop = useQuery(placesQueries.loop(loopId));
  const pump = useQuery(placesQueries.pump(loopId));
  if (site.data && loop.data && pump.data?.can.edit)
    return <PumpEditor site={site.data} loop={loop.data} pump={pump.data.pump} />;
  const waiting = [site, loop, pump].find(({ data }) => data === undefined) ?? pump;
  return (
    <Screen
      title={t("pump.title")}
      crumbs={[{ label: places("sites.title"), href: placesPaths.sites }]}
    >
      <Answer of={{ ...waiting, data: waiting.data as unknown }}>{() => <DeniedState />}</Answer>
    </Screen>
  );
}

function PumpEditor({ site, loop, pump }: { site: Site; loop: Loop; pump: PumpFields | null }) {
  const t = useWords("load");
  const places = useWords("places");
  const router = useRouter();
  const toast = useToast();
  const format = useFormat(site.zone, site.unitSystem);
  // Numbers are kept as shown, so a draft belongs to the units it was typed in.
  const draft = useDraft(`pump.${loop.id}.${format.unitSystem}`, pumpValues(pump, format));
  const unreadable = useRef(new Set<PumpField>());
  const [problems, setProblems] = useState<PumpProblems>({});
  const { values } = draft;
  const params = { loopId: loop.id };
  const saving = useSave(
    (body: PumpFields) => call(saveLoopPump, { params, body }),
    Object.values(pumpServerNames),
  );
  const forgetting = useSave(() => call(removeLoopPump, { params }), []);
  const title = t("pump.titleOf", { tag: loop.tag });
  const back = `${placesPaths.loop(loop.id)}?view=load`;

  const submit = () => {
    const found = findProblems();
    setProblems(found);
    if (Object.keys(found).length > 0) return;
    saving.save(pumpBody(values, pump, format), () => {
      draft.clear();
      toast({ message: t("pump.saved", { tag: loop.tag }) });
      router.replace(back);
    });
  };
  const findProblems = (): PumpProblems => {
    const curve = ["designHead", "designFlow", "efficiencyPercent"] as const;
    const someCurve = curve.some((name) => values[name] !== null);
    const found: PumpProblems = {};
    if (values.controlledHead === null) found.controlledHead = t("pump.headNeeded");
    if (someCurve)
      for (const name of curve) if (values[name] === null) found[name] = t("pump.incomplete");
    if (values.controlledHead === "yes" && someCurve) {
      if (values.staticHead === null) found.staticHead = t("pump.staticNeeded");
      else if (values.designHead !== null && values.staticHead > values.designHead)
        found.staticHead = t("pump.aboveDesign");
    }
    for (const field of unreadable.current)
      if (field !== "staticHead" || values.controlledHead === "yes")
        found[field] = t("pump.unreadable");
    return found;
  };
  const forget = () =>
    forgetting.save(undefined, () => {
      draft.clear();
      toast({ message: t("pump.forgotten", { tag: loop.tag }) });
      router.replace(back);
    });
  return (
    <Screen
      title={title}
      crumbs={[
        { label: places("sites.title"), href: placesPaths.sites },
        { label: site.name, href: placesPaths.site(site.id) },
        { label: loop.tag, href: back },
      ]}
      narrow
      footer={
        <>
          <Button kind="second" label={places("form.cancel")} href={back} />
          <Button label={places("form.save")} busy={saving.busy} onPress={submit} />
        </>
      }
    >
      <View style={{ gap: 24 }}>
        <DraftNotice draft={draft} />
        <PumpForm
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
          errors={{
            field: saving.errors.field,
            form: [...saving.errors.form, ...forgetting.errors.form],
          }}
          format={format}
          currency={site.currency}
        />
        {pump ? (
          <Button kind="quiet" label={t("pump.forget")} busy={forgetting.busy} onPress={forget} />
        ) : null}
      </View>
    </Screen>
  );
}
