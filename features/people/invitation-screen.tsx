import { useQuery } from "@tanstack/react-query";
import { Answer, ApiError } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Button, DefinitionRows, Text } from "@features/ui";

import { AcceptInvitationForm } from "./accept-invitation-form";
import { EntryFrame } from "./entry-frame";
import { peoplePaths } from "./people-paths";
import { peopleQueries } from "./people-queries";
import { useLinkSecret } from "./use-link-secret";

/** Where the link of an invitation leads: what it is for, then a name and a password. */
export function InvitationScreen() {
  const t = useWords("people");
  const secret = useLinkSecret();
  if (secret === "") {
    return (
      <EntryFrame title={t("invitation.title")}>
        <Banner kind="wrong" lead={t("invitation.noSecretTitle")}>
          {t("invitation.noSecret")}
        </Banner>
        <ToSignIn />
      </EntryFrame>
    );
  }
  return <OpenedInvitation key={secret} secret={secret} />;
}

/** Somebody whose link is spent has most likely accepted already. */
function ToSignIn() {
  const t = useWords("people");
  return (
    <>
      <Text tone="ink2">{t("invitation.accepted")}</Text>
      <Button kind="second" full label={t("newPassword.toSignIn")} href={peoplePaths.signIn} />
    </>
  );
}

function OpenedInvitation({ secret }: { secret: string }) {
  const t = useWords("people");
  const invitation = useQuery(peopleQueries.invitation(secret));
  const { data, error } = invitation;
  const title = data
    ? t("invitation.join", { organisation: data.organisationName })
    : t("invitation.title");
  if (isGone(error)) return <SpentInvitation />;
  return (
    <EntryFrame title={title}>
      <Answer of={invitation} loading={t("invitation.loading")}>
        {(invited) => (
          <>
            <DefinitionRows
              label={t("invitation.title")}
              rows={[
                { label: t("invitation.organisation"), value: invited.organisationName },
                { label: t("invitation.role"), value: t(`role.${invited.role}`) },
                { label: t("invitation.email"), value: invited.email },
              ]}
            />
            <Text variant="small" tone="ink2">
              {t(`roleMeans.${invited.role}`)}
            </Text>
            <AcceptInvitationForm
              secret={secret}
              email={invited.email}
              hasAccount={invited.hasAccount}
              onGone={() => void invitation.refetch()}
            />
          </>
        )}
      </Answer>
    </EntryFrame>
  );
}

function isGone(error: Error | null): boolean {
  return error instanceof ApiError && error.status === 410;
}

function SpentInvitation() {
  const t = useWords("people");
  return (
    <EntryFrame title={t("invitation.title")}>
      <Banner kind="wrong" live lead={t("invitation.goneTitle")}>
        {t("invitation.gone")}
      </Banner>
      <ToSignIn />
    </EntryFrame>
  );
}
