import { useMutation, useQueryClient } from "@tanstack/react-query";
import { router } from "expo-router";

import { signOut, signOutEverywhere } from "@shared/contracts/people";
import { call, sessionQuery } from "@features/api";

/** Ends this session, or all of them, and forgets everything this page had read. */
export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (where: "here" | "everywhere") =>
      where === "here" ? call(signOut, {}) : call(signOutEverywhere, {}),
    onSuccess: () => {
      client.clear();
      client.setQueryData(sessionQuery.queryKey, null);
      router.replace("/sign-in");
    },
  });
}
