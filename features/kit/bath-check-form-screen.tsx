import { useQuery, useQueryClient } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import { createBathCheck, type BathCheck, type Instrument } from "@shared/contracts/evidence";
import {
  bathCheck,
  bathCheckVerdicts,
  LEAST_PAIRS,
  type BathReading,
} from "@shared/domain/uncertainty/bath-check";
import { Answer, call, useChange } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Button,
  Card,
  DateField,
  DefinitionRows,
  DeniedState,
  DraftNotice,
  FieldRow,
  Form,
  NumberField,
  Screen,
  SelectField,
  Text,
  TextField,
  TextLink,
  useDraft,
  useToast,
} from "@features/ui";
import { BathCheckVerdicts } from "./bath-check-verdicts";
import { kitPaths } from "./kit-paths";
import { kitQueries } from "./kit-queries";
import { readPairs, writePairs } from "./read-pairs";

/** Standard uncertainty a stirred bath leaves between two probes, K (common practice). */
const usualBathK = 0.01;

interface BathValues {
  readonly first: string | null;
  readonly second: string | null;
  readonly checkedOn: string | null;
  readonly bathK: number | null;
  readonly readings: string;
  readonly notes: string;
}

/** A new check, or with `replaces` one that stands in the place of another. */
export function BathCheckFormScreen() {
  const t = useWords("kit");
  const asked = useLocalSearchParams<{ replaces?: string; first?: string; second?: string }>();
  const kit = useQuery(kitQueries.instruments());
  const before = useQuery({
    ...kitQueries.bathCheck(asked.replaces ?? ""),
    enabled: asked.replaces !== undefined,
  });
  const crumbs = [
    { label: t("title"), href: kitPaths.kit },
    { label: t("bathChecks.title"), href: kitPaths.bathChecks },
  ];
  const ready = asked.replaces === undefined || before.data !== undefined;
  if (kit.data?.can.create && ready)
    return (
      <BathCheckEditor
        probes={kit.data.items.filter(({ kind }) => kind === "probe")}
        before={before.data ?? null}
        start={{ first: asked.first ?? null, second: asked.second ?? null }}
        today={kit.data.today}
        crumbs={crumbs}
      />
    );
  const waiting = kit.data === undefined ? kit : before;
  return (
    <Screen title={t("bathChecks.add")} crumbs={crumbs}>
      <Answer of={{ ...waiting, data: waiting.data as unknown }} denied={t("denied")}>
        {() => <DeniedState detail={t("denied")} />}
      </Answer>
    </Screen>
  );
}

function BathCheckEditor(props: {
  probes: readonly Instrument[];
  before: BathCheck | null;
  start: { first: string | null; second: string | null };
  today: string;
  crumbs: { label: string; href: string }[];
}) {
  const t = useWords("kit");
  const toast = useToast();
  const client = useQueryClient();
  const { probes, before, start } = props;
  const draft = useDraft<BathValues>(`bath-check.${before?.id ?? "new"}`, {
    first: before?.firstProbeId ?? start.first,
    second: before?.secondProbeId ?? start.second,
    checkedOn: before?.checkedOn ?? props.today,
    bathK: before?.bathUncertaintyK ?? usualBathK,
    readings: before ? writePairs(before.readings) : "",
    notes: before?.notes ?? "",
  });
  const { values } = draft;
  const { pairs, unreadable } = readPairs(values.readings);
  const [tried, setTried] = useState(false);
  const saving = useChange({
    send: (body: Parameters<typeof bodyOf>[0]) =>
      call(createBathCheck, { body: bodyOf(body, pairs, before?.id) }),
    onDone: async (saved) => {
      draft.clear();
      await client.invalidateQueries();
      toast({ message: t("bathChecks.saved") });
      router.replace(kitPaths.bathCheck(saved.id));
    },
    fields: ["firstProbeId", "secondProbeId", "checkedOn", "bathUncertaintyK", "readings"],
  });
  const readingsProblem =
    unreadable.length > 0
      ? t("bathChecks.unreadable", { lines: unreadable.slice(0, 5).join(", ") })
      : tried && pairs.length < 2
        ? t("bathChecks.twoNeeded")
        : saving.fieldError("readings");
  const submit = () => {
    setTried(true);
    const { first, second, checkedOn } = values;
    if (first === null || second === null || checkedOn === null) return;
    if (pairs.length < 2 || unreadable.length > 0) return;
    saving.send({ ...values, first, second, checkedOn });
  };
  const options = probes.map(({ id, serial, label }) => ({
    value: id,
    label: label === null ? serial : `${serial}, ${label}`,
  }));
  const title = t(before === null ? "bathChecks.add" : "bathChecks.correct");
  return (
    <Screen
      title={title}
      crumbs={props.crumbs}
      narrow
      footer={
        <>
          <Button kind="second" label={t("cancel")} href={kitPaths.bathChecks} />
          <Button label={t("bathChecks.save")} busy={saving.busy} onPress={submit} />
        </>
      }
    >
      <View style={{ gap: 24 }}>
        <DraftNotice draft={draft} />
        <Form label={title} onSubmit={submit} errors={saving.formErrors}>
          <Text tone="ink2">{t("bathChecks.lead")}</Text>
          {probes.length < 2 ? (
            <Text>
              {t("bathChecks.noProbes")}{" "}
              <TextLink label={t("instrument.add")} href={kitPaths.newInstrument} />
            </Text>
          ) : null}
          <FieldRow>
            <SelectField
              label={t("bathChecks.first")}
              value={values.first}
              options={options}
              onChange={(first) => draft.set({ first })}
              error={
                tried && values.first === null ? t("needed") : saving.fieldError("firstProbeId")
              }
              disabled={before !== null}
              required
            />
            <SelectField
              label={t("bathChecks.second")}
              value={values.second}
              options={options.filter(({ value }) => value !== values.first)}
              onChange={(second) => draft.set({ second })}
              error={
                tried && values.second === null ? t("needed") : saving.fieldError("secondProbeId")
              }
              disabled={before !== null}
              required
            />
          </FieldRow>
          <FieldRow>
            <DateField
              label={t("bathChecks.checkedOn")}
              value={values.checkedOn}
              max={props.today}
              onChange={(checkedOn) => draft.set({ checkedOn })}
              error={
                tried && values.checkedOn === null ? t("needed") : saving.fieldError("checkedOn")
              }
              required
            />
            <NumberField
              label={t("bathChecks.bathK")}
              hint={t("bathChecks.bathKHint")}
              unit="K"
              value={values.bathK}
              min={0}
              max={1}
              onChange={(bathK) => draft.set({ bathK })}
              error={saving.fieldError("bathUncertaintyK")}
            />
          </FieldRow>
          <TextField
            label={t("bathChecks.readings")}
            hint={t("bathChecks.readingsHint", { least: LEAST_PAIRS })}
            value={values.readings}
            onChange={(readings) => draft.set({ readings })}
            error={readingsProblem}
            lines={12}
            asRead
            required
          />
          <LiveResult
            pairs={pairs}
            bathK={values.bathK ?? usualBathK}
            checkedOn={values.checkedOn ?? props.today}
            serials={[
              probes.find(({ id }) => id === values.first)?.serial ?? t("bathChecks.first"),
              probes.find(({ id }) => id === values.second)?.serial ?? t("bathChecks.second"),
            ]}
          />
          <TextField
            label={t("instrument.notes")}
            value={values.notes}
            onChange={(notes) => draft.set({ notes })}
            lines={2}
          />
        </Form>
      </View>
    </Screen>
  );
}

