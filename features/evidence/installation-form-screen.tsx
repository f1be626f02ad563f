import { useQuery, useQueryClient } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { useRef, useState } from "react";
import { View } from "react-native";
import { createInstallation, type Installation, type Instrument } from "@shared/contracts/evidence";
import type { Loop, Point, Site } from "@shared/contracts/places";
import { Answer, call, useChange, useSettled } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  DeniedState,
  DraftNotice,
  Form,
  LoopTag,
  Screen,
  Text,
  TextField,
  TextLink,
  useBreakpoint,
  useDraft,
  useToast,
} from "@features/ui";
import { BoreCorrection } from "./bore-correction";
import { BudgetList } from "./budget-list";
import { evidencePaths } from "./evidence-paths";
import { evidenceQueries } from "./evidence-queries";
import {
  bodyOf,
  installationValues,
  readWalls,
  type InstallationBody,
} from "./installation-values";
import { MeterSection, PlateSection, SoundSection, ZeroSection } from "./meter-sections";
import { PipeSection, PositionSection } from "./pipe-sections";
import { ProbesSection } from "./probes-section";
import {
  EditsSection,
  FluidSection,
  LoggerSection,
  NoiseSection,
  TimeSection,
} from "./record-sections";
import type { SectionProps } from "./section";
import { tagService } from "./tag-service";
import { prefillOf, type TakenOverParams } from "./taken-over";
import { usePointCrumbs } from "./use-point-crumbs";

type Ids = { siteId: string; loopId: string; pointId: string };

export function NewInstallationScreen() {
  const params = useLocalSearchParams<Ids>();
  return <InstallationLoader ids={params} installationId={null} given={params} />;
}

export function CorrectInstallationScreen() {
  const { installationId, ...ids } = useLocalSearchParams<Ids & { installationId: string }>();
  return <InstallationLoader ids={ids} installationId={installationId} given={ids} />;
}

function InstallationLoader(props: {
  ids: Ids;
  installationId: string | null;
  given: TakenOverParams;
}) {
  const t = useWords("installation");
  const { ids, installationId } = props;
  const site = useQuery(evidenceQueries.site(ids.siteId));
  const loop = useQuery(evidenceQueries.loop(ids.loopId));
  const point = useQuery(evidenceQueries.point(ids.pointId));
  const kit = useQuery(evidenceQueries.instruments);
  const known = useQuery(evidenceQueries.installations(ids.pointId));
  const before = known.data?.items.find(({ id }) => id === installationId) ?? null;
  const allowed = installationId === null ? known.data?.can.create : before?.can.edit;
  if (site.data && loop.data && point.data && kit.data && allowed)
    return (
      <InstallationEditor
        site={site.data}
        loop={loop.data}
        point={point.data}
        kit={kit.data.items}
        before={before}
        given={props.given}
      />
    );
  const waiting = [site, loop, point, kit, known].find(({ data }) => data === undefined) ?? known;
  return (
    <Screen title={t(installationId === null ? "add" : "correct")}>
      <Answer of={{ ...waiting, data: waiting.data as unknown }} denied={t("denied")}>
        {() => <DeniedState detail={t("denied")} />}
      </Answer>
    </Screen>
  );
}

const serverFields = [
  "startsAt",
  "endsAt",
  "flowMeterId",
  "loggerId",
  "bathCheckId",
  "fluidTestedOn",
  "shownFlowLPerS",
  "enteredBoreMm",
  "meterPlate/permanentFlowM3PerHour",
  "meterPlate/minimumDeltaTK",
  "meterPlate/certificate/number",
  "meterPlate/certificate/expandedPercent",
  "meterPlate/certificate/k",
  "pipe/circumferenceMm",
  "pipe/outsideDiameterMm",
  "pipe/wallReadingsMm",
  "probes/supply/probeId",
  "probes/return/probeId",
  "reason",
];

