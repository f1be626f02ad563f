import { View } from "react-native";

import { useWords, type Format } from "@features/i18n";
import { Divider, LoopTag, Mark, Row, Text, TextLink, useTheme, type MarkKind } from "@features/ui";

import { useFindingWords, type Finding } from "./finding-words";
import { tagService } from "./tag-service";
import { linkPath } from "./today-paths";

const marks = { stop: "wrong", look: "look", note: "note" } as const satisfies Record<
  Finding["weight"],
  MarkKind
>;

/** What needs a look, in sentences, the gravest first. */
export function FindingsList({
  findings,
  format,
}: {
  findings: readonly Finding[];
  format: Format;
}) {
  const t = useWords("today");
  const words = useFindingWords(format);
  const { colour } = useTheme();
  return (
    <View>
      <Text variant="heading" level={2} style={{ marginBottom: 8 }}>
        {t("needsALook")}
      </Text>
      <Divider strong />
      {findings.length === 0 ? (
        <Row gap={3} align="flex-start" style={{ paddingVertical: 16 }}>
          <Mark kind="fine" silent />
          <View style={{ flex: 1, minWidth: 0 }}>
            <Text variant="subhead" level={3}>
              {t("nothing.title")}
            </Text>
            <Text tone="ink2">{t("nothing.detail")}</Text>
          </View>
        </Row>
      ) : (
        <View role="list" aria-label={t("needsALook")}>
          {findings.map((finding, index) => {
            const { title, detail } = words(finding);
            return (
              <View
                role="listitem"
                key={`${finding.code} ${finding.loop?.id ?? ""} ${linkPath(finding.link)}`}
                style={{
                  flexDirection: "row",
                  gap: 12,
                  paddingVertical: 16,
                  borderTopWidth: index === 0 ? 0 : 1,
                  borderTopColor: colour.rule,
                }}
              >
                <View style={{ marginTop: 1 }}>
                  <Mark kind={marks[finding.weight]} />
                </View>
                <View style={{ flex: 1, minWidth: 0 }}>
                  <Text variant="subhead" level={3}>
                    {title}
                  </Text>
                  <Text tone="ink2" style={{ marginTop: 3, marginBottom: 8 }}>
                    {detail}
                  </Text>
                  <Row justify="space-between" wrap>
                    {finding.loop ? (
                      <LoopTag
                        tag={finding.loop.tag}
                        service={tagService(finding.loop.service)}
                        size="s"
                      />
                    ) : (
                      <View />
                    )}
                    <TextLink
                      label={t(`open.${finding.link.to}`)}
                      said={`${t(`open.${finding.link.to}`)}: ${title}`}
                      href={linkPath(finding.link)}
                    />
                  </Row>
                </View>
              </View>
            );
          })}
        </View>
      )}
    </View>
  );
}
