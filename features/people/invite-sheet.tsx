import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";

import { inviteMember, type Role } from "@shared/contracts/people";
import { call, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, ChoiceTiles, Form, Sheet, TextField, useToast } from "@features/ui";

import { membersQuery } from "./people-queries";
import { useRoleChoices } from "./role-choices";

export function InviteSheet({ onClose }: { onClose: () => void }) {
  const t = useWords("people");
  const toast = useToast();
  const client = useQueryClient();
  const inWords = useErrorWords();
  const choices = useRoleChoices();
  const [email, setEmail] = useState("");
  const [role, setRole] = useState<Role | null>(null);
  const [tried, setTried] = useState(false);
  const invite = useMutation({
    mutationFn: (body: { email: string; role: Role }) => call(inviteMember, { body }),
    onSuccess: async (member) => {
      await client.invalidateQueries(membersQuery);
      toast({ message: t("members.invitationSent", { email: member.email }) });
      onClose();
    },
  });
  const submit = () => {
    setTried(true);
    if (email.trim() !== "" && role && !invite.isPending)
      invite.mutate({ email: email.trim(), role });
  };
  return (
    <Sheet open kind="side" title={t("members.invite")} onClose={onClose}>
      <Form
        label={t("members.invite")}
        onSubmit={submit}
        errors={invite.error ? [inWords(invite.error)] : []}
      >
        <TextField
          label={t("field.email")}
          kind="email"
          autoFocus
          value={email}
          onChange={setEmail}
          hint={t("members.inviteHint")}
          error={tried && email.trim() === "" ? t("field.emailNeeded") : null}
          required
        />
        <ChoiceTiles
          label={t("field.role")}
          value={role}
          choices={choices}
          onChange={setRole}
          error={tried && role === null ? t("field.roleNeeded") : null}
          required
        />
        <Button submit full label={t("members.sendInvitation")} busy={invite.isPending} />
      </Form>
    </Sheet>
  );
}
