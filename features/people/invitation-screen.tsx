import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { router } from "expo-router";
import { useState } from "react";

import { acceptInvitation } from "@shared/contracts/people";
import { call, sessionQuery, useErrorWords } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, Form, Text, TextField, TextLink } from "@features/ui";

import { Answer } from "./answer";
import { EntryFrame } from "./entry-frame";
import { useLinkSecret } from "./link-secret";
import { NewPasswordFields } from "./new-password-fields";
import { passwordProblem } from "./password-rules";
import { peoplePaths } from "./people-paths";
import { invitationQuery } from "./people-queries";

/** Where the link of an invitation leads: what it is for, then a name and a password. */
export function InvitationScreen() {
  const t = useWords("people");
  const secret = useLinkSecret();
  const invitation = useQuery({ ...invitationQuery(secret), enabled: secret !== "" });
  return (
    <EntryFrame title={t("invitation.title")} heading={t("invitation.title")}>
      {secret === "" ? (
        <Banner kind="wrong" lead={t("entry.linkBroken")}>
          {t("entry.linkBrokenDetail")}
        </Banner>
      ) : (
        <Answer of={invitation}>
          {(what) => (
            <>
              <Text tone="ink2">
                {t("invitation.lead", {
                  organisation: what.organisationName,
                  role: t(`role.${what.role}`),
                  email: what.email,
                })}
              </Text>
              <AcceptForm secret={secret} hasAccount={what.hasAccount} />
            </>
          )}
        </Answer>
      )}
      <TextLink label={t("entry.backToSignIn")} href={peoplePaths.signIn} />
    </EntryFrame>
  );
}

function AcceptForm({ secret, hasAccount }: { secret: string; hasAccount: boolean }) {
  const t = useWords("people");
  const inWords = useErrorWords();
  const client = useQueryClient();
  const [name, setName] = useState("");
  const [password, setPassword] = useState("");
  const [again, setAgain] = useState("");
  const [tried, setTried] = useState(false);
  const accept = useMutation({
    mutationFn: () => call(acceptInvitation, { body: { secret, name: name.trim(), password } }),
    onSuccess: (session) => {
      client.setQueryData(sessionQuery.queryKey, session);
      router.replace("/");
    },
  });
  // Somebody with an account proves it with the password they have; it is typed once.
  const ready = hasAccount ? password.length > 0 : passwordProblem(password, again) === null;
  const submit = () => {
    setTried(true);
    if (ready && name.trim() !== "" && !accept.isPending) accept.mutate();
  };
  return (
    <Form
      label={t("invitation.title")}
      onSubmit={submit}
      errors={accept.error ? [inWords(accept.error)] : []}
    >
      <TextField
        label={t("field.name")}
        autoComplete="name"
        value={name}
        onChange={setName}
        error={tried && name.trim() === "" ? t("field.nameNeeded") : null}
        required
      />
      {hasAccount ? (
        <TextField
          label={t("field.password")}
          kind="password"
          autoComplete="current-password"
          value={password}
          onChange={setPassword}
          hint={t("invitation.hasAccount")}
          error={tried && password === "" ? t("field.passwordNeeded") : null}
          required
        />
      ) : (
        <NewPasswordFields
          password={password}
          again={again}
          onPassword={setPassword}
          onAgain={setAgain}
          tried={tried}
        />
      )}
      <Button submit full label={t("invitation.do")} busy={accept.isPending} />
    </Form>
  );
}
