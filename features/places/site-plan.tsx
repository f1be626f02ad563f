import { useState } from "react";
import { View } from "react-native";
import type { Format } from "@features/i18n";
import { Text, useBreakpoint, useSpans } from "@features/ui";
import { BuildingCard, type BuildingGroup } from "./building-card";
import type { OverviewLoop, OverviewRange } from "./overview-loop-row";
import { phoneSizes, risersOf, riserWidth, wideSizes, type Riser } from "./riser-geometry";
import { SiteRisers } from "./site-risers";

/** Buildings one above the other, and the risers that reach each of their loops. */
export function SitePlan(props: {
  groups: readonly BuildingGroup[];
  loops: readonly OverviewLoop[];
  range: OverviewRange;
  monday: string;
  format: Format;
  note: string | null;
}) {
  const phone = useBreakpoint() === "phone";
  const sizes = phone ? phoneSizes : wideSizes;
  const cards = useSpans("y");
  const boxes = useSpans("y");
  const rows = useSpans("y");
  const [height, setHeight] = useState(0);
  const fed = props.loops.map(({ loop }) => ({ ...loop, heating: loop.service === "hot" }));
  const groups = risersOf(fed);

  const middleOf = (loopId: string): number | null => {
    const group = props.groups.find(({ loops }) => loops.some(({ loop }) => loop.id === loopId));
    const card = group && cards.spans.get(group.key);
    const box = group && boxes.spans.get(group.key);
    const row = rows.spans.get(loopId);
    if (!card || !box || !row) return null;
    return Math.round(card.start + box.start + (row.start + row.end) / 2);
  };
  const risers: Riser[] = groups.map(({ root, members }) => ({
    rootId: root.id,
    heating: root.heating,
    rows: members.flatMap(({ id }) => {
      const y = middleOf(id);
      return y === null ? [] : [{ loopId: id, y }];
    }),
  }));
  const width = riserWidth(groups.length, sizes);
  return (
    <View>
      {props.note ? (
        <Text variant="small" tone="ink2" style={{ marginBottom: 10 }}>
          {props.note}
        </Text>
      ) : null}
      <View>
        {width > 0 && height > 0 ? (
          <SiteRisers risers={risers} width={width + 2} height={height} sizes={sizes} />
        ) : null}
        <View
          onLayout={(event) => setHeight(Math.round(event.nativeEvent.layout.height) + 8)}
          style={{ marginLeft: width, gap: phone ? 14 : 15 }}
        >
          {props.groups.map((group) => (
            <BuildingCard
              key={group.key}
              group={group}
              range={props.range}
              monday={props.monday}
              format={props.format}
              onCard={cards.measure(group.key)}
              onRows={boxes.measure(group.key)}
              onRow={rows.measure}
            />
          ))}
        </View>
      </View>
    </View>
  );
}
