import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import type { RecipeDetail } from "@shared/contracts/recipes";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import { Answer } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Dialog,
  Form,
  Screen,
  SwitchField,
  Text,
  TextField,
  useToast,
} from "@features/ui";
import { withRecipe } from "../file-card";
import { importPaths } from "../import-paths";
import { RecipeColumns } from "./recipe-columns";
import { RecipeTime } from "./recipe-time";
import { recipeQueries, useDeleteRecipe, useUpdateRecipe } from "./recipe-queries";

/** One recipe: to see, and for whoever may, to change or delete. */
export function RecipeScreen() {
  const t = useWords("recipes");
  const { recipeId } = useLocalSearchParams<{ recipeId: string }>();
  const answer = useQuery(recipeQueries.detail(recipeId));
  const crumbs = useCrumbs();
  if (answer.data) return <Editor key={answer.data.version} recipe={answer.data} />;
  return (
    <Screen title={t("edit.see")} crumbs={crumbs}>
      <Answer
        of={{ ...answer, data: answer.data as RecipeDetail | undefined }}
        denied={t("denied")}
      >
        {() => null}
      </Answer>
    </Screen>
  );
}

function useCrumbs() {
  const t = useWords("recipes");
  const ofImports = useWords("imports");
  return [
    { label: ofImports("logs.title"), href: importPaths.logs },
    { label: t("title"), href: importPaths.recipes },
  ];
}

function Editor({ recipe }: { recipe: RecipeDetail }) {
  const t = useWords("recipes");
  const toast = useToast();
  const crumbs = useCrumbs();
  const [name, setName] = useState(recipe.name);
  const [shared, setShared] = useState(recipe.shared);
  const [read, setRead] = useState<FileRecipe>(recipe.recipe);
  const [tried, setTried] = useState(false);
  const [asking, setAsking] = useState(false);
  const saving = useUpdateRecipe(recipe.id, () => {
    toast({ message: t("edit.saved") });
    router.replace(importPaths.recipes);
  });
  const deleting = useDeleteRecipe(recipe.id, () => {
    toast({ message: t("edit.deleted", { name: recipe.name }) });
    router.replace(importPaths.recipes);
  });
  const { edit } = recipe.can;
  const given = name.trim();
  const submit = () => {
    setTried(true);
    if (given === "") return;
    const { columns, time, seriesKind } = withRecipe(read);
    const isOtherKind = seriesKind !== recipe.recipe.seriesKind;
    saving.send({
      version: recipe.version,
      name: given,
      shared,
      columns,
      time,
      ...(isOtherKind && { seriesKind }),
    });
  };
  return (
    <Screen
      title={edit ? t("edit.title") : t("edit.see")}
      crumbs={crumbs}
      narrow
      footer={
        edit ? (
          <>
            <Button kind="second" label={t("edit.delete")} onPress={() => setAsking(true)} />
            <View style={{ flexGrow: 1 }} />
            <Button kind="second" label={t("edit.cancel")} href={importPaths.recipes} />
            <Button label={t("edit.save")} busy={saving.busy} onPress={submit} />
          </>
        ) : undefined
      }
    >
      <Form
        label={t("edit.title")}
        onSubmit={submit}
        errors={[...saving.formErrors, ...deleting.formErrors]}
      >
        {edit ? (
          <Text tone="ink2">{t("edit.lead")}</Text>
        ) : (
          <Banner kind="note">{t("edit.notYours")}</Banner>
        )}
        <TextField
          label={t("save.name")}
          value={name}
          onChange={setName}
          error={tried && given === "" ? t("save.nameNeeded") : saving.fieldError("name")}
          autoComplete="off"
          disabled={!edit}
          required
        />
        {edit ? (
          <SwitchField
            label={t("save.shared")}
            detail={t("save.sharedHint")}
            on={shared}
            onChange={setShared}
          />
        ) : null}
        <RecipeColumns recipe={read} locked={!edit} onChange={setRead} />
        <RecipeTime recipe={read} locked={!edit} onChange={setRead} />
      </Form>
      <Dialog
        open={asking}
        title={t("deleteDialog.title", { name: recipe.name })}
        confirmLabel={t("deleteDialog.delete")}
        cancelLabel={t("deleteDialog.keep")}
        stop
        busy={deleting.busy}
        onClose={() => setAsking(false)}
        onConfirm={() => {
          setAsking(false);
          deleting.send(undefined);
        }}
      >
        <Text>{t("deleteDialog.text")}</Text>
      </Dialog>
    </Screen>
  );
}
