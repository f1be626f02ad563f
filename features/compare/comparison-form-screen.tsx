import { useQuery, useQueryClient } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import {
  createMeterComparison,
  type MeterComparison,
  type MeterComparisonBody,
} from "@shared/contracts/meter-comparisons";
import type { Site } from "@shared/contracts/places";
import { Answer, ApiError, call, useChange, useSettled } from "@features/api";
import { useFieldWords, useWords } from "@features/i18n";
import {
  Button,
  DraftNotice,
  EmptyState,
  Form,
  Screen,
  SelectField,
  TextField,
  useBreakpoint,
  useDraft,
  useToast,
  webStyle,
} from "@features/ui";
import { comparePaths } from "./compare-paths";
import { compareQueries } from "./compare-queries";
import {
  comparisonFrom,
  readComparison,
  valuesOf,
  type ComparisonValues,
} from "./comparison-values";
import { LiveResult, LiveVerdict } from "./live-result";
import { PeriodFields } from "./period-fields";
import { SideFields } from "./side-fields";
import { StandInFields } from "./stand-in-fields";

/** A new comparison, or with `supersedes` one that stands in the place of another. */
export function ComparisonFormScreen() {
  const t = useWords("compare");
  const asked = useLocalSearchParams<{
    site?: string;
    supersedes?: string;
    point?: string;
    register?: string;
    from?: string;
    until?: string;
  }>();
  const sites = useQuery(compareQueries.sites);
  const list = useQuery(compareQueries.meters(false));
  const before = useQuery({
    ...compareQueries.comparison(asked.supersedes ?? ""),
    enabled: asked.supersedes !== undefined,
  });
  const crumbs = [{ label: t("title"), href: comparePaths.compare }];
  const waiting = [sites, list, ...(asked.supersedes ? [before] : [])].find(
    ({ data }) => data === undefined,
  );
  if (waiting || !sites.data || !list.data)
    return (
      <Screen title={t("meters.add")} crumbs={crumbs}>
        <Answer
          of={{
            data: undefined,
            error: waiting?.error ?? null,
            refetch: () => waiting?.refetch(),
          }}
          denied={t("denied")}
        >
          {() => null}
        </Answer>
      </Screen>
    );
  const { items } = sites.data;
  const siteId = before.data?.siteId ?? asked.site ?? items[0]?.id;
  const site = items.find(({ id }) => id === siteId);
  if (!site)
    return (
      <Screen title={t("meters.add")} crumbs={crumbs}>
        <EmptyState title={t("form.sitesNone")} />
      </Screen>
    );
  const mayKeep = list.data.can.create;
  // A point of another site is no meter of this one.
  const opened = site.id === asked.site ? asked : {};
  const key = `${site.id}.${before.data?.id ?? opened.point ?? "new"}`;
  return (
    <Editor
      key={key}
      draftKey={key}
      site={site}
      sites={items}
      before={before.data ?? null}
      opened={comparisonFrom(opened)}
      mayKeep={mayKeep}
      crumbs={crumbs}
    />
  );
}

interface EditorProps {
  readonly draftKey: string;
  readonly site: Site;
  readonly sites: readonly Site[];
  readonly before: MeterComparison | null;
  /** What the form starts with: the point it was opened from. */
  readonly opened: ComparisonValues;
  /** Who may not keep one may still work it out. */
  readonly mayKeep: boolean;
  readonly crumbs: readonly { label: string; href: string }[];
}

