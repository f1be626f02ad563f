import { useState } from "react";
import { View } from "react-native";
import type { ImportFinding } from "@shared/contracts/import-findings";
import { useFormat, useWords } from "@features/i18n";
import { Button, CheckField, Row, Text } from "@features/ui";

/** The stretches of an exclusion, each of which may stay in. */
export function FindingSpans(props: {
  finding: ImportFinding;
  title: string;
  zone: string;
  kept: readonly string[];
  onKept: (kept: readonly string[]) => void;
}) {
  const { finding, kept, onKept } = props;
  const t = useWords("findings");
  const format = useFormat(props.zone);
  const [open, setOpen] = useState(false);
  const hidden = finding.spanCount - finding.spans.length;
  const words = ({ from, to }: ImportFinding["spans"][number]) =>
    t("spans.span", {
      from: format.dateTime(Date.parse(from)),
      to:
        from.slice(0, 10) === to.slice(0, 10)
          ? format.time(Date.parse(to))
          : format.dateTime(Date.parse(to)),
    });
  return (
    <View style={{ gap: 4 }}>
      <Row gap={3} wrap>
        <Text variant="bodyWide" tone="ink2">
          {t("spans.outOf", { count: finding.spanCount - kept.length, all: finding.spanCount })}
        </Text>
        <Button
          kind="quiet"
          label={t(open ? "spans.hide" : "spans.choose")}
          onPress={() => setOpen(!open)}
        />
      </Row>
      {open ? (
        <View role="group" aria-label={t("spans.label", { title: props.title })}>
          {finding.spans.map((span) => (
            <CheckField
              key={span.from}
              label={words(span)}
              checked={!kept.includes(span.from)}
              onChange={(out) =>
                onKept(out ? kept.filter((start) => start !== span.from) : [...kept, span.from])
              }
            />
          ))}
          {hidden > 0 ? (
            <Text variant="small" tone="ink2">
              {t("spans.more", { count: hidden })}
            </Text>
          ) : null}
        </View>
      ) : null}
    </View>
  );
}
