import { useState } from "react";
import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { Button, Card, DateField, FieldRow, Row, Text, TextField } from "@features/ui";
import type { ClockReading, LoggerClock } from "@shared/domain/log-files/recipe";
import {
  draftOfNote,
  emptyNote,
  isEmpty,
  noteOf,
  secondOf,
  slowS,
  type NoteDraft,
} from "./clock-note";

interface ClockNotesProps {
  readonly notes: readonly ClockReading[];
  readonly clock: LoggerClock;
  readonly zone: string;
  readonly locked: boolean;
  readonly onUse: (notes: readonly ClockReading[]) => void;
}

/** What the logger's clock and a right one showed at start and end; the checks make of it what it is. */
export function ClockNotes({ notes, clock, zone, locked, onUse }: ClockNotesProps) {
  const t = useWords("findings");
  const draftAt = (index: number) => {
    const note = notes[index];
    return note ? draftOfNote(note, clock, zone) : emptyNote;
  };
  const [start, setStart] = useState(draftAt(0));
  const [end, setEnd] = useState(draftAt(1));
  const [asked, setAsked] = useState(false);
  const given = [start, end].filter((draft) => !isEmpty(draft));
  const read = given.flatMap((draft) => noteOf(draft, clock, zone) ?? []);
  const isWhole = given.length > 0 && read.length === given.length;
  if (locked && notes.length === 0) return null;
  return (
    <Card pad={5} label={t("notes.title")}>
      <Text variant="heading" level={2}>
        {t("notes.title")}
      </Text>
      <Text tone="ink2">{t("notes.why")}</Text>
      <View style={{ gap: 16, marginTop: 16 }}>
        {(["start", "end"] as const).map((which) => (
          <Note
            key={which}
            title={t(`notes.${which}`)}
            draft={which === "start" ? start : end}
            clock={clock}
            zone={zone}
            asked={asked}
            onChange={which === "start" ? setStart : setEnd}
          />
        ))}
        {locked ? null : (
          <Row gap={3} wrap>
            <Button
              kind="second"
              label={t("notes.use")}
              onPress={() => {
                setAsked(true);
                if (isWhole) onUse(read);
              }}
            />
            {notes.length > 0 ? (
              <Button
                kind="quiet"
                label={t("notes.clear")}
                onPress={() => {
                  setStart(emptyNote);
                  setEnd(emptyNote);
                  setAsked(false);
                  onUse([]);
                }}
              />
            ) : null}
          </Row>
        )}
        {notes.length > 0 ? <Text tone="ink2">{t("notes.checked")}</Text> : null}
      </View>
    </Card>
  );
}

function Note(props: {
  title: string;
  draft: NoteDraft;
  clock: LoggerClock;
  zone: string;
  asked: boolean;
  onChange: (draft: NoteDraft) => void;
}) {
  const { title, draft, onChange } = props;
  const t = useWords("findings");
  const format = useFormat(props.zone);
  const note = noteOf(draft, props.clock, props.zone);
  const slow = note === null ? null : slowS(note);
  const wrong = (typed: string) =>
    typed.trim() !== "" && secondOf(typed) === null ? t("notes.wrong") : null;
  const isPart = props.asked && !isEmpty(draft) && note === null;
  return (
    <View role="group" aria-label={title} style={{ gap: 8 }}>
      <Text variant="subhead" level={3}>
        {title}
      </Text>
      <FieldRow>
        <DateField
          label={t("notes.day")}
          value={draft.day}
          onChange={(day) => onChange({ ...draft, day })}
          error={isPart && draft.day === null ? t("notes.both") : null}
        />
        <TextField
          label={t("notes.logger")}
          value={draft.logger}
          hint={t("notes.hint")}
          error={wrong(draft.logger) ?? (isPart && draft.logger === "" ? t("notes.both") : null)}
          onChange={(logger) => onChange({ ...draft, logger })}
          autoComplete="off"
          asRead
        />
        <TextField
          label={t("notes.right")}
          value={draft.right}
          error={wrong(draft.right) ?? (isPart && draft.right === "" ? t("notes.both") : null)}
          onChange={(right) => onChange({ ...draft, right })}
          autoComplete="off"
          asRead
        />
      </FieldRow>
      <View role="status">
        {slow === null ? null : (
          <Text variant="bodyWide">
            {slow === 0
              ? t("notes.same")
              : t(slow > 0 ? "notes.slow" : "notes.fast", { by: format.duration(Math.abs(slow)) })}
          </Text>
        )}
      </View>
    </View>
  );
}
