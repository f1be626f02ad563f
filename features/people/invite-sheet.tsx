import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";

import { inviteMember, type Role } from "@shared/contracts/people";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, ChoiceTiles, Form, Sheet, Text, TextField, useToast } from "@features/ui";

import { emailProblem } from "./email-problem";
import { peopleQueries } from "./people-queries";
import { useRoleChoices } from "./role-choices";

/** An address and a role; the role has no default, because it decides what somebody sees. */
export function InviteSheet({ onClose }: { onClose: () => void }) {
  const t = useWords("people");
  const toast = useToast();
  const client = useQueryClient();
  const choices = useRoleChoices();
  const [email, setEmail] = useState("");
  const [role, setRole] = useState<Role | null>(null);
  const [tried, setTried] = useState(false);
  const invite = useChange({
    send: (body: { email: string; role: Role }) => call(inviteMember, { body }),
    onDone: async (member) => {
      await client.invalidateQueries({ queryKey: peopleQueries.members.queryKey });
      toast({ message: t("members.sent", { email: member.email }) });
      onClose();
    },
    fields: ["email", "role"],
  });
  const problem = emailProblem(email);
  const submit = () => {
    setTried(true);
    if (problem === null && role !== null) invite.send({ email: email.trim(), role });
  };
  return (
    <Sheet open kind="side" title={t("members.invite")} onClose={onClose}>
      <Form label={t("members.inviteForm")} onSubmit={submit} errors={invite.formErrors}>
        <Text tone="ink2">{t("members.inviteLead")}</Text>
        <TextField
          label={t("field.email")}
          kind="email"
          name="invited-email"
          autoComplete="off"
          value={email}
          onChange={setEmail}
          error={tried && problem ? t(`field.${problem}`) : invite.fieldError("email")}
          required
        />
        <ChoiceTiles
          label={t("members.role")}
          value={role}
          choices={choices}
          onChange={setRole}
          error={tried && role === null ? t("members.roleMissing") : invite.fieldError("role")}
          required
        />
        <Button submit full label={t("members.send")} busy={invite.busy} />
      </Form>
    </Sheet>
  );
}
