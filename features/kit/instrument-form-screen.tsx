import { useQuery, useQueryClient } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import {
  createInstrument,
  updateInstrument,
  type Instrument,
  type InstrumentKind,
} from "@shared/contracts/evidence";
import { Answer, call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Button,
  DeniedState,
  DraftNotice,
  FieldRow,
  Form,
  Screen,
  SelectField,
  TextField,
  useDraft,
  useToast,
} from "@features/ui";
import { kitPaths } from "./kit-paths";
import { kitQueries } from "./kit-queries";
import { kinds, nameOf } from "./kit-words";

type ProbeClass = NonNullable<Instrument["probeClass"]>;

interface InstrumentValues {
  readonly kind: InstrumentKind | null;
  readonly serial: string;
  readonly label: string;
  readonly make: string;
  readonly range: string;
  readonly probeClass: ProbeClass | "unknown";
  readonly outOfService: string;
  readonly notes: string;
}

function valuesOf(instrument: Instrument | null): InstrumentValues {
  return {
    kind: instrument?.kind ?? null,
    serial: instrument?.serial ?? "",
    label: instrument?.label ?? "",
    make: instrument?.make ?? "",
    range: instrument?.range ?? "",
    probeClass: instrument?.probeClass ?? "unknown",
    outOfService: instrument?.outOfService ?? "",
    notes: instrument?.notes ?? "",
  };
}

export function NewInstrumentScreen() {
  const t = useWords("kit");
  const answer = useQuery(kitQueries.instruments());
  return answer.data?.can.create ? (
    <InstrumentEditor instrument={null} />
  ) : (
    <Screen title={t("instrument.add")} crumbs={[{ label: t("title"), href: kitPaths.kit }]}>
      <Answer of={answer} denied={t("denied")}>
        {() => <DeniedState detail={t("denied")} />}
      </Answer>
    </Screen>
  );
}

export function EditInstrumentScreen() {
  const t = useWords("kit");
  const { instrumentId } = useLocalSearchParams<{ instrumentId: string }>();
  const answer = useQuery(kitQueries.instrument(instrumentId));
  return answer.data?.can.edit ? (
    <InstrumentEditor instrument={answer.data} />
  ) : (
    <Screen title={t("change")} crumbs={[{ label: t("title"), href: kitPaths.kit }]}>
      <Answer of={answer} denied={t("denied")}>
        {() => <DeniedState detail={t("denied")} />}
      </Answer>
    </Screen>
  );
}

function bodyOf(values: InstrumentValues) {
  const text = (typed: string) => typed.trim() || null;
  return {
    serial: values.serial.trim(),
    label: text(values.label),
    make: text(values.make),
    range: text(values.range),
    probeClass: values.probeClass === "unknown" ? null : values.probeClass,
    outOfService: text(values.outOfService),
    notes: text(values.notes),
  };
}

