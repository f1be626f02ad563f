import { View } from "react-native";
import type { SizedBudget } from "@shared/contracts/evidence";
import { useEvidenceWords, useWords, type Format } from "@features/i18n";
import { Text, useTheme } from "@features/ui";

/** The terms of a budget, largest first, each with why it has its size. */
export function BudgetList({ budget, format }: { budget: SizedBudget; format: Format }) {
  const t = useWords("installation");
  const { at, expandedPercent, terms } = budget;
  const largest = Math.max(...terms.map(({ percent }) => percent ?? 0));
  return (
    <View style={{ gap: 8 }}>
      {expandedPercent === null ? (
        <Text tone="ink2">{t("budget.cannot")}</Text>
      ) : (
        <Text>{t("budget.total", { percent: format.number(expandedPercent, 1) })}</Text>
      )}
      <Text variant="small" tone="ink3">
        {t("budget.at", {
          deltaT: format.withUnit(at.deltaTK, "temperatureDifference", 1),
          deltaTFrom: t(`budget.from.${at.deltaTFrom}`),
          velocity: format.withUnit(at.velocityMPerS, "velocity", 2),
          velocityFrom: t(`budget.from.${at.velocityFrom}`),
        })}
      </Text>
      <View role="list" aria-label={t("budget.title")}>
        {terms.map((term) => (
          <BudgetRow key={term.kind} term={term} largest={largest} format={format} />
        ))}
      </View>
    </View>
  );
}

function BudgetRow(props: { term: SizedBudget["terms"][number]; largest: number; format: Format }) {
  const t = useWords("installation");
  const terms = useWords("workings");
  const { colour } = useTheme();
  const words = useEvidenceWords(props.format);
  const { term, largest, format } = props;
  const share = term.percent === null || largest === 0 ? 0 : term.percent / largest;
  return (
    <View
      role="listitem"
      style={{ paddingVertical: 8, borderTopWidth: 1, borderTopColor: colour.rule, gap: 2 }}
    >
      <View style={{ flexDirection: "row", justifyContent: "space-between", gap: 12 }}>
        <Text variant="strongSmall" style={{ flex: 1 }}>
          {terms(`budget.term.${term.kind}`)}
        </Text>
        <Text variant="table">
          {term.percent === null
            ? "—"
            : t("budget.percent", { percent: format.number(term.percent, 2) })}
        </Text>
      </View>
      <View
        aria-hidden
        style={{
          height: 4,
          width: `${Math.max(1, 100 * share)}%`,
          borderRadius: 2,
          backgroundColor: term.nature === "systematic" ? colour.ink : colour.slate,
        }}
      />
      <Text variant="small" tone="ink2">
        {words.origin(term.origin)}
      </Text>
      {term.origin.from === "default" ? null : (
        <Text variant="small" tone="ink3">
          {t(`budget.origin.${term.origin.from}`)}
        </Text>
      )}
    </View>
  );
}
