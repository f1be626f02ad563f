import { Redirect, Slot, usePathname } from "expo-router";
import { useEffect, type ReactNode } from "react";
import { View } from "react-native";

import type { Session } from "@shared/contracts/people";
import { NoAnswer, useSession } from "@features/api";
import { peoplePaths } from "@features/people/people-paths";
import { usePrefetchCharts } from "@features/charts/use-prefetch-charts";
import { usePreferences } from "@features/i18n";
import {
  ErrorState,
  LoadingBlocks,
  OfflineState,
  useBreakpoint,
  useScrollTop,
  useTheme,
} from "@features/ui";

import { BottomBar } from "./bottom-bar";
import { destinationOf, navFor } from "./nav-items";
import { OfflineBanner } from "./offline-banner";
import { Rail } from "./rail";
import { SkipLink } from "./skip-link";

/** Guard and frame of every page that needs somebody signed in. */
export function SignedInLayout() {
  const session = useSession();
  const path = usePathname();
  const { adopt } = usePreferences();
  const account = session.data?.account;
  const { language, unitSystem } = account ?? {};
  useEffect(() => {
    if (language) adopt(language, unitSystem ?? null);
  }, [adopt, language, unitSystem]);
  usePrefetchCharts(session.data?.can.seeSites === true);
  useScrollTop(path);

  if (session.data) return <Frame session={session.data} path={path} />;
  if (session.data === null) {
    return <Redirect href={peoplePaths.signInThen(askedAddress(path))} />;
  }
  return (
    <Alone>
      {session.error instanceof NoAnswer ? (
        <OfflineState sinceMs={null} onRetry={() => void session.refetch()} />
      ) : session.error ? (
        <ErrorState onRetry={() => void session.refetch()} />
      ) : (
        <LoadingBlocks />
      )}
    </Alone>
  );
}

/** The address asked for, its query too, so that a shared link opens at the same week. */
function askedAddress(path: string): string {
  return `${path}${globalThis.location?.search ?? ""}`;
}

function Alone({ children }: { children: ReactNode }) {
  return (
    <View role="main" style={{ width: "100%", maxWidth: 520, margin: "auto", padding: 16 }}>
      {children}
    </View>
  );
}

function Frame({ session, path }: { session: Session; path: string }) {
  const { colour } = useTheme();
  const size = useBreakpoint();
  const current = destinationOf(path);
  // Somebody who may see only their own account starts there.
  const home = navFor(session.role).rail[0];
  if (path === "/" && home === "settings") return <Redirect href="/settings" />;
  if (size === "phone") {
    return (
      <View style={{ flexGrow: 1, backgroundColor: colour.pad }}>
        <SkipLink />
        <OfflineBanner />
        <View style={{ flexGrow: 1 }}>
          <Slot />
        </View>
        <BottomBar session={session} current={current} />
      </View>
    );
  }
  return (
    <View style={{ flexGrow: 1, flexDirection: "row", backgroundColor: colour.pad }}>
      <SkipLink />
      <Rail session={session} current={current} narrow={size === "tablet"} />
      <View style={{ flex: 1, minWidth: 0 }}>
        <OfflineBanner />
        <View style={{ flexGrow: 1 }}>
          <Slot />
        </View>
      </View>
    </View>
  );
}
