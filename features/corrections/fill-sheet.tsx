import { useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { proposeFill, type Fill } from "@shared/contracts/corrections";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Banner,
  Button,
  ChoiceTiles,
  Form,
  SelectField,
  Sheet,
  Text,
  TextField,
  useToast,
} from "@features/ui";
import type { Format } from "@shared/formats/format";
import type { PlaceProps } from "./corrections-screen";
import { correctionsQueries } from "./corrections-queries";

interface FillSheetProps extends PlaceProps {
  from: string;
  to: string;
  format: Format;
  onClose: () => void;
}

const longestLineMs = 3_600_000;

/** How one gap is to be filled. What comes of it is a proposal until somebody approves it. */
export function FillSheet(props: FillSheetProps) {
  const { site, point, from, to, format, onClose } = props;
  const t = useWords("corrections");
  const toast = useToast();
  const client = useQueryClient();
  const [method, setMethod] = useState<Fill["method"] | null>(null);
  const [otherPointId, setOther] = useState<string | null>(null);
  const [reason, setReason] = useState("");
  const [tried, setTried] = useState(false);
  const others = useQuery({
    ...correctionsQueries.otherPoints(site.id, point.id),
    enabled: method === "otherPoint",
  });
  const proposing = useChange({
    send: (body: {
      from: string;
      to: string;
      method: Fill["method"];
      otherPointId?: string;
      reason: string;
    }) => call(proposeFill, { params: { pointId: point.id }, body }),
    onDone: async () => {
      await client.invalidateQueries();
      toast({ message: t("fills.done") });
      onClose();
    },
    fields: ["method", "otherPointId", "reason"],
  });
  const isShort = Date.parse(to) - Date.parse(from) <= longestLineMs;
  const methods = (["interpolation", "likeDays", "otherPoint"] as const).filter(
    (value) => isShort || value !== "interpolation",
  );
  const needsOther = method === "otherPoint" && otherPointId === null;
  const submit = () => {
    setTried(true);
    if (method === null || needsOther || reason.trim() === "") return;
    const other = method === "otherPoint" && otherPointId !== null ? { otherPointId } : {};
    proposing.send({ from, to, method, ...other, reason: reason.trim() });
  };
  const at = (instant: string) => format.dateTime(Date.parse(instant));
  return (
    <Sheet open kind="side" title={t("fills.sheet")} onClose={onClose}>
      <Form label={t("fills.sheet")} onSubmit={submit} errors={proposing.formErrors}>
        <Text tone="ink2">{t("when.span", { from: at(from), to: at(to) })}</Text>
        <ChoiceTiles
          label={t("fills.method")}
          value={method}
          choices={methods.map((value) => ({
            value,
            label: t(`method.${value}.label`),
            detail: t(`method.${value}.detail`),
          }))}
          onChange={(picked) => {
            setMethod(picked);
            proposing.reset();
          }}
          error={tried && method === null ? t("field.needed") : proposing.fieldError("method")}
          required
        />
        {method !== "otherPoint" ? null : others.data?.length === 0 ? (
          <Banner kind="look">{t("fills.noOthers")}</Banner>
        ) : (
          <SelectField
            label={t("fills.other")}
            value={otherPointId}
            options={(others.data ?? []).map(({ id, code, loopTag }) => ({
              value: id,
              label: `${loopTag} ${code}`,
            }))}
            onChange={setOther}
            error={tried && needsOther ? t("field.needed") : proposing.fieldError("otherPointId")}
            required
          />
        )}
        <TextField
          label={t("field.reason")}
          value={reason}
          onChange={setReason}
          error={tried && reason.trim() === "" ? t("field.needed") : proposing.fieldError("reason")}
          autoComplete="off"
          required
        />
        <Button submit full label={t("fills.send")} busy={proposing.busy} />
      </Form>
    </Sheet>
  );
}
