import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Card, Row, Text, useTheme } from "@features/ui";
import { MeaningControl, UnitControl, useColumnName, type ColumnsProps } from "./column-controls";

/** The same choices on a phone: one block a column, with two values from across the file. */
export function ColumnCards(props: ColumnsProps) {
  const t = useWords("imports");
  const name = useColumnName();
  const { colour } = useTheme();
  const rows = props.recognition.sampleRows;
  const examples = [rows[0], rows[Math.floor(rows.length / 2)]];
  return (
    <Card pad={0}>
      <View style={{ padding: 16 }}>
        <Text variant="subhead" level={2}>
          {t("columns.count", { count: props.recipe.columns.length })}
        </Text>
      </View>
      {props.recipe.columns.map((column) => (
        <View
          key={column.index}
          role="group"
          aria-label={name(column)}
          style={{ padding: 16, gap: 10, borderTopWidth: 1, borderTopColor: colour.rule }}
        >
          <Row gap={3} justify="space-between">
            <Text variant="asReadM">{name(column)}</Text>
            <View style={{ flexShrink: 1 }}>
              <Text variant="asReadS" tone="ink2" numberOfLines={1}>
                {[...new Set(examples.map((row) => row?.cells[column.index] ?? ""))].join("  ")}
              </Text>
            </View>
          </Row>
          <Row gap={2} align="stretch">
            <View style={{ flex: 1.7, minWidth: 0 }}>
              <MeaningControl {...props} column={column} long />
            </View>
            <View style={{ flex: 1, minWidth: 0 }}>
              <UnitControl {...props} column={column} />
            </View>
          </Row>
        </View>
      ))}
    </Card>
  );
}
