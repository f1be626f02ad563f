import { useWords } from "@features/i18n";
import { Card, ChoiceTiles, Text, useThemeChoice, type ThemeChoice } from "@features/ui";

/** The theme belongs to this device, not to the account: a phone in a plant room, a desk in daylight. */
export function ThemeCard() {
  const t = useWords("people");
  const { choice, choose } = useThemeChoice();
  return (
    <Card pad={5} label={t("settings.themeTitle")}>
      <Text variant="heading" style={{ marginBottom: 12 }}>
        {t("settings.themeTitle")}
      </Text>
      <ChoiceTiles<ThemeChoice>
        label={t("settings.theme")}
        labelHidden
        value={choice}
        choices={[
          {
            value: "system",
            label: t("settings.themeSystem"),
            detail: t("settings.themeSystemDetail"),
          },
          {
            value: "light",
            label: t("settings.themeLight"),
            detail: t("settings.themeLightDetail"),
          },
          {
            value: "plantRoom",
            label: t("settings.themePlantRoom"),
            detail: t("settings.themePlantRoomDetail"),
          },
        ]}
        onChange={choose}
      />
    </Card>
  );
}