function InstallationEditor(props: {
  site: Site;
  loop: Loop;
  point: Point;
  kit: readonly Instrument[];
  before: Installation | null;
  given: TakenOverParams;
}) {
  const { site, loop, point, kit, before } = props;
  const t = useWords("installation");
  const toast = useToast();
  const client = useQueryClient();
  const format = useFormat(site.zone, site.unitSystem);
  const wide = useBreakpoint() === "wide";
  const stored = installationValues(before, site.zone);
  const prefill = prefillOf(props.given, kit, site.zone, stored);
  // What came from a file has a draft of its own: one that waits is neither lost nor mixed in.
  const fromFile = prefill ? `.${JSON.stringify(prefill.changes)}` : "";
  const draft = useDraft(`installation.${before?.id ?? `new-${point.id}`}${fromFile}`, {
    ...stored,
    ...prefill?.changes,
  });
  const { values } = draft;
  const unreadable = useRef(new Set<string>());
  const [tried, setTried] = useState(false);
  const body = bodyOf(values, site.zone, before);
  const settled = useSettled(JSON.stringify(body));
  const trial = useQuery(
    evidenceQueries.tried(point.id, JSON.parse(settled) as InstallationBody | null),
  );
  const checks = useQuery(evidenceQueries.bathChecks(values.supply.probeId.replace("none", "")));
  const back = evidencePaths.evidence(site.id, loop.id, point.id);
  const saving = useChange({
    send: (sent: InstallationBody & { supersedes?: string; reason?: string }) =>
      call(createInstallation, { params: { pointId: point.id }, body: sent }),
    onDone: async () => {
      draft.clear();
      await client.invalidateQueries();
      toast({ message: t(before === null ? "saved" : "corrected") });
      router.replace(back);
    },
    fields: serverFields,
  });
  const [problem, setProblem] = useState<string | null>(null);
  const submit = () => {
    setTried(true);
    setProblem(null);
    if (body === null) return setProblem(t("time.startNeeded"));
    if (unreadable.current.size > 0 || readWalls(values.walls) === null)
      return setProblem(t("unreadable"));
    if (before === null) return saving.send(body);
    if (values.reason.trim() === "") return setProblem(t("reasonNeeded"));
    saving.send({ ...body, supersedes: before.id, reason: values.reason.trim() });
  };
  const found = body === null ? undefined : trial.data;
  const section: SectionProps = {
    values,
    onChange: (changes) => {
      setProblem(null);
      draft.set(changes);
    },
    onReadable: (field, readable) => {
      if (readable) unreadable.current.delete(field);
      else unreadable.current.add(field);
    },
    error: (field) =>
      tried && body === null && field === "startsAt"
        ? t("time.startNeeded")
        : saving.fieldError(field),
    format,
    loop,
    kit,
    checks: checks.data?.items ?? [],
    found,
  };
  const title = before === null ? t("add") : t("correct");
  const result = (
    <Card label={t("budget.title")}>
      <View style={{ gap: 12 }}>
        <Text variant="heading">{t("budget.title")}</Text>
        {found ? (
          <BudgetList budget={found.budget} format={format} />
        ) : (
          <Text tone="ink2">{t("budget.startFirst")}</Text>
        )}
      </View>
    </Card>
  );
  return (
    <Screen
      title={title}
      crumbs={usePointCrumbs({ site, loop, point, evidence: true })}
      tag={<LoopTag tag={loop.tag} service={tagService(loop.service)} size="l" />}
      footer={
        <>
          <Button kind="second" label={t("cancel")} href={back} />
          <Button
            label={t(before === null ? "save" : "saveCorrection")}
            busy={saving.busy}
            onPress={submit}
          />
        </>
      }
    >
      <View style={{ flexDirection: wide ? "row" : "column", gap: 20, alignItems: "flex-start" }}>
        <View style={{ flex: wide ? 1 : undefined, width: wide ? undefined : "100%", gap: 16 }}>
          {prefill ? <FromFile unknownSerials={prefill.unknownSerials} /> : null}
          <DraftNotice draft={draft} />
          <Form
            label={title}
            onSubmit={submit}
            errors={problem === null ? saving.formErrors : [problem, ...saving.formErrors]}
          >
            {found?.indicativeOnly ? <Indicative /> : null}
            <TimeSection {...section} />
            <PipeSection
              {...section}
              correction={
                <BoreCorrection
                  enteredMm={values.enteredBoreMm}
                  trueMm={found?.bore?.insideDiameterMm ?? null}
                  format={format}
                  at={{ siteId: site.id, loopId: loop.id, pointId: point.id }}
                />
              }
            />
            <PositionSection {...section} />
            <MeterSection {...section} />
            <PlateSection {...section} />
            <ZeroSection {...section} />
            <SoundSection {...section} />
            <ProbesSection {...section} />
            <LoggerSection {...section} />
            <NoiseSection {...section} />
            <FluidSection {...section} />
            <EditsSection {...section} />
            <Card label={t("notes")}>
              <View style={{ gap: 14 }}>
                <TextField
                  label={t("notes")}
                  value={values.notes}
                  onChange={(notes) => section.onChange({ notes })}
                  lines={3}
                />
                {before === null ? null : (
                  <TextField
                    label={t("reason")}
                    hint={t("reasonHint")}
                    value={values.reason}
                    onChange={(reason) => section.onChange({ reason })}
                    error={
                      tried && values.reason.trim() === ""
                        ? t("reasonNeeded")
                        : saving.fieldError("reason")
                    }
                    required
                    autoComplete="off"
                  />
                )}
              </View>
            </Card>
          </Form>
        </View>
        <View style={{ width: wide ? 372 : "100%" }}>{result}</View>
      </View>
    </Screen>
  );
}

function FromFile({ unknownSerials }: { unknownSerials: readonly string[] }) {
  const t = useWords("installation");
  return (
    <>
      <Banner kind="note">{t("fromFile")}</Banner>
      {unknownSerials.length > 0 ? (
        <Banner kind="look" action={<TextLink href="/kit" label={t("openKit")} />}>
          {t("unknownSerials", { serials: unknownSerials.join(", ") })}
        </Banner>
      ) : null}
    </>
  );
}

export function Indicative() {
  const t = useWords("evidence");
  return <Banner kind="note">{t("indicative")}</Banner>;
}
