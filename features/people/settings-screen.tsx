import { View } from "react-native";

import { useSession } from "@features/api";
import { useWords } from "@features/i18n";
import { Card, EmptyState, ListRow, Screen, Text } from "@features/ui";

import { AccountCard } from "./account-card";
import { Answer } from "./answer";
import { peoplePaths } from "./people-paths";
import { SignOutCard } from "./sign-out-card";
import { ThemeCard } from "./theme-card";

export function SettingsScreen() {
  const t = useWords("people");
  const session = useSession();
  return (
    <Screen title={t("settings.title")} narrow>
      <Answer of={session}>
        {(me) =>
          me === null ? null : (
            <View style={{ gap: 16 }}>
              {me.role === "tenantContact" ? (
                // The statements of a tenant come with billing; until then this says so honestly.
                <EmptyState title={t("settings.tenantTitle")} detail={t("settings.tenantDetail")} />
              ) : null}
              <AccountCard session={me} />
              <ThemeCard />
              <Card pad={5} label={t("settings.access")}>
                <Text variant="heading">{t("settings.access")}</Text>
                <ListRow
                  first
                  icon="key"
                  title={t("password.title")}
                  detail={t("password.detail")}
                  href={peoplePaths.password}
                />
                {me.can.manageMembers ? (
                  <ListRow
                    icon="people"
                    title={t("members.title")}
                    detail={t("members.detail")}
                    href={peoplePaths.members}
                  />
                ) : null}
                {me.can.manageTokens ? (
                  <ListRow
                    icon="table"
                    title={t("tokens.title")}
                    detail={t("tokens.detail")}
                    href={peoplePaths.tokens}
                  />
                ) : null}
                {me.can.seeMail ? (
                  <ListRow
                    icon="mail"
                    title={t("mail.title")}
                    detail={t("mail.detail")}
                    href={peoplePaths.mail}
                  />
                ) : null}
              </Card>
              <SignOutCard session={me} />
            </View>
          )
        }
      </Answer>
    </Screen>
  );
}
