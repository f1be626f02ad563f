import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";

import { createAccessToken } from "@shared/contracts/people";
import { call, useChange } from "@features/api";
import { useWords } from "@features/i18n";
import { Button, ChoiceTiles, Form, Sheet, TextField } from "@features/ui";

import type { NewToken } from "./made-token";
import { peopleQueries } from "./people-queries";

const lifetimes = ["days30", "days90", "days365", "days730", "forever"] as const;
type Lifetime = (typeof lifetimes)[number];
const daysOf: Readonly<Record<Lifetime, number | null>> = {
  days30: 30,
  days90: 90,
  days365: 365,
  days730: 730,
  forever: null,
};

/** Name and life of a new token; a limited life is the default. */
export function MakeTokenSheet(props: { onMade: (token: NewToken) => void; onClose: () => void }) {
  const t = useWords("people");
  const client = useQueryClient();
  const [name, setName] = useState("");
  const [lifetime, setLifetime] = useState<Lifetime>("days90");
  const [tried, setTried] = useState(false);
  const make = useChange({
    send: () =>
      call(createAccessToken, { body: { name: name.trim(), expiresInDays: daysOf[lifetime] } }),
    onDone: (token) => {
      // The list may be slow; the secret must not wait for it.
      props.onMade(token);
      return client.invalidateQueries({ queryKey: peopleQueries.accessTokens.queryKey });
    },
    fields: ["name"],
  });
  const missing = name.trim() === "";
  const submit = () => {
    setTried(true);
    if (!missing) make.send(undefined);
  };
  return (
    <Sheet open kind="side" title={t("tokens.make")} onClose={props.onClose}>
      <Form label={t("tokens.createForm")} onSubmit={submit} errors={make.formErrors}>
        <TextField
          label={t("tokens.name")}
          name="token-name"
          autoComplete="off"
          value={name}
          onChange={setName}
          hint={t("tokens.nameHint")}
          error={tried && missing ? t("field.nameMissing") : make.fieldError("name")}
          required
        />
        <ChoiceTiles
          label={t("tokens.lifetime")}
          value={lifetime}
          choices={lifetimes.map((value) => ({ value, label: t(`tokens.${value}`) }))}
          onChange={setLifetime}
          hint={lifetime === "forever" ? t("tokens.foreverHint") : undefined}
        />
        <Button submit full label={t("tokens.make")} busy={make.busy} />
      </Form>
    </Sheet>
  );
}
