import { newPassword } from "@shared/contracts/people";

const LEAST_CHARACTERS = 12;

/** Why a password cannot be a new one; null when it can. The server has the last word. */
export function passwordProblem(password: string): "passwordShort" | "passwordLong" | null {
  if (password.length < LEAST_CHARACTERS) return "passwordShort";
  return newPassword.safeParse(password).success ? null : "passwordLong";
}
