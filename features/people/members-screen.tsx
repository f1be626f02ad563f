import { useInfiniteQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { View } from "react-native";

import { Answer, useSession } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, DeniedState, EmptyState, Screen } from "@features/ui";

import { InviteSheet } from "./invite-sheet";
import { MemberSheet } from "./member-sheet";
import { MembersTable } from "./members-table";
import { peoplePaths } from "./people-paths";
import { peopleQueries } from "./people-queries";

type Open = { member?: string; invite?: string };

/** Who belongs to the organisation, and what each may do; for administrators. */
export function MembersScreen() {
  const t = useWords("people");
  const session = useSession();
  const mayManage = session.data?.can.manageMembers;
  const open = useLocalSearchParams<Open>();
  const show = (next: Open) => router.setParams({ member: next.member, invite: next.invite });
  return (
    <Screen
      title={t("members.title")}
      crumbs={[{ label: t("settings.title"), href: peoplePaths.settings }]}
      subtitle={session.data?.organisation.name}
      actions={
        mayManage ? (
          <Button icon="plus" label={t("members.invite")} onPress={() => show({ invite: "yes" })} />
        ) : null
      }
    >
      {mayManage === false ? (
        <DeniedState detail={t("members.denied")} />
      ) : mayManage ? (
        <Members open={open.member} onOpen={(member) => show({ member })} />
      ) : null}
      {mayManage && open.invite ? <InviteSheet onClose={() => show({})} /> : null}
    </Screen>
  );
}

function Members(props: { open: string | undefined; onOpen: (id: string | undefined) => void }) {
  const t = useWords("people");
  const members = useInfiniteQuery(peopleQueries.members);
  return (
    <Answer of={members} denied={t("members.denied")}>
      {({ pages }) => {
        const rows = pages.flatMap(({ items }) => items);
        const opened = rows.find(({ id }) => id === props.open);
        if (rows.length === 0) return <EmptyState title={t("members.emptyTitle")} />;
        return (
          <View style={{ gap: 16 }}>
            <MembersTable members={rows} onOpen={({ id }) => props.onOpen(id)} />
            {members.hasNextPage ? (
              <Button
                kind="second"
                label={t("members.more")}
                busy={members.isFetchingNextPage}
                onPress={() => void members.fetchNextPage()}
              />
            ) : null}
            {opened ? (
              <MemberSheet
                key={opened.id}
                member={opened}
                onClose={() => props.onOpen(undefined)}
              />
            ) : null}
          </View>
        );
      }}
    </Answer>
  );
}
