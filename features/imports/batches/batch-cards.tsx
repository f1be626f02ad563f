import { View } from "react-native";
import type { BatchDetail, BatchFile } from "@shared/contracts/import-batches";
import { useFormat, useWords } from "@features/i18n";
import { Button, Card, Figure, Row, Text, TextLink } from "@features/ui";
import { importPaths } from "../import-paths";
import { PointCell, ProblemsCell, StateCell, useSpanWords } from "./batch-cells";
import type { BatchActions } from "./batch-queries";

/** The report of a batch on a phone: one file a card, whose point can be chosen in it. */
export function BatchCards({ batch, actions }: { batch: BatchDetail; actions: BatchActions }) {
  const t = useWords("batches");
  const span = useSpanWords(batch.site.zone);
  return (
    <View role="list" aria-label={t("one.caption")} style={{ gap: 12 }}>
      {batch.files.map((file) => (
        <View key={file.id} role="listitem">
          <Card pad={4}>
            <View style={{ gap: 10 }}>
              <Row gap={2} justify="space-between" align="flex-start">
                <View style={{ flex: 1, minWidth: 0 }}>
                  <Text variant="asReadM">{file.name}</Text>
                </View>
                <StateCell file={file} />
              </Row>
              <PointCell file={file} batch={batch} actions={actions} />
              <Energy file={file} zone={batch.site.zone} />
              {file.rows ? (
                <Text variant="small" tone="ink2">
                  {`${t("rows", { ...file.rows, left: file.rows.leftOut })}, ${span(file)}`}
                </Text>
              ) : null}
              {file.problems.length > 0 ? <ProblemsCell file={file} /> : null}
              <Row gap={3} justify="space-between">
                {file.importId === null ? (
                  <View />
                ) : (
                  <TextLink
                    href={importPaths.wizard(file.importId)}
                    label={t("one.open", { name: file.name })}
                  />
                )}
                {file.can.remove ? (
                  <Button
                    kind="quiet"
                    size="dense"
                    iconOnly
                    icon="close"
                    label={t("one.remove", { name: file.name })}
                    onPress={() => actions.remove.send(file.id)}
                  />
                ) : null}
              </Row>
            </View>
          </Card>
        </View>
      ))}
    </View>
  );
}

function Energy({ file, zone }: { file: BatchFile; zone: string }) {
  const t = useWords("batches");
  const format = useFormat(zone);
  const registers = (["heating", "cooling"] as const).flatMap((name) => {
    const found = file[name];
    return found ? [{ name, found }] : [];
  });
  if (registers.length === 0) return null;
  return (
    <Row gap={5} wrap>
      {registers.map(({ name, found }) => {
        const { factor, unit } = format.unit(`${name}Energy`);
        const { expandedKwh } = found;
        return (
          <View key={name}>
            <Text variant="small" tone="ink2">
              {t(`columns.${name}`)}
            </Text>
            <Figure
              size="m"
              value={found.kwh * factor}
              unit={unit}
              uncertainty={expandedKwh === null ? null : expandedKwh * factor}
              said={t(`columns.${name}`)}
            />
          </View>
        );
      })}
    </Row>
  );
}
