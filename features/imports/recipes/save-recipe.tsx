import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import type { ImportDetail, ImportFile } from "@shared/contracts/imports";
import { useSession } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Button,
  Form,
  LoadingBlocks,
  Sheet,
  SwitchField,
  Text,
  TextField,
  useToast,
} from "@features/ui";
import { recipeQueries, useSaveRecipe } from "./recipe-queries";

/** Keeps what was answered about a file for the next one of its logger. */
export function SaveRecipe({ file, detail }: { file: ImportFile; detail: ImportDetail }) {
  const t = useWords("recipes");
  const { data: session } = useSession();
  const [open, setOpen] = useState(false);
  const offer = useQuery({ ...recipeQueries.offer(detail.id, file.id), enabled: open });
  if (!session?.can.importLogs || !file.recipe) return null;
  const name = detail.files.length > 1 ? `${t("save.button")}: ${file.name}` : t("save.button");
  return (
    <>
      <Button kind="second" label={name} onPress={() => setOpen(true)} />
      {open ? (
        <Sheet open kind="side" title={t("save.title")} onClose={() => setOpen(false)}>
          {offer.data ? (
            <SaveForm
              file={file}
              detail={detail}
              proposed={offer.data.proposedName}
              onClose={() => setOpen(false)}
            />
          ) : (
            <LoadingBlocks />
          )}
        </Sheet>
      ) : null}
    </>
  );
}

function SaveForm(props: {
  file: ImportFile;
  detail: ImportDetail;
  proposed: string;
  onClose: () => void;
}) {
  const t = useWords("recipes");
  const toast = useToast();
  const [name, setName] = useState(props.proposed);
  const [shared, setShared] = useState(true);
  const [tried, setTried] = useState(false);
  const given = name.trim();
  const saving = useSaveRecipe(props.detail.id, props.file.id, () => {
    toast({ message: t("save.done", { name: given }) });
    props.onClose();
  });
  const submit = () => {
    setTried(true);
    if (given !== "") saving.send({ name: given, shared });
  };
  return (
    <Form label={t("save.title")} onSubmit={submit} errors={saving.formErrors}>
      <Text tone="ink2">{t("save.lead", { file: props.file.name })}</Text>
      <TextField
        label={t("save.name")}
        value={name}
        onChange={setName}
        error={tried && given === "" ? t("save.nameNeeded") : saving.fieldError("name")}
        autoComplete="off"
        required
      />
      <SwitchField
        label={t("save.shared")}
        detail={t("save.sharedHint")}
        on={shared}
        onChange={setShared}
      />
      <Button submit full label={t("save.send")} busy={saving.busy} />
    </Form>
  );
}
