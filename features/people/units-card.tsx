import { View } from "react-native";

import type { Session } from "@shared/contracts/people";
import { useWords, type Language } from "@features/i18n";
import { Banner, Card, ChoiceTiles, Text, useToast } from "@features/ui";

import { useAccountChange } from "./use-account-change";

type Units = "site" | "si" | "inchPound";

/** How words and values are written for this account; each choice is kept at once. */
export function UnitsCard({ account }: { account: Session["account"] }) {
  const t = useWords("people");
  const toast = useToast();
  const change = useAccountChange(() => toast({ message: t("settings.saved") }));
  return (
    <Card pad={5} label={t("settings.languageTitle")}>
      <Text variant="heading" style={{ marginBottom: 12 }}>
        {t("settings.languageTitle")}
      </Text>
      <View style={{ gap: 18 }}>
        {change.formErrors.length > 0 ? (
          <Banner kind="wrong" live lead={t("settings.notSaved")}>
            {change.formErrors.join(" ")}
          </Banner>
        ) : null}
        <ChoiceTiles<Language>
          label={t("settings.language")}
          columns={2}
          value={account.language}
          choices={[
            { value: "en", label: "English" },
            { value: "de", label: "Deutsch" },
          ]}
          onChange={(language) => change.send({ language })}
        />
        <ChoiceTiles<Units>
          label={t("settings.units")}
          hint={t("settings.unitsHint")}
          value={account.unitSystem ?? "site"}
          choices={[
            {
              value: "site",
              label: t("settings.unitsSite"),
              detail: t("settings.unitsSiteDetail"),
            },
            { value: "si", label: t("settings.unitsSi"), detail: t("settings.unitsSiDetail") },
            {
              value: "inchPound",
              label: t("settings.unitsInchPound"),
              detail: t("settings.unitsInchPoundDetail"),
            },
          ]}
          onChange={(units) => change.send({ unitSystem: units === "site" ? null : units })}
        />
      </View>
    </Card>
  );
}
