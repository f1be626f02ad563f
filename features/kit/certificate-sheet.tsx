import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { addCertificate, type Instrument } from "@shared/contracts/evidence";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Button,
  ChoiceTiles,
  DateField,
  DraftNotice,
  FieldRow,
  Form,
  NumberField,
  Sheet,
  TextField,
  useDraft,
  useToast,
} from "@features/ui";
import { nameOf, unitOf } from "./kit-words";

interface CertificateValues {
  readonly number: string;
  readonly laboratory: string;
  readonly accredited: "yes" | "no" | "unknown";
  readonly issuedOn: string | null;
  readonly dueOn: string | null;
  readonly expanded: number | null;
  readonly k: number | null;
}

const empty: CertificateValues = {
  number: "",
  laboratory: "",
  accredited: "unknown",
  issuedOn: null,
  dueOn: null,
  expanded: null,
  k: 2,
};

/** A certificate as printed: number, days, and the uncertainty with its coverage factor. */
export function CertificateSheet(props: { instrument: Instrument; onClose: () => void }) {
  const t = useWords("kit");
  const toast = useToast();
  const client = useQueryClient();
  const { instrument, onClose } = props;
  const draft = useDraft<CertificateValues>(`certificate.${instrument.id}`, empty);
  const { values } = draft;
  const [tried, setTried] = useState(false);
  const [readable, setReadable] = useState(true);
  const adding = useChange({
    send: (body: Parameters<typeof bodyOf>[0]) =>
      call(addCertificate, { params: { instrumentId: instrument.id }, body: bodyOf(body) }),
    onDone: async () => {
      draft.clear();
      await client.invalidateQueries();
      toast({ message: t("certificate.added") });
      onClose();
    },
    fields: ["number", "laboratory", "issuedOn", "dueOn", "expanded", "k"],
  });
  const missing = (field: string, empty: boolean) =>
    tried && empty ? t("needed") : adding.fieldError(field);
  const submit = () => {
    setTried(true);
    const { number, issuedOn, expanded } = values;
    if (number.trim() === "" || issuedOn === null || expanded === null || !readable) return;
    adding.send({ ...values, issuedOn, expanded });
  };
  return (
    <Sheet
      open
      kind="side"
      title={t("certificate.addTo", { name: nameOf(instrument) })}
      onClose={onClose}
    >
      <Form label={t("certificate.add")} onSubmit={submit} errors={adding.formErrors}>
        <DraftNotice draft={draft} />
        <TextField
          label={t("certificate.number")}
          value={values.number}
          onChange={(number) => draft.set({ number })}
          error={missing("number", values.number.trim() === "")}
          required
          asRead
          autoComplete="off"
        />
        <FieldRow>
          <DateField
            label={t("certificate.issuedOn")}
            value={values.issuedOn}
            onChange={(issuedOn) => draft.set({ issuedOn })}
            error={missing("issuedOn", values.issuedOn === null)}
            required
          />
          <DateField
            label={t("certificate.dueOn")}
            hint={t("certificate.dueHint")}
            value={values.dueOn}
            onChange={(dueOn) => draft.set({ dueOn })}
            error={adding.fieldError("dueOn")}
          />
        </FieldRow>
        <FieldRow>
          <NumberField
            label={t("certificate.expanded")}
            hint={t(`certificate.expandedHint.${unitHint(instrument)}`)}
            unit={unitOf(instrument.kind)}
            value={values.expanded}
            onChange={(expanded, ok) => {
              draft.set({ expanded });
              setReadable(ok);
            }}
            min={0.0001}
            max={100}
            error={missing("expanded", values.expanded === null)}
            required
          />
          <NumberField
            label={t("certificate.k")}
            hint={t("certificate.kHint")}
            value={values.k}
            onChange={(k) => draft.set({ k })}
            min={1}
            max={4}
            error={adding.fieldError("k")}
          />
        </FieldRow>
        <TextField
          label={t("certificate.laboratory")}
          value={values.laboratory}
          onChange={(laboratory) => draft.set({ laboratory })}
          error={adding.fieldError("laboratory")}
          autoComplete="off"
        />
        <ChoiceTiles
          label={t("certificate.accreditedQuestion")}
          value={values.accredited}
          columns={3}
          choices={[
            { value: "yes", label: t("yes") },
            { value: "no", label: t("no") },
            { value: "unknown", label: t("unknown") },
          ]}
          onChange={(accredited) => draft.set({ accredited })}
        />
        <Button submit full label={t("certificate.add")} busy={adding.busy} />
      </Form>
    </Sheet>
  );
}

function unitHint({ kind }: Instrument): "flow" | "temperature" | "other" {
  const unit = unitOf(kind);
  return unit === "%" ? "flow" : unit === "K" ? "temperature" : "other";
}

function bodyOf(values: CertificateValues & { issuedOn: string; expanded: number }) {
  return {
    number: values.number.trim(),
    laboratory: values.laboratory.trim() || null,
    accredited: values.accredited === "unknown" ? null : values.accredited === "yes",
    issuedOn: values.issuedOn,
    dueOn: values.dueOn,
    expanded: values.expanded,
    ...(values.k === null ? {} : { k: values.k }),
  };
}
