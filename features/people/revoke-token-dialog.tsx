import { useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";

import { revokeAccessToken, type accessToken } from "@shared/contracts/people";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Banner, Dialog, Text, useToast } from "@features/ui";

import { peopleQueries } from "./people-queries";

export type AccessToken = z.infer<typeof accessToken>;

/** Asks before a token ends, because it cannot be brought back. */
export function RevokeTokenDialog(props: {
  token: AccessToken;
  onRevoked: () => void;
  onClose: () => void;
}) {
  const { token, onRevoked, onClose } = props;
  const t = useWords("people");
  const toast = useToast();
  const client = useQueryClient();
  const revoke = useChange({
    send: () => call(revokeAccessToken, { params: { tokenId: token.id } }),
    onDone: async () => {
      await client.invalidateQueries({ queryKey: peopleQueries.accessTokens.queryKey });
      toast({ message: t("tokens.revoked", { name: token.name }) });
      onRevoked();
      onClose();
    },
  });
  return (
    <Dialog
      open
      stop
      title={t("tokens.revokeTitle", { name: token.name })}
      confirmLabel={t("tokens.revoke")}
      busy={revoke.busy}
      onConfirm={() => revoke.send(undefined)}
      onClose={onClose}
    >
      <Text tone="ink2">{t("tokens.revokeDetail")}</Text>
      {revoke.formErrors.length > 0 ? (
        <Banner kind="wrong" live>
          {revoke.formErrors.join(" ")}
        </Banner>
      ) : null}
    </Dialog>
  );
}
