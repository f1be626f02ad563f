import { useQuery } from "@tanstack/react-query";
import { View } from "react-native";
import type { ImportDetail, ImportFile } from "@shared/contracts/imports";
import type { AppliedRecipe, RecipeOffer as Offer } from "@shared/contracts/recipes";
import { useWords } from "@features/i18n";
import { Banner, Button, Card, Mark, Row, Text } from "@features/ui";
import { useDifferenceWords } from "./difference-words";
import { recipeQueries, useApplyRecipe } from "./recipe-queries";

/** Recipes that fit a recognised file, offered and never applied unasked; then how it differs. */
export function RecipeOffer({ file, detail }: { file: ImportFile; detail: ImportDetail }) {
  const offer = useQuery({
    ...recipeQueries.offer(detail.id, file.id),
    enabled: file.recognition !== null,
  });
  if (!offer.data || !file.recognition) return null;
  const { applied, matches } = offer.data;
  if (!applied && (matches.length === 0 || !detail.can.edit)) return null;
  return (
    <View style={{ marginBottom: 16 }}>
      {applied ? (
        <Applied applied={applied} file={file} />
      ) : (
        <Matches matches={matches} file={file} importId={detail.id} />
      )}
    </View>
  );
}

function Matches(props: { matches: Offer["matches"]; file: ImportFile; importId: string }) {
  const t = useWords("recipes");
  const { matches, file } = props;
  const applying = useApplyRecipe(props.importId, file.id);
  const title = matches.length === 1 ? t("offer.titleOne") : t("offer.title");
  return (
    <Card pad={5} label={title}>
      <View style={{ gap: 12 }}>
        <View>
          <Text variant="subhead" level={2}>
            {title}
          </Text>
          <Text variant="small" tone="ink2">
            {t("offer.check")}
          </Text>
        </View>
        {applying.error ? (
          <Banner kind="wrong" live>
            {applying.formErrors.join(" ")}
          </Banner>
        ) : null}
        {matches.map(({ id, name, by, loggerSerial }) => (
          <Row key={id} gap={3} wrap justify="space-between">
            <Text variant="bodyWide" tone="ink2">
              {t(`offer.${by}`, { serial: loggerSerial ?? "" })}
            </Text>
            <Button
              label={t("offer.use", { name })}
              busy={applying.busy}
              onPress={() => applying.send(id)}
            />
          </Row>
        ))}
      </View>
    </Card>
  );
}

function Applied({ applied, file }: { applied: AppliedRecipe; file: ImportFile }) {
  const t = useWords("recipes");
  const inWords = useDifferenceWords();
  const { differences, name } = applied;
  const asks = differences.some((difference) => difference.asks);
  const open = file.questions.length > 0;
  return (
    <Card pad={5} label={t("applied.title", { name })}>
      <View style={{ gap: 10 }}>
        <Row gap={3}>
          <Mark kind={asks && open ? "look" : "fine"} size={22} silent />
          <Text variant="subhead" level={2}>
            {t("applied.title", { name })}
          </Text>
        </Row>
        <Text variant="bodyWide" tone="ink2">
          {differences.length === 0
            ? t("applied.same")
            : t("applied.differs", { count: differences.length })}
        </Text>
        {differences.length === 0 ? null : (
          <View role="list" style={{ gap: 6 }}>
            {differences.map((difference, at) => (
              <View key={at} role="listitem" style={{ flexDirection: "row", gap: 8 }}>
                <Mark kind={difference.asks && open ? "look" : "note"} size={20} silent />
                <View style={{ flex: 1, minWidth: 0 }}>
                  <Text variant="bodyWide">{inWords(difference)}</Text>
                </View>
              </View>
            ))}
          </View>
        )}
        {asks ? (
          <Text variant="small" tone="ink2">
            {open ? t("applied.asks") : t("applied.answered")}
          </Text>
        ) : null}
      </View>
    </Card>
  );
}
