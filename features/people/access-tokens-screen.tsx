import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { View } from "react-native";

import { Answer, useSession } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, DeniedState, EmptyState, Screen } from "@features/ui";

import { AccessTokensTable } from "./access-tokens-table";
import { MadeToken, type NewToken } from "./made-token";
import { MakeTokenSheet } from "./make-token-sheet";
import { peoplePaths } from "./people-paths";
import { peopleQueries } from "./people-queries";
import { RevokeTokenDialog, type AccessToken } from "./revoke-token-dialog";

/** Bearer tokens for scripts; for administrators. */
export function AccessTokensScreen() {
  const t = useWords("people");
  const session = useSession();
  const mayManage = session.data?.can.manageTokens;
  const [making, setMaking] = useState(false);
  return (
    <Screen
      title={t("tokens.title")}
      subtitle={t("tokens.detail")}
      crumbs={[{ label: t("settings.title"), href: peoplePaths.settings }]}
      actions={
        mayManage ? (
          <Button icon="plus" label={t("tokens.make")} onPress={() => setMaking(true)} />
        ) : null
      }
    >
      {mayManage === false ? (
        <DeniedState detail={t("tokens.denied")} />
      ) : mayManage ? (
        <AccessTokens making={making} onMade={() => setMaking(false)} />
      ) : null}
    </Screen>
  );
}

function AccessTokens({ making, onMade }: { making: boolean; onMade: () => void }) {
  const t = useWords("people");
  const tokens = useQuery(peopleQueries.accessTokens);
  // The secret stands on the page, not in the sheet: a stray tap beside a sheet would lose it.
  const [made, setMade] = useState<NewToken | null>(null);
  const [going, setGoing] = useState<AccessToken | null>(null);
  return (
    <View style={{ gap: 20 }}>
      {made ? <MadeToken key={made.id} token={made} onKept={() => setMade(null)} /> : null}
      <Answer of={tokens} denied={t("tokens.denied")}>
        {(rows) =>
          rows.length === 0 ? (
            <EmptyState title={t("tokens.emptyTitle")} detail={t("tokens.emptyDetail")} />
          ) : (
            <AccessTokensTable tokens={rows} onRevoke={setGoing} />
          )
        }
      </Answer>
      {making ? (
        <MakeTokenSheet
          onMade={(token) => {
            setMade(token);
            onMade();
          }}
          onClose={onMade}
        />
      ) : null}
      {going ? (
        <RevokeTokenDialog
          token={going}
          onRevoked={() => {
            // A secret that no longer opens anything must not be copied any more.
            if (made?.id === going.id) setMade(null);
          }}
          onClose={() => setGoing(null)}
        />
      ) : null}
    </View>
  );
}
