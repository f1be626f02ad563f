import { View } from "react-native";
import type { FileRecipe, LoggerClock } from "@shared/domain/log-files/recipe";
import type { SeriesKind } from "@shared/domain/readings/reading-columns";
import { useFormat, useWords } from "@features/i18n";
import { Card, SelectField, Text } from "@features/ui";
import { withClock, withDateOrder, withKind } from "../recipe-edits";

const ORDERS = ["dayMonthYear", "monthDayYear", "yearMonthDay"] as const;
const KINDS: readonly SeriesKind[] = ["instantaneous", "meanFromLabel", "meanToLabel"];
/** Clocks that need no further word; another one stays as it was saved. */
const PLAIN: readonly LoggerClock[] = [{ kind: "site" }, { kind: "siteStandard" }, { kind: "utc" }];

const keyOf = (clock: LoggerClock) => JSON.stringify(clock);

/** How dates are written, which clock the logger was set to, and what one row stands for. */
export function RecipeTime(props: {
  recipe: FileRecipe;
  locked: boolean;
  onChange: (recipe: FileRecipe) => void;
}) {
  const t = useWords("recipes");
  const ofImports = useWords("imports");
  const format = useFormat();
  const { recipe, locked, onChange } = props;
  const { format: written, clock } = recipe.time;
  const clocks =
    clock === null || PLAIN.some((plain) => keyOf(plain) === keyOf(clock))
      ? PLAIN
      : [...PLAIN, clock];
  const clockWords = (given: LoggerClock) => {
    if (given.kind === "fixedOffset")
      return t("edit.clockOf.fixedOffset", { hours: format.number(given.offsetMinutes / 60, 2) });
    if (given.kind === "zone") return t("edit.clockOf.zone", { zone: given.zone });
    return t(`edit.clockOf.${given.kind}`);
  };
  return (
    <Card pad={5} label={t("edit.timeTitle")}>
      <View style={{ gap: 16 }}>
        <Text variant="subhead" level={2}>
          {t("edit.timeTitle")}
        </Text>
        {written.kind === "calendar" ? (
          <SelectField
            label={t("edit.order")}
            value={written.order}
            options={ORDERS.map((value) => ({ value, label: ofImports(`columns.order.${value}`) }))}
            onChange={(order) => onChange(withDateOrder(recipe, order))}
            disabled={locked}
          />
        ) : null}
        <SelectField
          label={t("edit.clock")}
          value={clock === null ? null : keyOf(clock)}
          options={clocks.map((given) => ({ value: keyOf(given), label: clockWords(given) }))}
          onChange={(value) => {
            const chosen = clocks.find((given) => keyOf(given) === value);
            if (chosen) onChange(withClock(recipe, chosen));
          }}
          disabled={locked}
        />
        <SelectField
          label={t("edit.kind")}
          value={recipe.seriesKind}
          options={KINDS.map((value) => ({ value, label: ofImports(`columns.kind.${value}`) }))}
          onChange={(kind) => onChange(withKind(recipe, kind))}
          disabled={locked}
        />
      </View>
    </Card>
  );
}
