import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { proposeCorrection, type CorrectionChange } from "@shared/contracts/corrections";
import type { Point, Site } from "@shared/contracts/places";
import { call, useChange } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Button, Form, SelectField, Sheet, Text, TextField, useToast } from "@features/ui";
import {
  changeKinds,
  changeOf,
  draftOf,
  type AskedParams,
  type ChangeDraft,
  type DraftField,
} from "./change-draft";
import { KindFields } from "./kind-fields";

/** What the server names each field of a change. */
const serverNames: Partial<Record<DraftField, string>> = {
  to: "change/to",
  bound: "change/rule/value",
  logFileId: "change/logFileId",
  offsetS: "change/offsetS",
  probeId: "change/probeId",
  addK: "change/addK",
  enteredBore: "change/enteredBoreMm",
  trueBore: "change/trueBoreMm",
  unitChannel: "change/channel",
  unit: "change/unit",
  fluidKind: "change/fluid",
};

interface ProposeSheetProps {
  site: Site;
  point: Point;
  asked: AskedParams;
  /** When the point's readings begin. */
  firstAt: string | null;
  onClose: () => void;
}

/** A correction put together; its effect is worked out before anybody can apply it. */
export function ProposeSheet({ site, point, asked, firstAt, onClose }: ProposeSheetProps) {
  const t = useWords("corrections");
  const toast = useToast();
  const client = useQueryClient();
  const format = useFormat(site.zone, site.unitSystem);
  const [draft, setDraft] = useState<ChangeDraft>(() =>
    draftOf(asked, firstAt, site.zone, format.toDisplay),
  );
  const [reason, setReason] = useState("");
  const [tried, setTried] = useState(false);
  const outcome = changeOf(draft, site.zone, format.fromDisplay);
  const missing = "missing" in outcome ? outcome.missing : [];
  const proposing = useChange({
    send: (body: { change: CorrectionChange; reason: string }) =>
      call(proposeCorrection, { params: { pointId: point.id }, body }),
    onDone: async () => {
      await client.invalidateQueries({ queryKey: ["corrections"] });
      toast({ message: t("propose.done") });
      onClose();
    },
    fields: ["reason", ...Object.values(serverNames)],
  });
  const errorOf = (field: DraftField) => {
    if (tried && missing.includes(field)) return t("field.needed");
    const name = serverNames[field];
    return name === undefined ? null : proposing.fieldError(name);
  };
  const change = (changed: Partial<ChangeDraft>) => {
    setDraft((before) => ({ ...before, ...changed }));
    if (proposing.error) proposing.reset();
  };
  const submit = () => {
    setTried(true);
    if ("change" in outcome && reason.trim() !== "")
      proposing.send({ change: outcome.change, reason: reason.trim() });
  };
  return (
    <Sheet open kind="side" title={t("propose.title")} onClose={onClose}>
      <Form label={t("propose.title")} onSubmit={submit} errors={proposing.formErrors}>
        <Text tone="ink2">{t("propose.lead", { zone: site.zone })}</Text>
        <SelectField
          label={t("field.kind")}
          value={draft.kind}
          options={changeKinds.map((value) => ({ value, label: t(`kind.${value}.label`) }))}
          onChange={(kind) => change({ kind })}
          hint={draft.kind === null ? undefined : t(`kind.${draft.kind}.detail`)}
          error={errorOf("kind")}
          required
        />
        <KindFields
          draft={draft}
          onChange={change}
          errorOf={errorOf}
          pointId={point.id}
          format={format}
        />
        <TextField
          label={t("field.reason")}
          hint={t("field.reasonHint")}
          value={reason}
          onChange={setReason}
          error={tried && reason.trim() === "" ? t("field.needed") : proposing.fieldError("reason")}
          autoComplete="off"
          required
        />
        <Button submit full label={t("propose.send")} busy={proposing.busy} />
      </Form>
    </Sheet>
  );
}
