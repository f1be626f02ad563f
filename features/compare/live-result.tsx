import { View } from "react-native";
import type { MeterComparisonResult } from "@shared/contracts/meter-comparisons";
import { ApiError, FailedAnswer, useErrorWords } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Banner, Card, MarkedText, Text } from "@features/ui";
import { verdictMarks } from "./compare-words";
import { ComparisonResult } from "./comparison-result";
import type { MissingPart } from "./comparison-values";

/** What comes of the form as it stands: the result, or what is missing or wrong. */
export function LiveResult(props: {
  missing: readonly MissingPart[];
  result: MeterComparisonResult | undefined;
  error: Error | null;
  consentBy: string | null;
  onRetry: () => void;
}) {
  const t = useWords("compare");
  return (
    <Card label={t("result.title")}>
      <Content {...props} />
    </Card>
  );
}

/** The verdict in a word, where the whole result is out of sight below the form. */
export function LiveVerdict({ result }: { result: MeterComparisonResult }) {
  const t = useWords("compare");
  const format = useFormat();
  const { verdict, energy } = result;
  const words = t(`verdictShort.${verdict}`);
  const en = energy.en === null ? "" : `, ${t("result.en")} ${format.number(energy.en, 2)}`;
  return (
    <View style={{ width: "100%" }}>
      <MarkedText kind={verdictMarks[verdict]}>{`${words}${en}`}</MarkedText>
    </View>
  );
}

function Content(props: Parameters<typeof LiveResult>[0]) {
  const t = useWords("compare");
  const inWords = useErrorWords();
  const { missing, result, error } = props;
  if (missing.length > 0)
    return (
      <View style={{ gap: 6 }}>
        <Text tone="ink2">{t("result.waiting")}</Text>
        <View role="list" style={{ gap: 4 }}>
          {missing.map((part) => (
            <View key={part} role="listitem">
              <Text>– {t(`result.missing.${part}`)}</Text>
            </View>
          ))}
        </View>
      </View>
    );
  if (error instanceof ApiError && error.status === 422)
    return (
      <Banner kind="look" live lead={t("result.cannot")}>
        {inWords(error)}
      </Banner>
    );
  if (error !== null) return <FailedAnswer error={error} onRetry={props.onRetry} />;
  if (result === undefined) return <Text tone="ink2">{t("result.working")}</Text>;
  return <ComparisonResult result={result} consentBy={props.consentBy} />;
}
