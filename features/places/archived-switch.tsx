import { useRouter } from "expo-router";
import { useWords } from "@features/i18n";
import { CheckField } from "@features/ui";

/** Shows archived things among the others; kept in the address, so it survives a reload. */
export function ArchivedSwitch({ shown }: { shown: boolean }) {
  const t = useWords("places");
  const router = useRouter();
  return (
    <CheckField
      label={t("archive.show")}
      checked={shown}
      onChange={(next) => router.setParams({ archived: next ? "yes" : "" })}
    />
  );
}
