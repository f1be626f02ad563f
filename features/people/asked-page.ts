/** Any origin will do: a path of our own keeps it. */
const here = "https://here.invalid";

/**
 * Where to go after signing in: only a path of this site, never another site that a link names,
 * and not the sign-in page again. Anything else becomes `/`.
 */
export function askedPage(then: string | undefined): string {
  // Browsers skip tabs and line ends, and read a backslash as a slash: `/<tab>/host` is a host too.
  const path = (then ?? "").replace(/[\t\n\r]/g, "").replace(/\\/g, "/");
  if (!/^\/(?!\/)/.test(path)) return "/";
  const asked = new URL(path, here);
  // `/.//host` is a path when read, but what is left of it names a host.
  if (asked.pathname.startsWith("//") || asked.pathname === "/sign-in") return "/";
  return `${asked.pathname}${asked.search}${asked.hash}`;
}