/** Mean difference, spread and verdict as the readings are typed. */
function LiveResult(props: {
  pairs: readonly BathReading[];
  bathK: number;
  checkedOn: string;
  serials: readonly [string, string];
}) {
  const t = useWords("kit");
  const { pairs, bathK, checkedOn } = props;
  const result = bathCheck(pairs, bathK);
  return (
    <Card label={t("bathChecks.result")}>
      {result === null ? (
        <Text tone="ink2">{t("bathChecks.noResultYet")}</Text>
      ) : (
        <View role="status" style={{ gap: 12 }}>
          <BathCheckFigures
            pairs={result.pairs}
            bathC={result.bathC}
            meanDifferenceK={result.meanDifferenceK}
            deviationK={result.deviationK}
            residualK={result.residualK}
            driftK={null}
            serials={props.serials}
          />
          <BathCheckVerdicts verdicts={bathCheckVerdicts({ ...result, checkedOn }, checkedOn)} />
        </View>
      )}
    </Card>
  );
}

type Figures = Pick<
  BathCheck,
  "pairs" | "bathC" | "meanDifferenceK" | "deviationK" | "residualK" | "driftK"
>;

export function BathCheckFigures(props: Figures & { serials: readonly [string, string] }) {
  const t = useWords("kit");
  const format = useFormat();
  const [first, second] = props.serials;
  const kelvin = (value: number) => format.withUnit(value, "temperatureDifference", 4);
  return (
    <DefinitionRows
      label={t("bathChecks.result")}
      rows={[
        { label: t("bathChecks.pairs"), value: format.number(props.pairs, 0) },
        { label: t("bathChecks.bathC"), value: format.withUnit(props.bathC, "temperature", 2) },
        {
          label: t("bathChecks.mean", { first, second }),
          value: kelvin(props.meanDifferenceK),
        },
        { label: t("bathChecks.deviation"), value: kelvin(props.deviationK) },
        { label: t("bathChecks.residual"), value: kelvin(props.residualK) },
        ...(props.driftK === null
          ? []
          : [{ label: t("bathChecks.drift"), value: kelvin(props.driftK) }]),
      ]}
    />
  );
}

function bodyOf(
  values: BathValues & { first: string; second: string; checkedOn: string },
  pairs: readonly BathReading[],
  replaces: string | undefined,
) {
  return {
    firstProbeId: values.first,
    secondProbeId: values.second,
    checkedOn: values.checkedOn,
    ...(values.bathK === null ? {} : { bathUncertaintyK: values.bathK }),
    readings: [...pairs],
    notes: values.notes.trim() || null,
    ...(replaces === undefined ? {} : { replaces }),
  };
}
