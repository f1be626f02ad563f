import { useQueryClient } from "@tanstack/react-query";

import type { Session } from "@shared/contracts/people";
import { sessionQuery } from "@features/api";

/** Takes in a new session, and first forgets what somebody before had read in this tab. */
export function useEnter(): (session: Session) => void {
  const client = useQueryClient();
  const [session] = sessionQuery.queryKey;
  return (entered) => {
    client.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== session });
    client.setQueryData(sessionQuery.queryKey, entered);
  };
}
