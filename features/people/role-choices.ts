import { role, type Role } from "@shared/contracts/people";
import { useWords } from "@features/i18n";
import type { Choice } from "@features/ui";

/** The five roles, each with what it may do in one sentence. */
export function useRoleChoices(): Choice<Role>[] {
  const t = useWords("people");
  return role.options.map((value) => ({
    value,
    label: t(`role.${value}`),
    detail: t(`roleMeans.${value}`),
  }));
}
