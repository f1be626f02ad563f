import { useQueryClient } from "@tanstack/react-query";

import { updateAccount } from "@shared/contracts/people";
import { call, type CallInput, sessionQuery, useChange } from "@features/api";
import { usePreferences } from "@features/i18n";

type AccountChange = NonNullable<CallInput<typeof updateAccount>["body"]>;

/** Changes the own account; language and units take effect on this screen at once. */
export function useAccountChange(onDone: () => void) {
  const client = useQueryClient();
  const { adopt } = usePreferences();
  return useChange({
    send: (body: AccountChange) => call(updateAccount, { body }),
    onDone: (session) => {
      client.setQueryData(sessionQuery.queryKey, session);
      adopt(session.account.language, session.account.unitSystem);
      onDone();
    },
    fields: ["name"],
  });
}
