import { email } from "@shared/contracts/people";

/** Why a typed address cannot be one; null when it can. */
export function emailProblem(text: string): "emailMissing" | "emailWrong" | null {
  if (text.trim() === "") return "emailMissing";
  return email.safeParse(text.trim()).success ? null : "emailWrong";
}
