import { cloneElement, useSyncExternalStore, type ReactElement, type ReactNode } from "react";

/* A router that only remembers, for tests of one screen: it stands in for expo-router. */

type Params = Record<string, string | undefined>;

let params: Params = {};
const listeners = new Set<() => void>();

/** Parameters of the route under test, as its address would give them. */
export function openWith(next: Params): void {
  params = next;
  for (const listener of listeners) listener();
}

export const visited = { replace: jest.fn<void, [string]>(), push: jest.fn<void, [string]>() };

const router = {
  replace: (href: string) => visited.replace(href),
  push: (href: string) => visited.push(href),
  setParams: (next: Params) => openWith({ ...params, ...next }),
};

export const useRouter = () => router;

export function useLocalSearchParams(): Params {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => params,
  );
}

export function Link(props: {
  href: string;
  asChild?: boolean;
  "aria-label"?: string;
  children: ReactNode;
}) {
  const { href, asChild, children } = props;
  if (asChild) return cloneElement(children as ReactElement<{ href: string }>, { href });
  return (
    <a href={href} aria-label={props["aria-label"]}>
      {children}
    </a>
  );
}
