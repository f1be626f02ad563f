import { View } from "react-native";
import type { Verdict } from "@shared/contracts/evidence";
import { useEvidenceWords, useWords, type Format } from "@features/i18n";
import { Mark, Row, Text } from "@features/ui";

const marks = { fine: "fine", look: "look", stop: "wrong" } as const;

/** What was found, in words, with what it does to the figures. */
export function VerdictList(props: {
  verdicts: readonly Verdict[];
  format: Format;
  /** Only these checks; all where left out. */
  of?: readonly Verdict["check"][];
  live?: boolean;
}) {
  const t = useWords("evidence");
  const terms = useWords("workings");
  const words = useEvidenceWords(props.format);
  const shown = props.verdicts.filter(({ check }) => !props.of || props.of.includes(check));
  const adds = ({ adds: effect }: Verdict) => {
    if (effect === null) return "";
    return effect.kind === "term"
      ? t("adds.term", { term: terms(`budget.term.${effect.term}`) })
      : t(`adds.${effect.blocks}`);
  };
  return (
    <View role={props.live ? "status" : undefined} style={{ gap: 8 }}>
      {shown.map((verdict) => (
        <Row key={verdict.code} gap={2} align="flex-start">
          <Mark kind={marks[verdict.weight]} size={18} />
          <Text style={{ flex: 1, minWidth: 0 }}>
            {[words.verdict(verdict), adds(verdict)].filter(Boolean).join(" ")}
          </Text>
        </Row>
      ))}
    </View>
  );
}
