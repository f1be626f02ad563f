import { useState } from "react";
import { View } from "react-native";

import type { Session } from "@shared/contracts/people";
import { useWords } from "@features/i18n";
import { Button, Card, DefinitionRows, Form, Text, TextField, useToast } from "@features/ui";

import { useAccountChange } from "./use-account-change";

/** Who one is here. The role and the address are an administrator's to change. */
export function NameCard({ session }: { session: Session }) {
  const t = useWords("people");
  const toast = useToast();
  const { account, organisation, role } = session;
  const [name, setName] = useState(account.name);
  const change = useAccountChange(() => toast({ message: t("settings.nameSaved") }));
  const missing = name.trim() === "";
  return (
    <Card pad={5} label={t("settings.you")}>
      <Text variant="heading" style={{ marginBottom: 12 }}>
        {t("settings.you")}
      </Text>
      <Form
        label={t("settings.nameForm")}
        onSubmit={() => {
          if (!missing && name.trim() !== account.name) change.send({ name: name.trim() });
        }}
        errors={change.formErrors}
      >
        <TextField
          label={t("field.name")}
          name="name"
          autoComplete="name"
          value={name}
          onChange={setName}
          hint={t("field.nameHint")}
          error={missing ? t("field.nameMissing") : change.fieldError("name")}
          required
        />
        {name.trim() === account.name ? null : (
          <Button submit label={t("settings.saveName")} busy={change.busy} />
        )}
      </Form>
      <View style={{ marginTop: 12 }}>
        <DefinitionRows
          label={t("settings.you")}
          rows={[
            { label: t("settings.email"), value: account.email },
            { label: t("settings.role"), value: t(`role.${role}`) },
            { label: t("settings.organisation"), value: organisation.name },
          ]}
        />
      </View>
    </Card>
  );
}
