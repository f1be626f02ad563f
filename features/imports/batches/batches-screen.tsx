import { useInfiniteQuery, useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import { Answer, FailedAnswer, useSession } from "@features/api";
import { useFormat, useWords } from "@features/i18n";
import {
  Banner,
  Button,
  Card,
  EmptyState,
  LoadingBlocks,
  ListRow,
  Row,
  Screen,
  SelectField,
  Text,
} from "@features/ui";
import { importPaths } from "../import-paths";
import { placesToImportQuery } from "../imports-queries";
import { recipeQueries } from "../recipes/recipe-queries";
import { batchQueries, useOpenBatch } from "./batch-queries";

/** Where many files of one logger come in at once, and what came in that way before. */
export function BatchesScreen() {
  const t = useWords("batches");
  const ofImports = useWords("imports");
  const { data: session } = useSession();
  return (
    <Screen
      title={t("title")}
      crumbs={[{ label: ofImports("logs.title"), href: importPaths.logs }]}
      narrow
    >
      <View style={{ gap: 28 }}>
        <Text tone="ink2">{t("lead")}</Text>
        {session?.can.importLogs ? <NewBatch /> : null}
        <Earlier />
      </View>
    </Screen>
  );
}

function NewBatch() {
  const t = useWords("batches");
  const chosen = useLocalSearchParams<{ recipe?: string; site?: string }>();
  const recipes = useQuery(recipeQueries.list);
  const sites = useQuery(placesToImportQuery.sites);
  const opening = useOpenBatch((batch) => router.push(importPaths.batch(batch.id)));
  const only = (list: readonly { id: string }[] | undefined) =>
    list?.length === 1 ? list[0]?.id : undefined;
  const recipeId = chosen.recipe ?? only(recipes.data?.items);
  const siteId = chosen.site ?? only(sites.data?.items);
  const failed = recipes.error ?? sites.error;
  if (failed)
    return (
      <FailedAnswer error={failed} onRetry={() => void [recipes.refetch(), sites.refetch()]} />
    );
  if (!recipes.data || !sites.data) return <LoadingBlocks />;
  if (recipes.data.items.length === 0)
    return <EmptyState title={t("new.noRecipes.title")} detail={t("new.noRecipes.text")} />;
  if (sites.data.items.length === 0)
    return (
      <EmptyState
        title={t("new.noSites.title")}
        detail={t("new.noSites.text")}
        action={<Button href="/sites" label={t("new.noSites.action")} />}
      />
    );
  return (
    <Card pad={5} label={t("new.title")}>
      <View style={{ gap: 16 }}>
        <Text variant="subhead" level={2}>
          {t("new.title")}
        </Text>
        {opening.error ? (
          <Banner kind="wrong" live>
            {opening.formErrors.join(" ")}
          </Banner>
        ) : null}
        <SelectField
          label={t("new.recipe")}
          value={recipeId ?? null}
          emptyLabel={t("new.choose")}
          options={recipes.data.items.map(({ id, name }) => ({ value: id, label: name }))}
          onChange={(recipe) => router.setParams({ recipe })}
        />
        <SelectField
          label={t("new.site")}
          value={siteId ?? null}
          emptyLabel={t("new.choose")}
          options={sites.data.items.map(({ id, name }) => ({ value: id, label: name }))}
          onChange={(site) => router.setParams({ site })}
        />
        <View style={{ alignSelf: "flex-start" }}>
          <Button
            label={t("new.open")}
            busy={opening.busy}
            offBecause={recipeId && siteId ? undefined : t("new.first")}
            onPress={() => recipeId && siteId && opening.send({ recipeId, siteId })}
          />
        </View>
      </View>
    </Card>
  );
}

function Earlier() {
  const t = useWords("batches");
  const format = useFormat();
  const query = useInfiniteQuery(batchQueries.list);
  const batches = query.data?.pages.flatMap((page) => page.items);
  return (
    <Answer of={{ ...query, data: batches }} denied={t("denied")}>
      {(items) =>
        items.length === 0 ? null : (
          <View>
            <Text variant="subhead" level={2}>
              {t("list.title")}
            </Text>
            <View role="list" aria-label={t("list.caption")}>
              {items.map((batch) => (
                <View key={batch.id} role="listitem">
                  <ListRow
                    icon="file"
                    title={t("list.row", { count: batch.fileCount, site: batch.site.name })}
                    detail={t("list.detail", {
                      recipe: batch.recipe.name,
                      name: batch.createdBy,
                      at: format.dateTime(Date.parse(batch.createdAt)),
                    })}
                    href={importPaths.batch(batch.id)}
                  />
                </View>
              ))}
            </View>
            {query.hasNextPage ? (
              <Row>
                <Button
                  kind="second"
                  label={t("list.more")}
                  busy={query.isFetchingNextPage}
                  onPress={() => void query.fetchNextPage()}
                />
              </Row>
            ) : null}
          </View>
        )
      }
    </Answer>
  );
}
