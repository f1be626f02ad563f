import { useState } from "react";

/** The secret of a link in a letter: it stands after the `#`, so no server log ever holds it. */
export function useLinkSecret(): string {
  const [secret] = useState(() => globalThis.location?.hash.slice(1) ?? "");
  return secret;
}
