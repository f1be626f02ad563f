import { useQueryClient } from "@tanstack/react-query";
import { router } from "expo-router";

import { signOut, signOutEverywhere } from "@shared/contracts/people";
import { call, sessionQuery, useChange } from "@features/api";

import { peoplePaths } from "./people-paths";

/** Ends this session, or all of them, and forgets everything this page had read. */
export function useSignOut() {
  const client = useQueryClient();
  return useChange({
    send: (where: "here" | "everywhere") =>
      where === "here" ? call(signOut, {}) : call(signOutEverywhere, {}),
    onDone: () => {
      router.replace(peoplePaths.signIn);
      client.clear();
      client.setQueryData(sessionQuery.queryKey, null);
    },
  });
}
