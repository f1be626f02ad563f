import type { Theme } from "./theme";

/** Only browsers need global rules; see the web twin. */
export function GlobalStyle(_props: { theme: Theme }): null {
  return null;
}
