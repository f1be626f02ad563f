import { View } from "react-native";
import type { BathCheck } from "@shared/contracts/evidence";
import { useEvidenceWords, useFormat } from "@features/i18n";
import { Mark, Row, Text } from "@features/ui";

type Verdicts = readonly {
  readonly code: string;
  readonly weight: BathCheck["verdicts"][number]["weight"];
  readonly values: Readonly<Record<string, string | number>>;
}[];

/** What a check comes to, in words with their marks. */
export function BathCheckVerdicts({ verdicts }: { verdicts: Verdicts }) {
  const words = useEvidenceWords(useFormat());
  const marks = { fine: "fine", look: "look", stop: "wrong" } as const;
  return (
    <View style={{ gap: 6 }}>
      {verdicts.map((verdict) => (
        <Row key={verdict.code} gap={2} align="flex-start">
          <Mark kind={marks[verdict.weight]} size={18} />
          <Text style={{ flex: 1 }}>{words.verdict(verdict)}</Text>
        </Row>
      ))}
    </View>
  );
}