function InstrumentEditor({ instrument }: { instrument: Instrument | null }) {
  const t = useWords("kit");
  const toast = useToast();
  const client = useQueryClient();
  const draft = useDraft(`instrument.${instrument?.id ?? "new"}`, valuesOf(instrument));
  const { values } = draft;
  const [tried, setTried] = useState(false);
  const saving = useChange({
    send: (send: () => Promise<Instrument>) => send(),
    onDone: async (saved) => {
      draft.clear();
      await client.invalidateQueries();
      toast({ message: t("instrument.saved", { name: nameOf(saved) }) });
      router.replace(kitPaths.instrument(saved.id));
    },
    fields: ["kind", "serial", "label", "make", "range", "probeClass", "outOfService", "notes"],
  });
  const submit = () => {
    setTried(true);
    const { kind } = values;
    if (kind === null || values.serial.trim() === "") return;
    const body = bodyOf(values);
    saving.send(() =>
      instrument === null
        ? call(createInstrument, {
            body: { ...body, kind, probeClass: kind === "probe" ? body.probeClass : null },
          })
        : call(updateInstrument, { params: { instrumentId: instrument.id }, body }),
    );
  };
  const archive = () => {
    if (instrument === null) return;
    const archived = instrument.archivedAt === null;
    saving.send(() =>
      call(updateInstrument, { params: { instrumentId: instrument.id }, body: { archived } }),
    );
  };
  const title =
    instrument === null
      ? t("instrument.add")
      : t("instrument.changeNamed", { name: nameOf(instrument) });
  const back = instrument === null ? kitPaths.kit : kitPaths.instrument(instrument.id);
  return (
    <Screen
      title={title}
      crumbs={[{ label: t("title"), href: kitPaths.kit }]}
      narrow
      footer={
        <>
          <Button kind="second" label={t("cancel")} href={back} />
          <Button
            label={t(instrument === null ? "instrument.add" : "save")}
            busy={saving.busy}
            onPress={submit}
          />
        </>
      }
    >
      <View style={{ gap: 24 }}>
        <DraftNotice draft={draft} />
        <Form label={title} onSubmit={submit} errors={saving.formErrors}>
          <FieldRow>
            <SelectField
              label={t("instrument.kind")}
              value={values.kind}
              options={kinds.map((kind) => ({ value: kind, label: t(`kind.${kind}`) }))}
              onChange={(kind) => draft.set({ kind })}
              error={tried && values.kind === null ? t("needed") : saving.fieldError("kind")}
              disabled={instrument !== null}
              required
            />
            <TextField
              label={t("instrument.serial")}
              hint={t("instrument.serialHint")}
              value={values.serial}
              onChange={(serial) => draft.set({ serial })}
              error={
                tried && values.serial.trim() === "" ? t("needed") : saving.fieldError("serial")
              }
              required
              asRead
              autoComplete="off"
            />
          </FieldRow>
          <FieldRow>
            <TextField
              label={t("instrument.label")}
              hint={t("instrument.labelHint")}
              value={values.label}
              onChange={(label) => draft.set({ label })}
              error={saving.fieldError("label")}
              autoComplete="off"
            />
            <TextField
              label={t("instrument.make")}
              hint={t("instrument.makeHint")}
              value={values.make}
              onChange={(make) => draft.set({ make })}
              error={saving.fieldError("make")}
              autoComplete="off"
            />
          </FieldRow>
          <TextField
            label={t("instrument.range")}
            hint={t("instrument.rangeHint")}
            value={values.range}
            onChange={(range) => draft.set({ range })}
            error={saving.fieldError("range")}
            autoComplete="off"
          />
          {values.kind === "probe" ? (
            <SelectField
              label={t("instrument.probeClass")}
              hint={t("instrument.probeClassHint")}
              value={values.probeClass}
              options={[
                { value: "unknown", label: t("unknown") },
                { value: "AA", label: "AA" },
                { value: "A", label: "A" },
                { value: "B", label: "B" },
              ]}
              onChange={(probeClass) => draft.set({ probeClass })}
              error={saving.fieldError("probeClass")}
            />
          ) : null}
          {instrument === null ? null : (
            <TextField
              label={t("instrument.outOfService")}
              hint={t("instrument.outOfServiceHint")}
              value={values.outOfService}
              onChange={(outOfService) => draft.set({ outOfService })}
              error={saving.fieldError("outOfService")}
              autoComplete="off"
            />
          )}
          <TextField
            label={t("instrument.notes")}
            value={values.notes}
            onChange={(notes) => draft.set({ notes })}
            error={saving.fieldError("notes")}
            lines={3}
          />
        </Form>
        {instrument === null ? null : (
          <View style={{ alignSelf: "flex-start" }}>
            <Button
              kind="second"
              icon="archive"
              label={t(instrument.archivedAt === null ? "archive" : "restore")}
              busy={saving.busy}
              onPress={archive}
            />
          </View>
        )}
      </View>
    </Screen>
  );
}
