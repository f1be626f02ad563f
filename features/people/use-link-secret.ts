import { useEffect, useState } from "react";

function hashSecret(): string {
  return globalThis.location?.hash.slice(1) ?? "";
}

/**
 * The secret of a link in a letter, empty where the address has none. It stands after the `#`, so no
 * server ever sees it, and leaves the address bar at once, so that neither the history nor a shared
 * screen keeps it. A second link opened in the same tab takes the place of the first.
 */
export function useLinkSecret(): string {
  const [secret, setSecret] = useState(hashSecret);
  useEffect(() => {
    const take = () => {
      const found = hashSecret();
      if (found === "") return;
      setSecret(found);
      const { pathname, search } = globalThis.location;
      globalThis.history.replaceState(globalThis.history.state, "", `${pathname}${search}`);
    };
    take();
    globalThis.addEventListener("hashchange", take);
    return () => globalThis.removeEventListener("hashchange", take);
  }, []);
  return secret;
}
