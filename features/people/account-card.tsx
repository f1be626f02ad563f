import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";

import { updateAccount, type Session } from "@shared/contracts/people";
import { call, sessionQuery, useErrorWords, type CallInput } from "@features/api";
import { usePreferences, useWords, type Language } from "@features/i18n";
import {
  Button,
  Card,
  ChoiceTiles,
  FieldRow,
  Form,
  SelectField,
  Text,
  TextField,
  useToast,
} from "@features/ui";

type Change = NonNullable<CallInput<typeof updateAccount>["body"]>;

/** Name, language and units: language and units change at once, the name with its button. */
export function AccountCard({ session }: { session: Session }) {
  const t = useWords("people");
  const toast = useToast();
  const client = useQueryClient();
  const inWords = useErrorWords();
  const { adopt } = usePreferences();
  const { account } = session;
  const [name, setName] = useState(account.name);
  const save = useMutation({
    mutationFn: (change: Change) => call(updateAccount, { body: change }),
    onSuccess: (answer) => {
      client.setQueryData(sessionQuery.queryKey, answer);
      adopt(answer.account.language, answer.account.unitSystem);
      toast({ message: t("settings.saved") });
    },
  });
  const changed = name.trim() !== account.name && name.trim() !== "";
  return (
    <Card pad={5} label={t("settings.account")}>
      <Form
        label={t("settings.account")}
        onSubmit={() => {
          if (changed) save.mutate({ name: name.trim() });
        }}
        errors={save.error ? [inWords(save.error)] : []}
      >
        <Text variant="heading">{t("settings.account")}</Text>
        <FieldRow>
          <TextField
            label={t("field.name")}
            autoComplete="name"
            value={name}
            onChange={setName}
            error={name.trim() === "" ? t("field.nameNeeded") : null}
          />
          <TextField
            label={t("field.email")}
            value={account.email}
            onChange={() => undefined}
            disabled
          />
        </FieldRow>
        {changed ? <Button submit label={t("settings.saveName")} busy={save.isPending} /> : null}
        <SelectField<Language>
          label={t("settings.language")}
          value={account.language}
          options={[
            { value: "en", label: "English" },
            { value: "de", label: "Deutsch" },
          ]}
          onChange={(language) => save.mutate({ language })}
        />
        <ChoiceTiles<"site" | "si" | "inchPound">
          label={t("settings.units")}
          columns={3}
          value={account.unitSystem ?? "site"}
          choices={[
            { value: "site", label: t("units.site"), detail: t("units.siteDetail") },
            { value: "si", label: t("units.si"), detail: "m³/h, °C, kW, kWh" },
            { value: "inchPound", label: t("units.inchPound"), detail: "gpm, °F, ton, kBtu" },
          ]}
          onChange={(choice) => save.mutate({ unitSystem: choice === "site" ? null : choice })}
        />
      </Form>
    </Card>
  );
}