function Editor(props: EditorProps) {
  const t = useWords("compare");
  const { site, before, mayKeep } = props;
  const wide = useBreakpoint() === "wide";
  const initial = before ? valuesOf(before.input, before, site.zone) : props.opened;
  const draft = useDraft<ComparisonValues>(`meter-comparison.${props.draftKey}`, initial);
  const { values } = draft;
  const points = useQuery(compareQueries.points(site.id));
  const read = readComparison(values, site.zone, t("meters.untitled"));
  const trial = useQuery(compareQueries.trial(site.id, useSettledBody(read.ok ? read.body : null)));
  const saving = useSaving(props, draft.clear);
  const [tried, setTried] = useState(false);
  const errorOf = useErrorAt(trial.error, saving.error);
  const needsConsent =
    values.hasStandIn && values.standIn.hasConsent && values.standIn.consentBy.trim() === "";
  const submit = () => {
    setTried(true);
    if (mayKeep && read.ok && !needsConsent && values.title.trim() !== "") saving.send(read.body);
  };
  const title = t(before ? "saved.correct" : "meters.add");
  return (
    <Screen
      title={title}
      crumbs={props.crumbs}
      footer={
        <>
          {wide || !read.ok || !trial.data || trial.error ? null : (
            <LiveVerdict result={trial.data} />
          )}
          <Button kind="second" label={t("form.cancel")} href={comparePaths.compare} />
          {mayKeep ? <Button label={t("form.save")} busy={saving.busy} onPress={submit} /> : null}
        </>
      }
    >
      <View
        style={{
          flexDirection: wide ? "row" : "column",
          gap: wide ? 40 : 32,
          alignItems: wide ? "flex-start" : "stretch",
        }}
      >
        <View style={wide ? { flex: 1, maxWidth: 620, minWidth: 0 } : null}>
          <Form label={title} onSubmit={submit} errors={saving.formErrors}>
            <View style={{ gap: 32 }}>
              <View style={{ gap: 16 }}>
                <DraftNotice draft={draft} />
                <SelectField
                  label={t("form.site")}
                  value={site.id}
                  options={props.sites.map(({ id, name }) => ({ value: id, label: name }))}
                  onChange={(chosen) =>
                    router.setParams({
                      site: chosen,
                      point: undefined,
                      register: undefined,
                      from: undefined,
                      until: undefined,
                    })
                  }
                  disabled={before !== null}
                />
                <TextField
                  label={t("form.title")}
                  hint={t("form.titleHint")}
                  value={values.title}
                  onChange={(typed) => draft.set({ title: typed })}
                  error={
                    tried && values.title.trim() === "" ? t("form.nameNeeded") : errorOf("title")
                  }
                  autoComplete="off"
                  required={mayKeep}
                />
              </View>
              <PeriodFields
                zone={site.zone}
                from={values.from}
                to={values.to}
                onChange={draft.set}
                errorOf={errorOf}
              />
              {(["first", "second"] as const).map((which) => (
                <SideFields
                  key={which}
                  title={t(`form.${which}`)}
                  hint={t(`form.${which}Hint`)}
                  value={values[which]}
                  points={points.data}
                  onChange={(side) => draft.set({ [which]: side })}
                  errorOf={(field) => errorOf(`${which}/${field}`)}
                />
              ))}
              <StandInFields
                on={values.hasStandIn}
                onToggle={(hasStandIn) => draft.set({ hasStandIn })}
                value={values.standIn}
                onChange={(standIn) => draft.set({ standIn })}
                errorOf={(field) => errorOf(`standIn/${field}`)}
                consentError={tried && needsConsent ? t("standIn.consentNeeded") : null}
              />
              <TextField
                label={t("form.notes")}
                value={values.notes}
                onChange={(notes) => draft.set({ notes })}
                lines={3}
              />
            </View>
          </Form>
        </View>
        <View style={wide ? [{ flex: 1, minWidth: 0 }, inSight] : null}>
          <LiveResult
            missing={read.ok ? [] : read.missing}
            result={trial.data}
            error={trial.error}
            consentBy={read.ok ? (read.body.standIn?.consentBy ?? null) : null}
            onRetry={() => void trial.refetch()}
          />
        </View>
      </View>
    </Screen>
  );
}

/** Beside a form longer than the window, the verdict stays in sight; the page's end shows the rest. */
const inSight = webStyle({ position: "sticky", top: 16 });

/** The body once typing has paused; compared by what it says, because every render makes a new one. */
function useSettledBody(body: MeterComparisonBody | null): MeterComparisonBody | null {
  const settled = useSettled(JSON.stringify(body));
  return JSON.parse(settled) as MeterComparisonBody | null;
}

function useSaving({ site, before }: EditorProps, onSaved: () => void) {
  const t = useWords("compare");
  const toast = useToast();
  const client = useQueryClient();
  return useChange({
    send: (body: MeterComparisonBody) =>
      call(createMeterComparison, {
        params: { siteId: site.id },
        body: before ? { ...body, supersedes: before.id } : body,
      }),
    onDone: async (saved) => {
      onSaved();
      await client.invalidateQueries();
      toast({ message: t("meters.saved") });
      router.replace(comparePaths.meters(saved.id));
    },
  });
}

/** The server's word on a field, from working it out or from saving. */
function useErrorAt(...errors: readonly (Error | null)[]): (path: string) => string | null {
  const fieldWords = useFieldWords();
  const found = errors.flatMap((error) =>
    error instanceof ApiError ? (error.problem.errors ?? []) : [],
  );
  return (path) => {
    const entry = found.find(({ pointer }) => pointer === `/body/${path}`);
    return entry ? fieldWords(entry) : null;
  };
}
