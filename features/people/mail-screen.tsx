import { useQuery } from "@tanstack/react-query";
import { Linking, View } from "react-native";

import { useFormat, useWords } from "@features/i18n";
import { Card, EmptyState, Screen, Text, TextLink } from "@features/ui";

import { Answer } from "./answer";
import { peoplePaths } from "./people-paths";
import { mailQuery } from "./people-queries";

/** What the local mail fake kept: no letter leaves a development machine. */
export function MailScreen() {
  const t = useWords("people");
  const format = useFormat();
  const mail = useQuery(mailQuery);
  return (
    <Screen
      title={t("mail.title")}
      subtitle={t("mail.lead")}
      crumbs={[{ label: t("settings.title"), href: peoplePaths.settings }]}
      narrow
    >
      <Answer of={mail}>
        {(letters) =>
          letters.length === 0 ? (
            <EmptyState title={t("mail.none")} detail={t("mail.noneDetail")} />
          ) : (
            <View role="list" style={{ gap: 12 }}>
              {letters.map((letter) => (
                <View role="listitem" key={letter.id}>
                  <Card>
                    <Text variant="subhead" level={2}>
                      {letter.subject}
                    </Text>
                    <Text variant="small" tone="ink2">
                      {`${letter.to}, ${format.dateTime(Date.parse(letter.sentAt))}`}
                    </Text>
                    <Text variant="bodyWide" style={{ marginTop: 10 }}>
                      {letter.text}
                    </Text>
                    <Links text={letter.text} />
                  </Card>
                </View>
              ))}
            </View>
          )
        }
      </Answer>
    </Screen>
  );
}

/** Links of a letter as links, so a reset or an invitation can be tried with one press. */
function Links({ text }: { text: string }) {
  const links = text.match(/https?:\/\/\S+/g) ?? [];
  return links.map((link) => (
    <View key={link} style={{ marginTop: 8 }}>
      <TextLink label={link.replace(/#.*$/, "#…")} onPress={() => void Linking.openURL(link)} />
    </View>
  ));
}
