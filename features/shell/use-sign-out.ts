import { useMutation, useQueryClient } from "@tanstack/react-query";
import { router } from "expo-router";

import { signOut } from "@shared/contracts/people";
import { call, sessionQuery } from "@features/api";

/** Ends this session and forgets everything it had read. */
export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => call(signOut, {}),
    onSuccess: () => {
      client.clear();
      client.setQueryData(sessionQuery.queryKey, null);
      router.replace("/sign-in");
    },
  });
}
