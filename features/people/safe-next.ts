/** Where to go after signing in: only a path of our own, never another site that a link names. */
export function safeNext(next: string | undefined): string {
  return next !== undefined && /^\/(?![/\\])/.test(next) ? next : "/";
}
