import { Pressable, View } from "react-native";
import Svg, { Path } from "react-native-svg";

import { risingRun } from "./run-line";
import { Text } from "./text";
import { stroke, target, useMeasuredWidth, useTheme, type ColourRole } from "./theme";
import { useRoving } from "./use-roving";
import { useSpans } from "./use-spans";

export interface TabsProps<Key extends string> {
  label: string;
  tabs: readonly { key: Key; label: string }[];
  current: Key;
  onChange: (key: Key) => void;
  /** What the tabs stand on, so the current one opens into it. */
  ground?: ColourRole;
  /** Id prefix of the panels: panel of tab `x` has id `${panelId}-x`. */
  panelId?: string;
}

/** Tabs on the line, which rises over the current one. */
export function Tabs<Key extends string>(props: TabsProps<Key>) {
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const { spans, measure } = useSpans("x");
  const member = useRoving(props.tabs.length, (index) => {
    const tab = props.tabs[index];
    if (tab) props.onChange(tab.key);
  });
  const height = target.default;
  const span = spans.get(props.current);
  const run = span && width > 0 ? risingRun(span, width, height) : null;
  return (
    <View onLayout={onLayout} style={{ minHeight: height }}>
      {run ? (
        <View aria-hidden style={{ position: "absolute", left: 0, right: 0, bottom: 0, height }}>
          <Svg width={width} height={height}>
            <Path
              d={run.whole}
              fill={colour[props.ground ?? "pad"]}
              stroke={colour.ink}
              strokeWidth={stroke.run}
            />
          </Svg>
        </View>
      ) : null}
      <View
        role="tablist"
        aria-label={props.label}
        style={{ flexDirection: "row", paddingHorizontal: 12, overflow: "hidden" }}
      >
        {props.tabs.map((tab, index) => {
          const on = tab.key === props.current;
          const panel = props.panelId ? { "aria-controls": `${props.panelId}-${tab.key}` } : {};
          return (
            <Pressable
              key={tab.key}
              {...member(index)}
              {...panel}
              onLayout={measure(tab.key)}
              role="tab"
              aria-selected={on}
              tabIndex={on ? 0 : -1}
              onPress={() => props.onChange(tab.key)}
              style={{ minHeight: height, paddingHorizontal: 16, justifyContent: "center" }}
            >
              <Text variant={on ? "navOn" : "nav"} tone={on ? "ink" : "ink2"}>
                {tab.label}
              </Text>
            </Pressable>
          );
        })}
      </View>
    </View>
  );
}
