import { useQuery } from "@tanstack/react-query";
import { View } from "react-native";
import type { RecipeSummary } from "@shared/contracts/recipes";
import { Answer } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import { Button, EmptyState, Screen, Table, Text } from "@features/ui";
import { importPaths } from "../import-paths";
import { recipeQueries } from "./recipe-queries";

/** Every saved way of reading a logger's files. */
export function RecipesScreen() {
  const t = useWords("recipes");
  const ofImports = useWords("imports");
  const answer = useQuery(recipeQueries.list);
  return (
    <Screen
      title={t("title")}
      crumbs={[{ label: ofImports("logs.title"), href: importPaths.logs }]}
      actions={
        answer.data?.can.use && answer.data.items.length > 0 ? (
          <Button kind="second" label={t("batches")} href={importPaths.batches} />
        ) : null
      }
    >
      <View style={{ gap: 20 }}>
        <Text tone="ink2">{t("lead")}</Text>
        <Answer of={answer} denied={t("denied")}>
          {({ items, can }) =>
            items.length === 0 ? (
              <EmptyState
                title={t("empty.title")}
                detail={t("empty.text")}
                action={
                  can.use ? (
                    <Button label={ofImports("logs.import")} href={importPaths.start()} />
                  ) : undefined
                }
              />
            ) : (
              <RecipesTable recipes={items} />
            )
          }
        </Answer>
      </View>
    </Screen>
  );
}

function RecipesTable({ recipes }: { recipes: readonly RecipeSummary[] }) {
  const t = useWords("recipes");
  const format = useFormat();
  const logger = ({ loggerSerial }: RecipeSummary) => loggerSerial ?? t("anyLogger");
  const headers = (recipe: RecipeSummary) =>
    recipe.headers.filter((header) => header !== "").join(", ");
  const who = ({ shared }: RecipeSummary) => (shared ? t("shared") : t("own"));
  const used = ({ lastUsedAt }: RecipeSummary) =>
    lastUsedAt ? format.date(Date.parse(lastUsedAt), "dayMonthYear") : t("never");
  return (
    <Table
      caption={t("caption")}
      captionHidden
      rows={recipes}
      rowKey={({ id }) => id}
      href={({ id }) => importPaths.recipe(id)}
      columns={[
        { key: "name", header: t("columns.name"), render: ({ name }) => name },
        { key: "logger", header: t("columns.logger"), render: logger },
        { key: "headers", header: t("columns.headers"), render: headers, wideOnly: true },
        { key: "who", header: t("columns.who"), render: who },
        {
          key: "by",
          header: t("columns.by"),
          render: ({ createdBy }) => createdBy,
          wideOnly: true,
        },
        { key: "used", header: t("columns.used"), render: used },
      ]}
      card={{
        title: ({ name }) => name,
        lines: (recipe) => [
          `${t("columns.logger")}: ${logger(recipe)}`,
          headers(recipe),
          `${t("columns.who")}: ${who(recipe)}`,
          `${t("columns.used")}: ${used(recipe)}`,
        ],
      }}
    />
  );
}
