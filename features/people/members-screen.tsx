import { useQuery } from "@tanstack/react-query";
import { useState } from "react";

import { useWords } from "@features/i18n";
import { Button, Screen } from "@features/ui";

import { Answer } from "./answer";
import { InviteSheet } from "./invite-sheet";
import { MemberSheet } from "./member-sheet";
import { MembersTable } from "./members-table";
import { peoplePaths } from "./people-paths";
import { membersQuery } from "./people-queries";

/** Who belongs to the organisation, and what each may do. */
export function MembersScreen() {
  const t = useWords("people");
  const members = useQuery(membersQuery);
  const [inviting, setInviting] = useState(false);
  const [openId, setOpenId] = useState<string | null>(null);
  const open = members.data?.find(({ id }) => id === openId) ?? null;
  return (
    <Screen
      title={t("members.title")}
      crumbs={[{ label: t("settings.title"), href: peoplePaths.settings }]}
      actions={<Button icon="plus" label={t("members.invite")} onPress={() => setInviting(true)} />}
    >
      <Answer of={members}>
        {(rows) => <MembersTable members={rows} onOpen={(member) => setOpenId(member.id)} />}
      </Answer>
      {inviting ? <InviteSheet onClose={() => setInviting(false)} /> : null}
      {open ? <MemberSheet key={open.id} member={open} onClose={() => setOpenId(null)} /> : null}
    </Screen>
  );
}
