import { newSecret } from "./secrets";

/** Lets people and secret scanners recognise a token of ours in a file where it should not be. */
export const tokenPrefix = "lw_";

export function newAccessTokenSecret(): string {
  return `${tokenPrefix}${newSecret()}`;
}
