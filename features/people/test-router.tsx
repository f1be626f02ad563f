import { cloneElement, useSyncExternalStore, type ReactElement, type ReactNode } from "react";

/* A router that only remembers, for tests of one screen: it stands in for expo-router. */

type Query = Record<string, string | undefined>;

let query: Query = {};
const listeners = new Set<() => void>();

/** Sets the query of the page under test, as the address bar would. */
export function openWith(next: Query): void {
  query = next;
  for (const listener of listeners) listener();
}

export const visited = { replace: jest.fn<void, [string]>(), redirect: jest.fn<void, [string]>() };

export const router = {
  replace: (href: string) => visited.replace(href),
  setParams: (next: Query) => openWith({ ...query, ...next }),
};

export function useLocalSearchParams(): Query {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => query,
  );
}

export function Redirect({ href }: { href: string }): null {
  visited.redirect(href);
  return null;
}

export function Link(props: { href: string; asChild?: boolean; children: ReactNode }) {
  const { href, asChild, children } = props;
  if (asChild) return cloneElement(children as ReactElement<{ href: string }>, { href });
  return <a href={href}>{children}</a>;
}
