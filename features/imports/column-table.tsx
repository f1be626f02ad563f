import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Card, radius, Text, useTheme } from "@features/ui";
import { MeaningControl, UnitControl, useColumnName, type ColumnsProps } from "./column-controls";
import { isTime } from "./recipe-edits";

/** Columns as the file has them: head with the choices, below it rows from across the file. */
export function ColumnTable(props: ColumnsProps) {
  const t = useWords("imports");
  const name = useColumnName();
  const { colour } = useTheme();
  const { columns } = props.recipe;
  const width = (index: number) => ({
    flexGrow: isTime(columns[index]?.meaning ?? "skip") ? 1.5 : 1,
    flexBasis: 0,
    minWidth: isTime(columns[index]?.meaning ?? "skip") ? 176 : 128,
  });
  return (
    <Card pad={0}>
      <View
        style={{
          overflow: "scroll",
          borderTopLeftRadius: radius.card,
          borderTopRightRadius: radius.card,
        }}
        tabIndex={0}
        role="region"
        aria-label={t("columns.caption", { name: props.name })}
      >
        <View
          role="table"
          aria-label={t("columns.caption", { name: props.name })}
          style={{ minWidth: "100%" }}
        >
          <View role="row" style={{ flexDirection: "row", backgroundColor: colour.well }}>
            {columns.map((column) => (
              <View
                key={column.index}
                role="columnheader"
                style={[
                  width(column.index),
                  {
                    paddingVertical: 14,
                    paddingHorizontal: 8,
                    gap: 6,
                    borderLeftWidth: column.index === 0 ? 0 : 1,
                    borderLeftColor: colour.rule,
                  },
                ]}
              >
                <Text variant="asReadM" tone="ink2" numberOfLines={1}>
                  {name(column)}
                </Text>
                <MeaningControl {...props} column={column} />
                <UnitControl {...props} column={column} />
              </View>
            ))}
          </View>
          {props.recognition.sampleRows.slice(0, 11).map((row) => (
            <View
              key={row.line}
              role="row"
              style={{ flexDirection: "row", borderTopWidth: 1, borderTopColor: colour.rule }}
            >
              {columns.map((column) => {
                const skipped = column.meaning === "skip";
                return (
                  <View
                    key={column.index}
                    role="cell"
                    style={[width(column.index), { paddingHorizontal: 12, paddingVertical: 7 }]}
                  >
                    <Text
                      variant="asReadM"
                      tone={skipped ? "ink3" : "ink"}
                      align={isTime(column.meaning) ? "left" : "right"}
                      numberOfLines={1}
                      style={skipped ? { textDecorationLine: "line-through" } : null}
                    >
                      {row.cells[column.index] ?? ""}
                    </Text>
                  </View>
                );
              })}
            </View>
          ))}
        </View>
      </View>
      <View style={{ padding: 14, borderTopWidth: 1, borderTopColor: colour.rule }}>
        <Text variant="small" tone="ink2">
          {t("columns.rowsShown", { count: Math.min(11, props.recognition.sampleRows.length) })}
        </Text>
      </View>
    </Card>
  );
}
