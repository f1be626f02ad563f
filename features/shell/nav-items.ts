import type { Role } from "@shared/contracts/people";
import type { IconName } from "@features/ui";

export type Destination = "today" | "sites" | "logs" | "compare" | "kit" | "settings";

interface NavItem {
  readonly href: string;
  readonly icon: IconName;
  /** Paths that belong to it beside its own. */
  readonly also: readonly string[];
}

export const navItems: Readonly<Record<Destination, NavItem>> = {
  today: { href: "/", icon: "today", also: [] },
  sites: { href: "/sites", icon: "sites", also: ["/loops"] },
  logs: { href: "/logs", icon: "logs", also: [] },
  compare: { href: "/compare", icon: "compare", also: [] },
  kit: { href: "/kit", icon: "kit", also: [] },
  settings: { href: "/settings", icon: "settings", also: [] },
};

interface RoleNav {
  /** On the phone bar, before More. */
  readonly bar: readonly Destination[];
  /** In the More sheet; empty: no More at all. */
  readonly more: readonly Destination[];
  readonly rail: readonly Destination[];
}

/** What each role works with most stands on the bar; nothing is listed that a role cannot open. */
const byRole: Readonly<Record<Role, RoleNav>> = {
  surveyor: {
    bar: ["today", "logs", "kit"],
    more: ["sites", "compare", "settings"],
    rail: ["today", "sites", "logs", "compare", "kit", "settings"],
  },
  engineer: {
    bar: ["today", "sites", "compare", "logs"],
    more: ["kit", "settings"],
    rail: ["today", "sites", "logs", "compare", "kit", "settings"],
  },
  billingClerk: {
    bar: ["today", "sites"],
    more: ["settings"],
    rail: ["today", "sites", "settings"],
  },
  administrator: {
    bar: ["today", "sites"],
    more: ["logs", "compare", "kit", "settings"],
    rail: ["today", "sites", "logs", "compare", "kit", "settings"],
  },
  tenantContact: { bar: ["settings"], more: [], rail: ["settings"] },
};

export function navFor(role: Role): RoleNav {
  return byRole[role];
}

/** The destination a path belongs to; null on pages outside the navigation. */
export function destinationOf(path: string): Destination | null {
  if (path === "/") return "today";
  for (const [key, item] of Object.entries(navItems)) {
    const roots = item.href === "/" ? item.also : [item.href, ...item.also];
    if (roots.some((root) => path === root || path.startsWith(`${root}/`)))
      return key as Destination;
  }
  return null;
}
