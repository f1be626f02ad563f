/**
 * The `code` of an error of Node.js or the connector, such as ENOENT; null where there is none. Asked
 * of the value itself: an error from another realm is no `instanceof Error`.
 */
export function errorCode(error: unknown): string | null {
  const code = typeof error === "object" && error !== null && "code" in error ? error.code : null;
  return typeof code === "string" ? code : null;
}
