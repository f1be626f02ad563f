import type { Config } from "@server/config";

/**
 * Demo accounts have passwords that lie in a file and on a screen. In production they stay shut even
 * where a database came from a demonstration.
 */
export function demoAccountsAllowed({ mode }: Pick<Config, "mode">): boolean {
  return mode !== "production";
}
