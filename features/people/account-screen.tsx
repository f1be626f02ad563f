import { View } from "react-native";

import type { Session } from "@shared/contracts/people";
import { Answer, useSession } from "@features/api";
import { useWords } from "@features/i18n";
import { Card, EmptyState, ListRow, Screen, Text, useBreakpoint } from "@features/ui";

import { NameCard } from "./name-card";
import { peoplePaths } from "./people-paths";
import { SignOutCard } from "./sign-out-card";
import { ThemeCard } from "./theme-card";
import { UnitsCard } from "./units-card";

/** Settings: what belongs to oneself and to this device, and the way to what one manages. */
export function AccountScreen() {
  const t = useWords("people");
  const session = useSession();
  const wide = useBreakpoint() === "wide";
  const column = wide ? { flex: 1, minWidth: 0, gap: 20 } : { gap: 16 };
  return (
    <Screen title={t("settings.title")} narrow={!wide}>
      <Answer of={session}>
        {(me) =>
          // Nobody: the guard of the signed-in pages is on its way to the sign-in page.
          me === null ? null : (
            <View
              style={
                wide
                  ? { flexDirection: "row", gap: 20, alignItems: "flex-start", maxWidth: 1180 }
                  : { gap: 16 }
              }
            >
              <View style={column}>
                {me.can.seeSites ? null : (
                  <EmptyState
                    title={t("settings.nothingTitle")}
                    detail={t("settings.nothingDetail", { organisation: me.organisation.name })}
                  />
                )}
                <NameCard session={me} />
                <UnitsCard account={me.account} />
              </View>
              <View style={column}>
                <PlacesToGo can={me.can} />
                <ThemeCard />
                <SignOutCard keepsTokens={me.can.manageTokens} />
              </View>
            </View>
          )
        }
      </Answer>
    </Screen>
  );
}

function PlacesToGo({ can }: { can: Session["can"] }) {
  const t = useWords("people");
  return (
    <Card pad={5} label={t("settings.access")}>
      <Text variant="heading" style={{ marginBottom: 4 }}>
        {t("settings.access")}
      </Text>
      <ListRow
        first
        icon="key"
        title={t("settings.password")}
        detail={t("settings.passwordDetail")}
        href={peoplePaths.password}
      />
      {can.manageMembers ? (
        <ListRow
          icon="people"
          title={t("members.title")}
          detail={t("settings.membersDetail")}
          href={peoplePaths.members}
        />
      ) : null}
      {can.manageTokens ? (
        <ListRow
          icon="table"
          title={t("tokens.title")}
          detail={t("settings.tokensDetail")}
          href={peoplePaths.accessTokens}
        />
      ) : null}
      {can.seeMail ? (
        <ListRow
          icon="mail"
          title={t("mail.title")}
          detail={t("settings.mailDetail")}
          href={peoplePaths.mail}
        />
      ) : null}
    </Card>
  );
}
