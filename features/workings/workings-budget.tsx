import { View } from "react-native";

import type { BudgetText } from "@shared/workings/budget-text";
import { Inline, Text, useTheme, VisuallyHidden } from "@features/ui";

import { Ruled } from "./workings-section";

const barWidth = 84;

/** Where the ± comes from: a bar a term, largest first, then their sum and what k makes of it. */
export function BudgetRows({ budget }: { budget: BudgetText }) {
  const { colour } = useTheme();
  return (
    <View>
      <View role="list" aria-label={budget.title}>
        {budget.rows.map((row) => (
          <Ruled key={row.key} role="listitem">
            <View style={{ flex: 1, minWidth: 0 }}>
              <Text variant="bodyWide">
                {row.label}{" "}
                <Inline variant="unit" tone="ink3">
                  {row.detail}
                </Inline>
              </Text>
              <VisuallyHidden>{row.nature}</VisuallyHidden>
            </View>
            <View aria-hidden style={{ width: barWidth }}>
              <View
                style={{
                  width: Math.max(1.5, row.share * barWidth),
                  height: 8,
                  backgroundColor: colour.ink,
                }}
              />
            </View>
            <View style={{ minWidth: 54, alignItems: "flex-end" }}>
              <Text variant="figureS">{row.percent}</Text>
            </View>
          </Ruled>
        ))}
      </View>
      <Ruled strong>
        <View style={{ flex: 1 }}>
          <Text variant="figureS">{budget.together.label}</Text>
        </View>
        <Text variant="figureS">{budget.together.value}</Text>
      </Ruled>
      <Ruled>
        <View style={{ flex: 1 }}>
          <Text variant="bodyWide">{budget.times.label}</Text>
        </View>
        <Text variant="figureS">{budget.times.value}</Text>
      </Ruled>
      {budget.notes.map((note) => (
        <Text key={note} variant="small" tone="ink2">
          {note}
        </Text>
      ))}
    </View>
  );
}
