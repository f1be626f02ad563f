import { useState } from "react";
import { View } from "react-native";
import type { BatchDetail, BatchFile } from "@shared/contracts/import-batches";
import { useFormat, useWords } from "@features/i18n";
import { Button, Chip, Mark, Row, SelectField, Text } from "@features/ui";
import type { BatchActions } from "./batch-queries";

interface CellProps {
  readonly file: BatchFile;
  readonly batch: BatchDetail;
  readonly actions: BatchActions;
}

/**
 * The point of a file: found, chosen, or to be chosen. A choice is sent by its button: the keys that
 * move through a list would otherwise send every point they pass.
 */
export function PointCell({ file, batch, actions }: CellProps) {
  const t = useWords("batches");
  const found = file.pointBy
    ? t(`foundBy.${file.pointBy}`, { serial: file.loggerSerial ?? "" })
    : null;
  const doubtful = file.problems.some(({ code }) => code === "pointDoubtful");
  const { point } = file;
  const [picked, setPicked] = useState<string | null>(null);
  const chosen = picked ?? point?.id ?? null;
  const isOther = chosen !== null && chosen !== point?.id;
  const send = () =>
    chosen !== null && actions.choosePoint.send({ batchFileId: file.id, pointId: chosen });
  return (
    <View style={{ gap: 4 }}>
      {file.can.choosePoint ? (
        <SelectField
          label={t("one.choosePoint", { name: file.name })}
          labelHidden
          attention={point === null || doubtful}
          value={chosen}
          emptyLabel={t("one.pointEmpty")}
          options={batch.points.map(({ id, code, name, loopTag }) => ({
            value: id,
            label: `${loopTag} ${code} ${name}`,
          }))}
          onChange={setPicked}
        />
      ) : (
        <Text>{point ? `${point.loopTag} ${point.code}` : "—"}</Text>
      )}
      {found && !isOther ? (
        <Text variant="small" tone="ink2">
          {found}
        </Text>
      ) : null}
      {file.can.choosePoint && (isOther || (doubtful && point !== null)) ? (
        <Row>
          <Button
            kind="second"
            size="dense"
            label={t(isOther ? "one.usePoint" : "one.rightPoint")}
            busy={actions.choosePoint.busy}
            onPress={send}
          />
        </Row>
      ) : null}
    </View>
  );
}

export function StateCell({ file }: { file: BatchFile }) {
  const t = useWords("batches");
  const ofImports = useWords("imports");
  const { state } = file;
  const isAsking = state === "asking" || state === "askingPoint";
  return (
    <Chip
      tone={state === "failed" ? "wrong" : isAsking ? "look" : "plain"}
      label={state === "askingPoint" ? t("askingPoint") : ofImports(`state.${state}`)}
    />
  );
}

export function ProblemsCell({ file }: { file: BatchFile }) {
  const t = useWords("batches");
  if (file.problems.length === 0) return <Text tone="ink2">—</Text>;
  return (
    <View role="list" style={{ gap: 4 }}>
      {file.problems.map(({ code, count, detail }) => (
        <View key={code} role="listitem" style={{ flexDirection: "row", gap: 6 }}>
          <Mark
            kind={code === "failed" || code === "unreadable" ? "wrong" : "look"}
            size={18}
            silent
          />
          <View style={{ flex: 1, minWidth: 0 }}>
            <Text variant="small">{t(`problem.${code}`, { count: count ?? 0, detail })}</Text>
          </View>
        </View>
      ))}
    </View>
  );
}

/** From the first to the last day of a file's rows, in the site's zone. */
export function useSpanWords(zone: string): (file: BatchFile) => string {
  const format = useFormat(zone);
  return ({ firstInstant, lastInstant }) => {
    if (!firstInstant || !lastInstant) return "—";
    const [first, last] = [firstInstant, lastInstant].map((instant) =>
      format.date(Date.parse(instant), "dayMonthYear"),
    );
    return first === last ? `${first}` : `${first} – ${last}`;
  };
}
