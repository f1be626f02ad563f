import type { Member } from "@shared/contracts/people";
import { useWords } from "@features/i18n";
import { Banner, Dialog, Text } from "@features/ui";

import type { MemberChange } from "./member-change";
import { nameOf } from "./member-words";

interface MemberDialogProps {
  member: Member;
  change: MemberChange;
  busy: boolean;
  /** What the server said against it, empty while nothing. */
  refused: string;
  onConfirm: () => void;
  onClose: () => void;
}

/** Asks before what cannot be taken back: a removal, a withdrawn invitation, one's own rights. */
export function MemberDialog({ member, change, refused, ...rest }: MemberDialogProps) {
  const t = useWords("people");
  const who = { name: nameOf(member), email: member.email };
  const key =
    change.kind === "role"
      ? "selfRole"
      : change.kind === "state"
        ? "selfDisable"
        : member.state === "invited"
          ? "withdraw"
          : "remove";
  return (
    <Dialog
      open
      stop
      title={t(`members.${key}Title`, who)}
      confirmLabel={t(`members.${key}Confirm`)}
      {...rest}
    >
      <Text tone="ink2">{t(`members.${key}Detail`, who)}</Text>
      {refused ? (
        <Banner kind="wrong" live>
          {refused}
        </Banner>
      ) : null}
    </Dialog>
  );
}
