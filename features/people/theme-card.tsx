import { useWords } from "@features/i18n";
import { Card, ChoiceTiles, Text, useThemeChoice, type ThemeChoice } from "@features/ui";

/** The theme belongs to this device, not to the account: a phone in a plant room, a desk in daylight. */
export function ThemeCard() {
  const t = useWords("people");
  const { choice, choose } = useThemeChoice();
  return (
    <Card pad={5} label={t("theme.title")}>
      <Text variant="heading" style={{ marginBottom: 12 }}>
        {t("theme.title")}
      </Text>
      <ChoiceTiles<ThemeChoice>
        label={t("theme.label")}
        labelHidden
        columns={3}
        value={choice}
        choices={[
          { value: "system", label: t("theme.system"), detail: t("theme.systemDetail") },
          { value: "light", label: t("theme.light"), detail: t("theme.lightDetail") },
          { value: "plantRoom", label: t("theme.plantRoom"), detail: t("theme.plantRoomDetail") },
        ]}
        onChange={choose}
      />
    </Card>
  );
}
