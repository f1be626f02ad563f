import { Fragment } from "react";
import { View, type LayoutChangeEvent } from "react-native";
import type { Format } from "@features/i18n";
import { radius, Text, useBreakpoint, useTheme } from "@features/ui";
import { OverviewLoopRow, type OverviewLoop, type OverviewRange } from "./overview-loop-row";

export interface BuildingGroup {
  readonly key: string;
  readonly name: string;
  readonly note: string | null;
  /** Where loops that feed others stand: drawn with a strong edge. */
  readonly isSource: boolean;
  readonly loops: readonly OverviewLoop[];
}

/** A building with its loops; reports where it and each row stand, so risers can reach them. */
export function BuildingCard(props: {
  group: BuildingGroup;
  range: OverviewRange;
  monday: string;
  format: Format;
  onCard: (event: LayoutChangeEvent) => void;
  onRows: (event: LayoutChangeEvent) => void;
  onRow: (loopId: string) => (event: LayoutChangeEvent) => void;
}) {
  const { colour } = useTheme();
  const phone = useBreakpoint() === "phone";
  const { group, range, monday, format } = props;
  return (
    <View
      role="group"
      aria-label={group.name}
      onLayout={props.onCard}
      style={{
        flexDirection: phone ? "column" : "row",
        alignItems: "stretch",
        backgroundColor: colour.sheet,
        borderRadius: radius.card,
        borderWidth: group.isSource ? 2 : 1,
        borderColor: group.isSource ? colour.ink : colour.rule,
        paddingLeft: phone ? 14 : 22,
        paddingRight: phone ? 14 : 18,
        paddingVertical: phone ? 6 : 18,
      }}
    >
      {phone ? <PhoneHead group={group} /> : <WideHead group={group} />}
      <View
        onLayout={props.onRows}
        style={
          phone
            ? null
            : {
                flex: 1,
                minWidth: 0,
                borderLeftWidth: 1,
                borderLeftColor: colour.rule,
                paddingLeft: 20,
                justifyContent: "center",
              }
        }
      >
        {group.loops.map((shown, index) => (
          <Fragment key={shown.loop.id}>
            {index > 0 || phone ? (
              <View style={{ height: 1, backgroundColor: colour.rule }} />
            ) : null}
            <View onLayout={props.onRow(shown.loop.id)}>
              <OverviewLoopRow shown={shown} range={range} monday={monday} format={format} />
            </View>
          </Fragment>
        ))}
      </View>
    </View>
  );
}

function WideHead({ group }: { group: BuildingGroup }) {
  return (
    <View style={{ width: 190, justifyContent: "center", paddingRight: 12 }}>
      <Text variant="heading" level={2}>
        {group.name}
      </Text>
      {group.note ? (
        <Text variant="small" tone="ink3">
          {group.note}
        </Text>
      ) : null}
    </View>
  );
}

function PhoneHead({ group }: { group: BuildingGroup }) {
  return (
    <View
      style={{
        flexDirection: "row",
        justifyContent: "space-between",
        alignItems: "center",
        gap: 12,
        minHeight: 40,
      }}
    >
      <Text variant="subhead" level={2}>
        {group.name}
      </Text>
      {group.note ? (
        <Text variant="small" tone="ink3" style={{ flexShrink: 1 }} align="right">
          {group.note}
        </Text>
      ) : null}
    </View>
  );
}
