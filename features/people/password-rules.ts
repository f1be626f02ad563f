import { newPassword } from "@shared/contracts/people";

export type PasswordProblem = "tooShort" | "tooLong" | "notTheSame";

/** What is wrong with a new password typed twice; null when it will do. */
export function passwordProblem(password: string, again: string): PasswordProblem | null {
  if (password.length < 12) return "tooShort";
  if (!newPassword.safeParse(password).success) return "tooLong";
  return password === again ? null : "notTheSame";
}
