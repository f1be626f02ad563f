import { useQuery } from "@tanstack/react-query";
import { View } from "react-native";

import { Answer, useSession } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Button, Card, DeniedState, EmptyState, Screen, Text } from "@features/ui";

import { LetterText } from "./letter-text";
import { peoplePaths } from "./people-paths";
import { peopleQueries } from "./people-queries";

/** What the local mail fake kept: in development no letter leaves the machine. */
export function CaughtMailScreen() {
  const t = useWords("people");
  const session = useSession();
  const maySee = session.data?.can.seeMail;
  return (
    <Screen
      title={t("mail.title")}
      subtitle={t("mail.detail")}
      crumbs={[{ label: t("settings.title"), href: peoplePaths.settings }]}
      narrow
    >
      {maySee === false ? <DeniedState detail={t("mail.denied")} /> : maySee ? <Letters /> : null}
    </Screen>
  );
}

function Letters() {
  const t = useWords("people");
  const format = useFormat();
  const mail = useQuery(peopleQueries.caughtMail);
  return (
    <View style={{ gap: 16 }}>
      <Button
        kind="second"
        label={t("mail.refresh")}
        busy={mail.isFetching}
        onPress={() => void mail.refetch()}
      />
      <Answer of={mail} denied={t("mail.denied")}>
        {(letters) =>
          letters.length === 0 ? (
            <EmptyState title={t("mail.emptyTitle")} detail={t("mail.emptyDetail")} />
          ) : (
            <View role="list" aria-label={t("mail.title")} style={{ gap: 12 }}>
              {letters.map((letter) => (
                <View role="listitem" key={letter.id}>
                  <Card>
                    <Text variant="subhead" level={2}>
                      {letter.subject}
                    </Text>
                    <Text variant="small" tone="ink2">
                      {t("mail.to", { address: letter.to })}
                    </Text>
                    <Text variant="small" tone="ink2">
                      {format.dateTime(Date.parse(letter.sentAt))}
                    </Text>
                    <LetterText text={letter.text} />
                  </Card>
                </View>
              ))}
            </View>
          )
        }
      </Answer>
    </View>
  );
}
