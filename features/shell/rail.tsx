import { useState } from "react";
import { View } from "react-native";
import Svg, { Path } from "react-native-svg";

import type { Session } from "@shared/contracts/people";
import { useWords } from "@features/i18n";
import {
  BrandMark,
  layout,
  railRun,
  stroke,
  Text,
  useSpans,
  useTheme,
  webStyle,
} from "@features/ui";

import { NavLink } from "./nav-link";
import { navFor, type Destination } from "./nav-items";

/**
 * The rail of tablets and desks. One path runs down its edge and bends round the current item, whose
 * enclosed area takes the page ground, so the item opens into the page.
 */
export function Rail(props: { session: Session; current: Destination | null; narrow: boolean }) {
  const { session, current, narrow } = props;
  const { colour } = useTheme();
  const t = useWords("shell");
  const [height, setHeight] = useState(0);
  const { spans, measure } = useSpans("y");
  const width = narrow ? layout.tablet.rail : layout.wide.rail;
  const span = current ? spans.get(current) : undefined;
  const run = railRun(span ? { start: span.start - 1, end: span.end + 1 } : null, width, height);
  return (
    <View
      onLayout={(event) => setHeight(event.nativeEvent.layout.height)}
      style={[
        { width, flexShrink: 0, backgroundColor: colour.well, paddingBottom: 20 },
        webStyle({
          position: "sticky",
          top: 0,
          height: "100dvh",
          overflowY: "auto",
          overflowX: "hidden",
        }),
      ]}
    >
      {height > 0 ? (
        <View aria-hidden style={{ position: "absolute", top: 0, left: 0 }}>
          <Svg width={width} height={height}>
            <Path d={`${run}H${width + 2}V-4z`} fill={colour.pad} />
            <Path d={run} fill="none" stroke={colour.ink} strokeWidth={stroke.run} />
          </Svg>
        </View>
      ) : null}
      <View
        style={{
          position: "absolute",
          top: 22,
          left: narrow ? 26 : 20,
          flexDirection: "row",
          gap: 9,
          alignItems: "center",
        }}
      >
        <BrandMark size={narrow ? 32 : 26} ground="well" />
        {narrow ? null : <Text variant="wordmark">Loopwright</Text>}
      </View>
      {/* Items are laid out straight in the rail, so their measured places are the rail's own. */}
      <View
        role="navigation"
        aria-label={t("nav.label")}
        style={{ flex: 1, width, paddingTop: 96, gap: 6 }}
      >
        {navFor(session.role).rail.map((key) => (
          <View key={key} onLayout={measure(key)} style={{ marginLeft: 8 }}>
            <NavLink destination={key} on={key === current} form={narrow ? "narrow" : "wide"} />
          </View>
        ))}
      </View>
      {narrow ? null : (
        <View style={{ paddingHorizontal: 20 }}>
          <Text variant="label" numberOfLines={2}>
            {session.account.name}
          </Text>
          <Text variant="small" tone="ink3">
            {t(`role.${session.role}`)}
          </Text>
        </View>
      )}
    </View>
  );
}
