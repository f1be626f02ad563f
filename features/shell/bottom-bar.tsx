import { useState } from "react";
import { Pressable, View } from "react-native";
import Svg, { Path } from "react-native-svg";

import type { Session } from "@shared/contracts/people";
import { useWords } from "@features/i18n";
import {
  barRun,
  layout,
  stroke,
  useMeasuredWidth,
  useSpans,
  useTheme,
  webStyle,
} from "@features/ui";

import { MoreSheet } from "./more-sheet";
import { NavFace, NavLink } from "./nav-link";
import { navFor, type Destination } from "./nav-items";

/** The phone bar: the line dips under the current item, or under More while its sheet is open. */
export function BottomBar({ session, current }: { session: Session; current: Destination | null }) {
  const { colour } = useTheme();
  const t = useWords("shell");
  const [moreOpen, setMoreOpen] = useState(false);
  const [width, onLayout] = useMeasuredWidth();
  const { spans, measure } = useSpans("x");
  const { bar, more } = navFor(session.role);
  const inMore = current !== null && more.includes(current);
  const lifted = moreOpen || inMore ? "more" : current;
  const run = barRun((lifted && spans.get(lifted)) || null, width);
  const height = layout.phone.bottomBar;
  return (
    <View
      onLayout={onLayout}
      style={[
        { minHeight: height, backgroundColor: colour.well },
        webStyle({ position: "sticky", bottom: 0, zIndex: moreOpen ? 110 : 40 }),
      ]}
    >
      {width > 0 ? (
        <View aria-hidden style={{ position: "absolute", top: 0, left: 0 }}>
          <Svg width={width} height={height}>
            <Path d={`${run}V-2H-4z`} fill={colour.pad} />
            <Path d={run} fill="none" stroke={colour.ink} strokeWidth={stroke.run} />
          </Svg>
        </View>
      ) : null}
      <View role="navigation" aria-label={t("nav.label")} style={{ flexDirection: "row" }}>
        {bar.map((key) => (
          <View key={key} onLayout={measure(key)} style={{ flex: 1 }}>
            <NavLink destination={key} on={key === current && !moreOpen} form="bar" />
          </View>
        ))}
        {more.length > 0 ? (
          <View onLayout={measure("more")} style={{ flex: 1 }}>
            <Pressable
              role="button"
              aria-expanded={moreOpen}
              onPress={() => setMoreOpen(!moreOpen)}
            >
              <NavFace icon="more" label={t("nav.more")} on={moreOpen || inMore} form="bar" />
            </Pressable>
          </View>
        ) : null}
      </View>
      <MoreSheet
        session={session}
        items={more}
        open={moreOpen}
        onClose={() => setMoreOpen(false)}
      />
    </View>
  );
}
