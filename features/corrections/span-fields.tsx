import { minuteOf, type WallTime } from "@shared/domain/time/wall-time";
import { useWords } from "@features/i18n";
import { DateField, FieldRow, SwitchField, TextField } from "@features/ui";
import type { ChangeDraft } from "./change-draft";

export interface DraftProps {
  readonly draft: ChangeDraft;
  readonly onChange: (changed: Partial<ChangeDraft>) => void;
  /** What is wrong at a field, once somebody tried to send it. */
  readonly errorOf: (field: keyof ChangeDraft) => string | null;
}

/** From when to when, by the site's clock; the end may stay open. */
export function SpanFields({ draft, onChange, errorOf }: DraftProps) {
  const t = useWords("corrections");
  return (
    <>
      <WallTimeFields
        day={t("field.fromDay")}
        time={t("field.fromTime")}
        value={draft.from}
        error={errorOf("from")}
        onChange={(from) => onChange({ from })}
      />
      <SwitchField
        label={t("field.openEnd")}
        on={draft.openEnd}
        onChange={(openEnd) => onChange({ openEnd })}
      />
      {draft.openEnd ? null : (
        <WallTimeFields
          day={t("field.toDay")}
          time={t("field.toTime")}
          value={draft.to}
          error={errorOf("to")}
          onChange={(to) => onChange({ to })}
        />
      )}
    </>
  );
}

export function WallTimeFields(props: {
  day: string;
  time: string;
  value: WallTime;
  error: string | null;
  onChange: (value: WallTime) => void;
}) {
  const t = useWords("corrections");
  const { value, error } = props;
  const timeWrong = value.time.trim() !== "" && minuteOf(value.time) === null;
  return (
    <FieldRow>
      <DateField
        label={props.day}
        value={value.day}
        onChange={(day) => props.onChange({ ...value, day })}
        error={value.day === null ? error : null}
        required
      />
      <TextField
        label={props.time}
        value={value.time}
        onChange={(time) => props.onChange({ ...value, time })}
        error={error !== null && minuteOf(value.time) === null ? t("field.timeWrong") : null}
        hint={timeWrong && error === null ? t("field.timeWrong") : undefined}
        autoComplete="off"
        asRead
        required
      />
    </FieldRow>
  );
}
