import { useState } from "react";
import { View } from "react-native";
import { useFormat, useWords } from "@features/i18n";
import { Button, Card, DateField, FieldRow, NumberField, Row, Text, TextField } from "@features/ui";
import { isCounter } from "@shared/domain/log-files/column-units";
import type { ColumnRecipe, FileRecipe } from "@shared/domain/log-files/recipe";
import { useColumnName } from "./column-controls";
import { localInstant } from "./local-instant";
import { withCapacity, withExchanges } from "./recipe-edits";

interface CounterFieldsProps {
  readonly recipe: FileRecipe;
  readonly zone: string;
  readonly locked: boolean;
  readonly onChange: (recipe: FileRecipe) => void;
}

/** What a counter's numbers do not say: where it starts again, and when another meter came. */
export function CounterFields(props: CounterFieldsProps) {
  const t = useWords("imports");
  const counters = props.recipe.columns.filter(({ meaning }) => isCounter(meaning));
  if (counters.length === 0) return null;
  return (
    <Card pad={5} label={t("columns.counter.title")}>
      <View style={{ gap: 16 }}>
        <Text variant="subhead" level={2}>
          {t("columns.counter.title")}
        </Text>
        {counters.map((column) => (
          <Capacity key={column.index} {...props} column={column} />
        ))}
        <Exchanges {...props} />
      </View>
    </Card>
  );
}

/** Saved when left, so that no half-typed number is checked. */
function Capacity(props: CounterFieldsProps & { column: ColumnRecipe }) {
  const { column, recipe, locked, onChange } = props;
  const t = useWords("imports");
  const name = useColumnName();
  const stored = column.capacity ?? null;
  const [typed, setTyped] = useState({ value: stored, readable: true });
  return (
    <NumberField
      label={t("columns.counter.capacity", { column: name(column) })}
      hint={t("columns.counter.capacityHint")}
      value={typed.value}
      unit={column.unit === null ? undefined : t(`columns.unit.${column.unit}`)}
      min={1}
      disabled={locked}
      onChange={(value, readable) => setTyped({ value, readable })}
      onBlur={() => {
        if (typed.readable && typed.value !== stored)
          onChange(withCapacity(recipe, column.index, typed.value));
      }}
    />
  );
}

function Exchanges({ recipe, zone, locked, onChange }: CounterFieldsProps) {
  const t = useWords("imports");
  const format = useFormat(zone);
  const [day, setDay] = useState<string | null>(null);
  const [time, setTime] = useState("");
  const [asked, setAsked] = useState(false);
  const exchangedAt = recipe.meter?.exchangedAt ?? [];
  const instant = day === null ? null : localInstant(day, time, zone);
  const add = () => {
    setAsked(true);
    if (instant === null) return;
    onChange(withExchanges(recipe, [...exchangedAt, new Date(instant).toISOString()].sort()));
    setDay(null);
    setTime("");
    setAsked(false);
  };
  return (
    <View style={{ gap: 10 }}>
      <Text variant="label">{t("columns.counter.exchanges")}</Text>
      {exchangedAt.map((at) => (
        <Row key={at} gap={3} justify="space-between" wrap>
          <Text variant="bodyWide">{format.dateTime(Date.parse(at))}</Text>
          {locked ? null : (
            <Button
              kind="quiet"
              label={t("columns.counter.exchangeRemove", { at: format.dateTime(Date.parse(at)) })}
              onPress={() =>
                onChange(
                  withExchanges(
                    recipe,
                    exchangedAt.filter((other) => other !== at),
                  ),
                )
              }
            />
          )}
        </Row>
      ))}
      <Text variant="small" tone="ink2">
        {t("columns.counter.exchangeNote")}
      </Text>
      {locked ? null : (
        <>
          <FieldRow>
            <DateField label={t("columns.counter.exchangeDay")} value={day} onChange={setDay} />
            <TextField
              label={t("columns.counter.exchangeTime")}
              hint={t("columns.counter.exchangeTimeHint")}
              value={time}
              onChange={setTime}
              error={asked && instant === null ? t("columns.counter.exchangeTimeError") : null}
              autoComplete="off"
            />
          </FieldRow>
          <Row>
            <Button kind="second" label={t("columns.counter.exchangeAdd")} onPress={add} />
          </Row>
        </>
      )}
    </View>
  );
}
